import type { PlanDocument } from '@lampwright/geometry/plan';
import { Inject, Injectable } from '@nestjs/common';
import type { Actor } from '../../access/actor.js';
import { Database } from '../../database/database.js';
import { CatalogueService } from '../../modules/catalogue/catalogue.service.js';
import { starterCatalogue } from '../../modules/catalogue/starter/index.js';
import type { PlanKey } from '../../modules/plans/plans.repository.js';
import { CataloguePricesRepository } from '../../modules/pricing/catalogue-prices.repository.js';
import { JobPricingsRepository } from '../../modules/pricing/job-pricings.repository.js';
import { PriceBooks } from '../../modules/pricing/price-books.js';
import { demoCompany, demoOwner } from '../scenario.js';
import { demoItemPrices } from './item-prices.js';
import { type DemoPricing, demoJobPricing } from './job-pricing.js';
import { DEMO_CONTROL, demoPriceBook } from './price-book.js';

/** Gives the demo company its prices, and its jobs theirs, where nobody priced anything yet. */
@Injectable()
export class DemoPrices {
  constructor(
    @Inject(Database) private readonly database: Database,
    @Inject(CatalogueService) private readonly catalogue: CatalogueService,
    @Inject(CataloguePricesRepository) private readonly prices: CataloguePricesRepository,
    @Inject(PriceBooks) private readonly books: PriceBooks,
    @Inject(JobPricingsRepository) private readonly pricings: JobPricingsRepository,
  ) {}

  /** A company that has a price book keeps all that it has. */
  async loadCompany(): Promise<void> {
    const companyId = demoCompany.id;
    await this.database.transaction(async () => {
      if ((await this.books.inForce(companyId))?.version !== 0) return;
      await this.addMissingParts();
      const items = await this.catalogue.byName(companyId);
      const priced = new Set((await this.prices.newest(companyId)).map(({ itemId }) => itemId));
      const prices = [...demoItemPrices].flatMap(([name, price]) => {
        const itemId = items.get(name)?.sourceId;
        return itemId === undefined || priced.has(itemId) ? [] : [{ itemId, price }];
      });
      await this.prices.add(companyId, prices, demoOwner.id);
      await this.books.save(
        companyId,
        0,
        demoPriceBook((name) => items.get(name)?.sourceId ?? null),
      );
    });
  }

  async loadJob(key: PlanKey, plan: PlanDocument, pricing: DemoPricing): Promise<void> {
    if (await this.pricings.find(key)) return;
    const items = await this.catalogue.byName(key.companyId);
    const made = demoJobPricing(plan, pricing, items.get(DEMO_CONTROL)?.sourceId ?? null);
    if (made) await this.pricings.save(key, 0, made, demoOwner.id);
  }

  /** A company that was loaded before catalogues had parts gets them now. */
  private async addMissingParts(): Promise<void> {
    const owner: Actor = { userId: demoOwner.id, sessionId: '', companyId: demoCompany.id, role: 'owner' };
    const { items } = await this.catalogue.list(owner, { category: 'part' });
    const { items: archived } = await this.catalogue.list(owner, { category: 'part', archived: 'true' });
    const known = new Set([...items, ...archived].map(({ item }) => item.name));
    for (const item of starterCatalogue)
      if (item.category === 'part' && !known.has(item.name)) await this.catalogue.add(owner, item);
  }
}
