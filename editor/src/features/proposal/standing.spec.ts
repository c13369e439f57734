import { describe, expect, it } from 'vitest';
import { proposalStates } from '../../lib/proposal-states';
import { isWaiting } from './api';
import { approval, link, proposal, revision } from './proposal.testkit';
import { changedSince, moveOf, overtaken, people, sentenceOfState, stepsOf } from './standing';

const now = '2026-05-10T12:00:00.000Z';
const clear = { obstacles: [], openQuestions: 0, changed: false };
const sent = { state: 'sent', sentAt: '2026-05-01T11:00:00.000Z' } as const;

describe('the step that moves the job on', () => {
  it('is the first revision, unless something stands in the way', () => {
    expect(moveOf(proposal(), clear)).toEqual({ kind: 'make', revision: 1, changeOrder: false });
    const obstacles = [{ message: 'P4 is dim.', mend: 'faults' as const }];
    expect(moveOf(proposal(), { ...clear, obstacles })).toEqual({ kind: 'clear', obstacles });
  });

  it('waits while the PDF is made, and makes anew what failed', () => {
    const preparing = revision({ state: 'preparing', progress: 40, pdfUrl: null });
    expect(moveOf(proposal({ revisions: [preparing] }), clear)).toEqual({ kind: 'wait', progress: 40 });
    const failed = { ...preparing, failure: 'The picture of a sheet is missing.' };
    expect(moveOf(proposal({ revisions: [failed] }), clear)).toMatchObject({ kind: 'make', revision: 2 });
  });

  it('sends what is ready, but not what the plan has left behind', () => {
    const ready = proposal({ revisions: [revision()] });
    expect(moveOf(ready, clear)).toMatchObject({ kind: 'send', revision: { revision: 1 } });
    expect(moveOf(ready, { ...clear, changed: true })).toMatchObject({ kind: 'make', revision: 2 });
  });

  it('answers before it offers anything new', () => {
    const asked = proposal({ revisions: [revision({ ...sent, state: 'commented' })] });
    expect(moveOf(asked, { ...clear, openQuestions: 2, changed: true })).toEqual({
      kind: 'answer',
      questions: 2,
    });
  });

  it('leaves the client alone while the answer is theirs', () => {
    for (const state of ['sent', 'opened', 'commented', 'approved'] as const)
      expect(moveOf(proposal({ revisions: [revision({ ...sent, state })] }), clear)).toEqual({
        kind: 'none',
      });
  });

  it('offers anew what was refused, ran out or was withdrawn', () => {
    for (const state of ['declined', 'expired', 'withdrawn'] as const)
      expect(moveOf(proposal({ revisions: [revision({ ...sent, state })] }), clear)).toMatchObject({
        kind: 'make',
        revision: 2,
      });
  });

  it('is a change order once something was approved', () => {
    const approved = revision({ ...sent, state: 'approved', approval: approval() });
    expect(moveOf(proposal({ revisions: [approved] }), { ...clear, changed: true })).toEqual({
      kind: 'make',
      revision: 2,
      changeOrder: true,
    });
  });
});

describe('a revision that an approval overtook', () => {
  const approved = (at: string) => revision({ ...sent, state: 'approved', approval: approval({ at }) });
  const next = revision({ revision: 2, createdAt: '2026-05-03T10:00:00.000Z' });
  const after = approved('2026-05-04T10:00:00.000Z');

  it('is told as what a change order has to take the place of', () => {
    expect(overtaken(proposal({ revisions: [next, after] }))).toMatch(/^Revision 1 was approved after/);
  });

  it('is none that changes what was approved before, was sent, or was withdrawn', () => {
    const before = approved('2026-05-02T10:00:00.000Z');
    for (const revisions of [
      [],
      [after],
      [next, before],
      [{ ...next, sentAt: '2026-05-05T10:00:00.000Z' }, after],
      [{ ...next, state: 'withdrawn' as const }, after],
    ])
      expect(overtaken(proposal({ revisions }))).toBeNull();
  });
});

describe('the line of steps', () => {
  const line = (...args: Parameters<typeof stepsOf>) => stepsOf(...args).map(({ is }) => is);

  it('has one place where it is, for every state', () => {
    for (const state of proposalStates) {
      const steps = stepsOf(proposal({ state, revisions: [revision({ state })] }));
      expect(steps.filter(({ is }) => is === 'now').length, state).toBeLessThanOrEqual(1);
      expect(steps, state).toHaveLength(4);
    }
  });

  it('goes from made to answered', () => {
    expect(line(proposal())).toEqual(['now', 'ahead', 'ahead', 'ahead']);
    expect(line(proposal({ revisions: [revision()] }))).toEqual(['done', 'now', 'ahead', 'ahead']);
    expect(line(proposal({ revisions: [revision(sent)] }))).toEqual(['done', 'done', 'now', 'ahead']);
    expect(line(proposal({ state: 'approved' }))).toEqual(['done', 'done', 'done', 'done']);
  });

  it('ends where it ended, and claims nothing that did not happen', () => {
    expect(line(proposal({ state: 'declined' }))).toEqual(['done', 'done', 'done', 'ended']);
    const expired = revision({ ...sent, state: 'expired' });
    expect(line(proposal({ revisions: [expired], links: [link()] }))).toEqual([
      'done',
      'done',
      'ahead',
      'ended',
    ]);
    expect(line(proposal({ revisions: [revision({ state: 'withdrawn' })] }))).toEqual([
      'done',
      'ahead',
      'ahead',
      'ended',
    ]);
  });
});

describe('the sentence', () => {
  it('says to whom it went, of those who still have a way in', () => {
    const links = [link(), link({ id: 'b', name: 'Ola Holloway' }), link({ name: 'Gone', revokedAt: now })];
    expect(sentenceOfState(proposal({ revisions: [revision(sent)], links }), now)).toContain(
      'Revision 1 was sent to Maren Holloway and Ola Holloway',
    );
  });

  it('quotes the reason of a refusal', () => {
    const declined = revision({
      ...sent,
      state: 'declined',
      decline: { reason: 'Too dear.', at: now },
    });
    expect(sentenceOfState(proposal({ revisions: [declined] }), now)).toBe(
      'Revision 1 was declined: “Too dear.”',
    );
  });

  it('tells a change order as one', () => {
    const order = revision({
      ...sent,
      state: 'approved',
      revision: 2,
      changeOrder: true,
      approval: approval(),
    });
    expect(sentenceOfState(proposal({ revisions: [order] }), now)).toContain(
      'Change order, revision 2 was approved by Maren Holloway',
    );
  });

  it('counts people', () => {
    expect(people(['A'])).toBe('A');
    expect(people(['A', 'B'])).toBe('A and B');
    expect(people(['A', 'B', 'C'])).toBe('A and 2 others');
  });
});

it('says what changed since the newest revision', () => {
  expect(changedSince(undefined, true, true)).toBeNull();
  expect(changedSince(revision(), false, false)).toBeNull();
  expect(changedSince(revision({ revision: 2 }), true, false)).toBe(
    'The plan or the price has changed since revision 2.',
  );
});

it('asks again only while something is being made', () => {
  expect(isWaiting(proposal({ revisions: [revision({ state: 'preparing' })] }))).toBe(true);
  expect(isWaiting(proposal({ revisions: [revision({ state: 'preparing', failure: 'No.' })] }))).toBe(false);
  expect(isWaiting(proposal({ revisions: [revision()] }))).toBe(false);
  const signing = revision({ state: 'approved', approval: approval({ signedPdfUrl: null }) });
  expect(isWaiting(proposal({ revisions: [signing] }))).toBe(true);
});
