import { Inject, Injectable } from '@nestjs/common';
import type { Letter } from '../../ports/mail/letter.js';
import { Outbox } from '../../ports/mail/outbox.js';
import { AgreementsRepository } from '../payments/agreements.repository.js';
import { CompanyTexts } from '../proposals/company-texts.js';
import type { RevisionRow } from '../proposals/proposals.repository.js';
import { ShareRepository } from './share.repository.js';

/** Tells the company what a homeowner did: whoever made the revision, and the company's own address. */
@Injectable()
export class CompanyMail {
  constructor(
    @Inject(ShareRepository) private readonly repository: ShareRepository,
    @Inject(CompanyTexts) private readonly texts: CompanyTexts,
    @Inject(AgreementsRepository) private readonly agreements: AgreementsRepository,
    @Inject(Outbox) private readonly outbox: Outbox,
  ) {}

  /** Once to each address, within the running transaction. */
  async post({ companyId, createdBy }: RevisionRow, letter: Letter): Promise<void> {
    const author = createdBy === null ? null : await this.repository.memberEmail(companyId, createdBy);
    const own = (await this.texts.inForce(companyId))?.texts.company.email ?? '';
    const named = [author ?? '', own].filter((address) => address !== '');
    const all = named.length > 0 ? named : await this.agreements.ownerEmails(companyId);
    const once = new Map(all.map((address) => [address.toLowerCase(), address]));
    for (const to of once.values()) await this.outbox.post(companyId, to, letter);
  }
}
