import { expect, it } from 'vitest';
import { emptySiteWalk } from './draft';
import { notAsked, rowsOf } from './summary';

it('shows nothing of a form that nobody filled in', () => {
  expect(rowsOf(emptySiteWalk, 'GFCI')).toEqual([]);
  expect(notAsked(emptySiteWalk)).toEqual(['irrigation', 'gas', 'pet fence']);
});

it('speaks the words of the region and tells no from not known', () => {
  const rows = rowsOf({ ...emptySiteWalk, protected: 'no', gas: { present: 'no', note: '' } }, 'RCD');
  expect(rows).toEqual([
    ['RCD', 'No'],
    ['Private gas line', 'No'],
  ]);
});

it('shows where a buried line runs, and stops asking about it', () => {
  const walk = { ...emptySiteWalk, petFence: { present: 'yes' as const, note: 'Along the hedge' } };
  expect(rowsOf(walk, 'GFCI')).toEqual([['Pet fence', 'Along the hedge']]);
  expect(notAsked(walk)).toEqual(['irrigation', 'gas']);
});
