import { describe, expect, it } from 'vitest';
import { ApiProblem } from '../../../lib/api/client';
import { failedSave } from './server';

const problem = (status: number, body: unknown = null) =>
  new ApiProblem(status, 'code', 'A sentence.', [], body);

describe('a save that failed', () => {
  it('waits for the network where none answers, or a server is in trouble', () => {
    for (const status of [0, 429, 500, 502, 503])
      expect(failedSave(problem(status))).toEqual({ kind: 'offline' });
    expect(failedSave(new Error('anything else'))).toEqual({ kind: 'offline' });
  });

  it('waits for the person where they are signed out', () => {
    expect(failedSave(problem(401))).toEqual({ kind: 'signed-out' });
  });

  it('hands on both sides of a conflict', () => {
    const note = { kind: 'note', id: 'n', sheetId: 's', at: { x: 1, y: 2 }, text: 'mine' };
    const body = {
      version: 4,
      conflicts: [
        {
          changeId: 'c',
          recordId: 'n',
          reason: 'changed',
          message: 'Both.',
          base: null,
          theirs: null,
          mine: note,
        },
      ],
      others: [],
    };
    expect(failedSave(problem(409, body))).toMatchObject({
      kind: 'conflict',
      version: 4,
      conflicts: [{ recordId: 'n', mine: { text: 'mine' } }],
    });
  });

  it('tells what will never be taken, and does not call a refusal a conflict', () => {
    expect(failedSave(problem(400))).toEqual({ kind: 'refused', message: 'A sentence.' });
    expect(failedSave(problem(403))).toEqual({ kind: 'refused', message: 'A sentence.' });
    expect(failedSave(problem(409, { code: 'archived' }))).toEqual({
      kind: 'refused',
      message: 'A sentence.',
    });
  });
});
