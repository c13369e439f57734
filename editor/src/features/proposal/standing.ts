import { count, formatDay, formatMoment } from '../../lib/format';
import type { Obstacle, Proposal, Revision } from './api';

/** The stations of a proposal, in order. */
export const stations = ['made', 'sent', 'opened', 'answered'] as const;
export type Station = (typeof stations)[number];

export interface Step {
  readonly station: Station;
  readonly label: string;
  readonly is: 'done' | 'now' | 'ahead' | 'ended';
}

const wordsOf: Readonly<Record<Station, { readonly done: string; readonly ahead: string }>> = {
  made: { done: 'Made', ahead: 'Make' },
  sent: { done: 'Sent', ahead: 'Send' },
  opened: { done: 'Opened', ahead: 'Open' },
  answered: { done: 'Approved', ahead: 'Answer' },
};

/** So many stations are behind it; the one after them is where it is. */
const steps = (done: number): readonly Step[] =>
  stations.map((station, i) => ({
    station,
    label: i < done ? wordsOf[station].done : wordsOf[station].ahead,
    is: i < done ? 'done' : i === done ? 'now' : 'ahead',
  }));

type Happened = Readonly<Record<'sent' | 'opened', boolean>>;

function endedStep(step: Step, label: string, happened: Happened): Step {
  switch (step.station) {
    case 'made':
      return step;
    case 'sent':
    case 'opened':
      return happened[step.station] ? step : { ...step, label: wordsOf[step.station].ahead, is: 'ahead' };
    case 'answered':
      return { ...step, label, is: 'ended' };
  }
}

/** A line that ended without a yes; what never happened on the way stays ahead. */
const ended = (label: string, happened: Happened): readonly Step[] =>
  steps(4).map((step) => endedStep(step, label, happened));

/** How far the newest revision has come; what was refused or ran out stands as the end of the line. */
export function stepsOf(proposal: Pick<Proposal, 'state' | 'revisions' | 'links'>): readonly Step[] {
  const newest = proposal.revisions[0];
  const sent = newest !== undefined && newest.sentAt !== null;
  const opened = sent && proposal.links.some(({ openedAt }) => openedAt !== null);
  switch (proposal.state) {
    case 'draft':
    case 'preparing':
      return steps(0);
    case 'ready':
      return steps(1);
    case 'sent':
      return steps(2);
    case 'opened':
    case 'commented':
      return steps(3);
    case 'approved':
      return steps(4);
    case 'declined':
      return ended('Declined', { sent: true, opened: true });
    case 'expired':
      return ended('Expired', { sent, opened });
    case 'withdrawn':
      return ended('Withdrawn', { sent, opened });
  }
}

/** The links that still lead somewhere. */
const working = ({ links }: Pick<Proposal, 'links'>, nowIso: string) =>
  links.filter(({ revokedAt, expiresAt }) => revokedAt === null && expiresAt > nowIso);

/** "Maren Holloway", "Maren Holloway and Ola Holloway", "Maren Holloway and 2 others". */
export function people(names: readonly string[]): string {
  const [first = 'nobody', second, ...rest] = names;
  if (second === undefined) return first;
  return rest.length === 0 ? `${first} and ${second}` : `${first} and ${rest.length + 1} others`;
}

const nameOf = ({ name, email }: { name: string; email: string }) => (name === '' ? email : name);

/** How it stands, in one sentence. */
export function sentenceOfState(proposal: Proposal, nowIso: string): string {
  const newest = proposal.revisions[0];
  if (newest === undefined)
    return 'A revision freezes the plan and the price as they are, and makes the PDF for the client.';
  const which = newest.changeOrder
    ? `Change order, revision ${newest.revision}`
    : `Revision ${newest.revision}`;
  switch (proposal.state) {
    case 'draft':
    case 'preparing':
      return newest.failure === null
        ? `${which} is being made into a PDF.`
        : `${which} could not be made into a PDF: ${newest.failure}`;
    case 'ready':
      return `${which} is made. Nobody has been sent it yet.`;
    case 'sent':
      return `${which} was sent to ${people(working(proposal, nowIso).map(nameOf))}${
        newest.sentAt === null ? '' : ` on ${formatMoment(newest.sentAt)}`
      }. Nobody has opened it yet.`;
    case 'opened': {
      const opened = proposal.links.filter(({ openedAt }) => openedAt !== null);
      return `${which} was opened by ${people(opened.map(nameOf))}. The answer is theirs.`;
    }
    case 'commented':
      return `There is a question about ${which.toLowerCase()}.`;
    case 'approved':
      return newest.approval === null
        ? `${which} is approved.`
        : `${which} was approved by ${newest.approval.typedName} on ${formatMoment(newest.approval.at)}.`;
    case 'declined':
      return newest.decline === null || newest.decline.reason === ''
        ? `${which} was declined, without a reason.`
        : `${which} was declined: “${newest.decline.reason}”`;
    case 'expired':
      return `${which} was valid until ${formatDay(newest.validUntil)}. Make a new revision to offer it again.`;
    case 'withdrawn':
      return `${which} is withdrawn: the client can’t approve it any more.`;
  }
}

/** What moves the job on from here. */
export type Move =
  | { readonly kind: 'clear'; readonly obstacles: readonly Obstacle[] }
  | { readonly kind: 'make'; readonly revision: number; readonly changeOrder: boolean }
  | { readonly kind: 'wait'; readonly progress: number }
  | { readonly kind: 'send'; readonly revision: Revision }
  | { readonly kind: 'answer'; readonly questions: number }
  | { readonly kind: 'none' };

interface Around {
  readonly obstacles: readonly Obstacle[];
  readonly openQuestions: number;
  /** Plan, price or words are other than in the newest revision. */
  readonly changed: boolean;
}

/** The revision that holds: the newest that was approved. */
export const approvedOf = ({ revisions }: Pick<Proposal, 'revisions'>): Revision | undefined =>
  revisions.find(({ approval }) => approval !== null);

export function moveOf(
  proposal: Pick<Proposal, 'state' | 'revisions'>,
  { obstacles, openQuestions, changed }: Around,
): Move {
  const newest = proposal.revisions[0];
  const make = (): Move =>
    obstacles.length > 0
      ? { kind: 'clear', obstacles }
      : {
          kind: 'make',
          revision: (newest?.revision ?? 0) + 1,
          changeOrder: approvedOf(proposal) !== undefined,
        };
  if (newest === undefined) return make();
  if (newest.state === 'preparing' && newest.failure === null)
    return { kind: 'wait', progress: newest.progress };
  if (newest.failure !== null) return make();
  if (openQuestions > 0 && newest.sentAt !== null) return { kind: 'answer', questions: openQuestions };
  if (changed) return make();
  switch (newest.state) {
    case 'ready':
      return { kind: 'send', revision: newest };
    case 'declined':
    case 'expired':
    case 'withdrawn':
      return make();
    case 'draft':
    case 'preparing':
    case 'sent':
    case 'opened':
    case 'commented':
    case 'approved':
      return { kind: 'none' };
  }
}

/** What has changed since the newest revision, as a sentence; null where nothing has. */
export function changedSince(newest: Revision | undefined, stale: boolean, words: boolean): string | null {
  if (newest === undefined) return null;
  const of = `since revision ${newest.revision}`;
  if (stale && words) return `The plan or price, and the words, have changed ${of}.`;
  if (stale) return `The plan or the price has changed ${of}.`;
  return words ? `The words have changed ${of}.` : null;
}

/** What was approved after the newest revision was made, which therefore can't be sent; null where nothing was. */
export function overtaken({ revisions }: Pick<Proposal, 'revisions'>): string | null {
  const newest = revisions[0];
  if (newest === undefined || newest.sentAt !== null || newest.state === 'withdrawn') return null;
  const approved = revisions.find(({ approval }) => approval !== null && approval.at > newest.createdAt);
  return approved === undefined
    ? null
    : `Revision ${approved.revision} was approved after revision ${newest.revision} was made: a change order takes its place.`;
}

export const makeLabel = (move: Extract<Move, { kind: 'make' }>): string =>
  move.changeOrder ? `Make change order, revision ${move.revision}` : `Make revision ${move.revision}`;

/** The button where something stands in the way: it leads to where the first of it is mended. */
export const clearLabel = (obstacles: readonly Obstacle[], revision: number): string =>
  `${count(obstacles.length, 'thing')} before revision ${revision}`;

/** Where an obstacle is mended, as a link's words. */
export function mendWord(mend: Obstacle['mend']): string {
  switch (mend) {
    case 'plan':
      return 'On the plan';
    case 'faults':
    case 'lines':
    case 'groups':
    case 'terms':
      return 'In the price';
  }
}
