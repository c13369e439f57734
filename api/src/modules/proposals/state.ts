import { isExpired } from './proposal-store.js';
import type { ProposalState } from './proposals.dto.js';
import type { ApprovalRow, DeclineRow, LinkRow, RevisionFactsRow } from './proposals.repository.js';

export interface RevisionFacts {
  readonly row: RevisionFactsRow;
  readonly approval: ApprovalRow | null;
  readonly decline: DeclineRow | null;
  readonly links: readonly LinkRow[];
  /** The homeowner asked something about it. */
  readonly commented: boolean;
  readonly now: Date;
}

/** Where a revision stands: the furthest that is true of it. */
export function stateOf({ row, approval, decline, links, commented, now }: RevisionFacts): ProposalState {
  if (approval) return 'approved';
  if (decline) return 'declined';
  if (row.withdrawnAt !== null) return 'withdrawn';
  if (row.sentAt === null) return row.status !== 'ready' || row.sendTo !== null ? 'preparing' : 'ready';
  if (isExpired(row, now)) return 'expired';
  if (commented) return 'commented';
  const { sentAt } = row;
  return links.some(({ lastSeenAt }) => lastSeenAt !== null && lastSeenAt >= sentAt) ? 'opened' : 'sent';
}
