import { expect, it } from 'vitest';
import { summaryText, takenText, undoneText } from './words';

const none = { added: 0, changed: 0, same: 0, faults: 0, leftOut: 0 };

it('tells what an import did, without what it did not', () => {
  expect(summaryText({ ...none, added: 3, changed: 1, faults: 1 })).toBe('3 new, 1 changed, 1 row not taken');
  expect(summaryText({ ...none, changed: 2, same: 9 })).toBe('2 changed');
  expect(takenText({ ...none, added: 1 })).toBe('1 new item is in the catalogue.');
  expect(takenText({ ...none, added: 2, changed: 1 })).toBe(
    '2 new and 1 changed items are in the catalogue.',
  );
});

it('names the items that an undoing leaves, as many as a message has room for', () => {
  expect(undoneText('list.csv', [])).toBe('list.csv is taken back.');
  expect(undoneText('list.csv', ['A, 2 W', 'B'])).toBe(
    'list.csv is taken back. Changed since, and left as they are: A, 2 W; B.',
  );
  expect(undoneText('list.csv', ['A', 'B', 'C', 'D', 'E'])).toContain('A; B; C; and 2 more.');
});
