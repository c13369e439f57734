import { count, formatMoment } from '../../lib/format';
import type { ProposalLink } from './api';

export type LinkStanding = 'works' | 'revoked' | 'expired';

export const standingOf = (
  { revokedAt, expiresAt }: Pick<ProposalLink, 'revokedAt' | 'expiresAt'>,
  nowIso: string,
): LinkStanding => (revokedAt !== null ? 'revoked' : expiresAt <= nowIso ? 'expired' : 'works');

/** Whether somebody was there, and until when they can be. */
export function sentenceOfLink(link: ProposalLink, nowIso: string): string {
  const opened = link.openedAt === null ? 'Not opened' : `Opened ${formatMoment(link.openedAt)}`;
  switch (standingOf(link, nowIso)) {
    case 'works':
      return link.openedAt === null ? 'Not opened yet' : opened;
    case 'revoked':
      return `${opened} · revoked ${formatMoment(link.revokedAt ?? nowIso)}`;
    case 'expired':
      return `${opened} · expired ${formatMoment(link.expiresAt)}`;
  }
}

export const remindersOf = ({ remindersSent }: Pick<ProposalLink, 'remindersSent'>): string =>
  remindersSent === 0 ? 'no reminder' : count(remindersSent, 'reminder');
