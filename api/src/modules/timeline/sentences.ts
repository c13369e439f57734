import type { JobEventData, JobEventKind } from './job-events.repository.js';

const stageNames: Readonly<Record<string, string>> = {
  enquiry: 'Enquiry',
  plan: 'Plan',
  prove: 'Prove',
  propose: 'Propose',
  prepare: 'Prepare',
  install: 'Install',
  commission: 'Commission',
  aftercare: 'Aftercare',
};
const stageName = (stage: string): string => stageNames[stage] ?? stage;

const methods: Readonly<Record<string, string>> = {
  card: 'by card',
  cheque: 'by cheque',
  transfer: 'by transfer',
  cash: 'in cash',
};

/** One sentence for each kind of event; amounts stand beside it, for those who may see them. */
const tellers: { readonly [K in JobEventKind]: (data: JobEventData[K]) => string } = {
  'stage-changed': ({ from, to }) => `Moved from ${stageName(from)} to ${stageName(to)}`,
  'fault-accepted': ({ message, reason }) => `Accepted in writing: ${message} (${reason})`,
  'proposal-frozen': ({ revision }) => `Revision ${revision} was made`,
  'proposal-sent': ({ revision, to }) => `Revision ${revision} was sent to ${to.join(', ')}`,
  'proposal-opened': ({ revision }) => `Revision ${revision} was opened by a person`,
  'reminder-sent': ({ to }) => `A reminder went to ${to}`,
  'link-revoked': ({ to }) => `The link of ${to} was revoked`,
  'revision-withdrawn': ({ revision }) => `Revision ${revision} was withdrawn`,
  'revision-released': ({ revision }) => `Revision ${revision} was released to the crew`,
  'question-asked': ({ about }) => `A question about ${about}`,
  'question-answered': ({ about }) => `An answer about ${about}`,
  approved: ({ revision }) => `Revision ${revision} was approved`,
  declined: ({ revision, reason }) =>
    `Revision ${revision} was declined${reason === '' ? '' : `: ${reason}`}`,
  'payment-requested': ({ name }) => `${name} was asked for`,
  'payment-received': ({ name, method }) => `${name} was paid ${methods[method] ?? method}`,
  'payment-failed': ({ name }) => `A payment of ${name} did not go through`,
  'payment-mismatch': ({ name }) =>
    `The card service reports a sum for ${name} that nobody asked for; please look at it`,
  refunded: ({ reason }) => `Refunded: ${reason}`,
  'refund-failed': ({ reason }) => `A refund did not go through: ${reason}`,
};

/** What crew are not told. */
const aboutMoney: ReadonlySet<string> = new Set<JobEventKind>([
  'payment-requested',
  'payment-received',
  'payment-failed',
  'payment-mismatch',
  'refunded',
  'refund-failed',
]);
export const isAboutMoney = (kind: string): boolean => aboutMoney.has(kind);

/** A homeowner's reason for a no is often the price. */
const withoutReason = (data: unknown): unknown =>
  typeof data === 'object' && data !== null && 'reason' in data ? { ...data, reason: '' } : data;

/** The same for crew, who are told that it was declined, and not why. */
export const sentenceForCrew = (kind: string, data: unknown): string =>
  sentenceOf(kind, kind === 'declined' ? withoutReason(data) : data);

/** The sentence of a stored event; of a kind that is not known any more, its name. */
export function sentenceOf(kind: string, data: unknown): string {
  if (!Object.hasOwn(tellers, kind)) return kind;
  const teller = tellers[kind as JobEventKind] as (data: never) => string;
  return teller(data as never);
}

export function amountOf(data: unknown): number | null {
  if (typeof data !== 'object' || data === null || !('amountMinor' in data)) return null;
  return typeof data.amountMinor === 'number' ? data.amountMinor : null;
}
