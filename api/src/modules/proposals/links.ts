import { Inject, Injectable } from '@nestjs/common';
import { newToken } from '../../access/one-time-token.js';
import { ENV } from '../../config/config.module.js';
import type { Env } from '../../config/env.js';
import { type LinkRow, ProposalsRepository, type RevisionRow } from './proposals.repository.js';
import { Seal } from './seal.js';

/** How long after a proposal's last day its page can still be opened: payments and papers are there too. */
const OPEN_AFTERWARDS_DAYS = 365;

export interface Recipient {
  readonly name: string;
  readonly email: string;
}

/** Gives homeowners their links. One address keeps its link over revisions: it shows the newest. */
@Injectable()
export class ProposalLinks {
  constructor(
    @Inject(ENV) private readonly env: Env,
    @Inject(ProposalsRepository) private readonly repository: ProposalsRepository,
    @Inject(Seal) private readonly seal: Seal,
  ) {}

  /** With when the last mail went to it; null for a new one. */
  async forRecipient(
    row: RevisionRow,
    { name, email }: Recipient,
    createdBy: string | null,
    now: Date,
  ): Promise<{ readonly link: LinkRow; readonly mailedAt: Date | null }> {
    const expiresAt = new Date(row.validUntil.getTime() + OPEN_AFTERWARDS_DAYS * 86_400_000);
    const links = await this.repository.links(row.companyId, [row.proposalId]);
    const live = links.find(
      (link) => link.revokedAt === null && link.email.toLowerCase() === email.toLowerCase(),
    );
    if (live) {
      const later = new Date(Math.max(expiresAt.getTime(), live.expiresAt.getTime()));
      const link = await this.repository.updateLink(row.companyId, live.id, {
        expiresAt: later,
        lastMailAt: now,
        ...(name === '' ? {} : { name }),
      });
      return { link, mailedAt: live.lastMailAt };
    }
    const { token, tokenHash } = newToken();
    const link = await this.repository.insertLink({
      companyId: row.companyId,
      proposalId: row.proposalId,
      tokenHash,
      // The hash names the link before it has an id.
      sealedToken: this.seal.close(token, tokenHash),
      name,
      email,
      createdBy,
      expiresAt,
      lastMailAt: now,
    });
    return { link, mailedAt: null };
  }

  urlOf({ sealedToken, tokenHash }: LinkRow): string {
    return new URL(`/p/${this.seal.open(sealedToken, tokenHash)}`, this.env.PUBLIC_URL).href;
  }
}

export const isLive = ({ revokedAt, expiresAt }: LinkRow, now: Date): boolean =>
  revokedAt === null && expiresAt.getTime() > now.getTime();
