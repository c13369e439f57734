import { expect, it } from 'vitest';
import type { Materials } from './api';
import { gather } from './gather';

type Line = Materials['lines'][number];
const line = (over: Partial<Line>): Line => ({
  key: 'cable-12',
  groupId: null,
  section: 'cable',
  name: '12 AWG landscape cable, 2-core',
  quantity: 84,
  unit: 'foot',
  source: '61 ft drawn',
  recordIds: ['c1'],
  ...over,
});

it('brings each thing once, with the quantity of all groups and what each is for', () => {
  const base = line({});
  const path = line({ groupId: 'path', quantity: 43, source: '22 ft drawn', recordIds: ['c2'] });
  const stake = line({ key: 'stake', section: 'mounting', name: 'Ground stake', unit: 'each', quantity: 5 });
  const gathered = gather([base, stake, path]);
  expect(gathered.map(({ name, quantity }) => [name, quantity])).toEqual([
    [base.name, 127],
    ['Ground stake', 5],
  ]);
  expect(gathered[0]?.uses).toMatchObject([
    { groupId: null, quantity: 84, recordIds: ['c1'] },
    { groupId: 'path', quantity: 43, recordIds: ['c2'] },
  ]);
});

it('keeps apart what is sold in other units, or stands in another section', () => {
  const lines = [line({}), line({ unit: 'spool-250' }), line({ section: 'manual' })];
  expect(gather(lines)).toHaveLength(3);
});
