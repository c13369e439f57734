import { type PriceBook, priceBookSchema, usualPriceBook } from '@lampwright/geometry/price';
import type { UnitSystem } from '@lampwright/geometry/units';
import { Inject, Injectable } from '@nestjs/common';
import { CompaniesRepository, type CompanyRow } from '../companies/companies.repository.js';
import { regionOf, settingsInForce } from '../companies/settings.js';
import { type PriceBookRow, PriceBooksRepository } from './price-books.repository.js';

export interface BookInForce {
  /** 0 while the company works with the usual book of its region. */
  readonly version: number;
  readonly book: PriceBook;
  readonly currency: string;
  readonly system: UnitSystem;
}

/** The price book that a company works with: its own, or the usual one of its region until it saves one. */
@Injectable()
export class PriceBooks {
  constructor(
    @Inject(PriceBooksRepository) private readonly repository: PriceBooksRepository,
    @Inject(CompaniesRepository) private readonly companies: CompaniesRepository,
  ) {}

  /** Null when there is no such company any more. */
  async inForce(companyId: string): Promise<BookInForce | null> {
    const company = await this.companies.find(companyId);
    return company && bookOf(company, await this.repository.find(companyId));
  }

  /** Saves on top of a version; null when the book is at another one. */
  async save(companyId: string, baseVersion: number, book: PriceBook): Promise<BookInForce | null> {
    const row = await this.repository.save(companyId, baseVersion, book);
    const company = row && (await this.companies.find(companyId));
    return company && bookOf(company, row);
  }
}

function bookOf(company: CompanyRow, row: PriceBookRow | null): BookInForce {
  const region = regionOf(company.region);
  const settings = settingsInForce(region, company.settings);
  return {
    version: row?.version ?? 0,
    book: row ? priceBookSchema.parse(row.book) : usualPriceBook(region),
    currency: settings.currency,
    system: settings.units,
  };
}
