import { Inject, Injectable } from '@nestjs/common';
import { CompaniesRepository } from '../companies/companies.repository.js';
import { regionOf, settingsInForce } from '../companies/settings.js';
import { nightScenesOf } from '../proposals/night.js';
import type { ShownRevision } from '../proposals/proposal-store.js';
import type { SharedNight } from './share.dto.js';

/** The evening of a guest's page: their garden by the light of the plan that they were sent. */
@Injectable()
export class ShareNights {
  constructor(@Inject(CompaniesRepository) private readonly companies: CompaniesRepository) {}

  async of({ row, document }: ShownRevision): Promise<SharedNight> {
    return {
      evening: document.evening ?? (await this.somewhere(row.companyId)),
      scenes: nightScenesOf(row, document),
    };
  }

  /** Which sheets have an evening to show, before it is asked for: the page keeps its place. */
  shown({ row, document }: ShownRevision): Map<string, { zones: number }> {
    const lit = nightScenesOf(row, document).filter(({ sources }) => sources.length > 0);
    return new Map(lit.map(({ sheetId, zones }) => [sheetId, { zones: zones.length }]));
  }

  /**
   * For a revision from before evenings were frozen: no place, so that the page says that it assumes the sunset,
   * and clocks as the company has them today.
   */
  private async somewhere(companyId: string): Promise<SharedNight['evening']> {
    const company = await this.companies.find(companyId);
    if (!company) throw new Error(`Company ${companyId} of a shown proposal is gone.`);
    return {
      place: null,
      timeZone: settingsInForce(regionOf(company.region), company.settings).timeZone,
    };
  }
}
