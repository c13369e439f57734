import { expect, it } from 'vitest';
import type { Question } from '../../lib/affairs';
import { aboutOf, inOrder } from './about';

const question = (id: string, at: string, resolvedAt: string | null = null): Question => ({
  id,
  recordId: null,
  sheetId: null,
  x: null,
  y: null,
  revision: 1,
  resolvedAt,
  messages: [{ id: `m${id}`, side: 'homeowner', authorName: 'Maren', text: 'Why?', at }],
});
const names = {
  light: (id: string) => (id === 'f1' ? 'P1, Brass path light' : null),
  sheet: (id: string) => (id === 's1' ? 'Back yard' : null),
};

it('puts open ones first, the newest word on top', () => {
  const asked = [
    question('old', '2026-05-01T10:00:00.000Z'),
    question('settled', '2026-05-09T10:00:00.000Z', '2026-05-09T11:00:00.000Z'),
    question('new', '2026-05-02T10:00:00.000Z'),
  ];
  expect(inOrder(asked).map(({ id }) => id)).toEqual(['new', 'old', 'settled']);
});

it('says what it is about, also when that is gone', () => {
  expect(aboutOf({ recordId: 'f1', sheetId: null }, names)).toBe('P1, Brass path light');
  expect(aboutOf({ recordId: 'f2', sheetId: null }, names)).toContain('gone by now');
  expect(aboutOf({ recordId: null, sheetId: 's1' }, names)).toBe('A place on Back yard');
  expect(aboutOf({ recordId: null, sheetId: null }, names)).toBe('The whole proposal');
});
