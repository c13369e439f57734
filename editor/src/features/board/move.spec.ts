import { expect, it } from 'vitest';
import { type Board, type Card, moved } from './move';

const card = (jobId: string): Card => ({
  jobId,
  name: jobId,
  client: 'Maren Holloway',
  stage: 'plan',
  proposal: null,
  next: { by: 'company', what: 'Draw the plan.' },
  openQuestions: 0,
  totalMinor: null,
  outstandingMinor: null,
  updatedAt: '2026-05-01T10:00:00.000Z',
});
const board: Board = {
  currency: 'USD',
  locale: 'en-US',
  columns: [
    { stage: 'plan', count: 60, cards: [card('a'), card('b')] },
    { stage: 'prove', count: 1, cards: [{ ...card('c'), stage: 'prove' }] },
  ],
};

it('moves a card to the top of its new column and counts with it', () => {
  const [plan, prove] = moved(board, { jobId: 'b', to: 'prove' }).columns;
  expect(plan).toMatchObject({ count: 59, cards: [{ jobId: 'a' }] });
  expect(prove).toMatchObject({ count: 2, cards: [{ jobId: 'b', stage: 'prove' }, { jobId: 'c' }] });
});

it('leaves the board alone where there is nothing to move', () => {
  expect(moved(board, { jobId: 'a', to: 'plan' })).toBe(board);
  expect(moved(board, { jobId: 'nobody', to: 'prove' })).toBe(board);
});
