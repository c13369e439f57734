import { Inject, Injectable } from '@nestjs/common';
import { CompaniesRepository } from '../companies/companies.repository.js';
import { regionOf } from '../companies/settings.js';
import { ProposalTextsRepository } from './proposal-texts.repository.js';
import { type ProposalTexts, type ProposalTextsAnswer, proposalTextsSchema } from './proposals.dto.js';
import { usualTexts } from './usual-texts.js';

/** The texts that a company works with: its own, or the usual ones of its region until it saves some. */
@Injectable()
export class CompanyTexts {
  constructor(
    @Inject(ProposalTextsRepository) private readonly repository: ProposalTextsRepository,
    @Inject(CompaniesRepository) private readonly companies: CompaniesRepository,
  ) {}

  /** Null when there is no such company any more. */
  async inForce(companyId: string): Promise<ProposalTextsAnswer | null> {
    const row = await this.repository.find(companyId);
    if (row) return { version: row.version, texts: proposalTextsSchema.parse(row.texts) };
    const company = await this.companies.find(companyId);
    return company && { version: 0, texts: usualTexts(regionOf(company.region)) };
  }

  /** Saves on top of a version; null when the texts are at another one. */
  async save(
    companyId: string,
    baseVersion: number,
    texts: ProposalTexts,
  ): Promise<ProposalTextsAnswer | null> {
    const row = await this.repository.save(companyId, baseVersion, texts);
    return row && { version: row.version, texts };
  }
}
