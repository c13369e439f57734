import { Module } from '@nestjs/common';
import { PlanStoreModule } from '../plans/plan-store.module.js';
import { CataloguePricesRepository } from './catalogue-prices.repository.js';
import { FaultAcceptancesRepository } from './fault-acceptances.repository.js';
import { JobPricingsRepository } from './job-pricings.repository.js';
import { PlanJudge } from './plan-judge.js';
import { PriceBooks } from './price-books.js';
import { PriceBooksRepository } from './price-books.repository.js';
import { Quotes } from './quotes.js';

const shared = [
  CataloguePricesRepository,
  FaultAcceptancesRepository,
  JobPricingsRepository,
  PriceBooks,
  Quotes,
];

/** Keeping prices and working them out, without HTTP: for proposals, the worker and the demo. */
@Module({
  imports: [PlanStoreModule],
  providers: [...shared, PriceBooksRepository, PlanJudge],
  exports: shared,
})
export class PricingStoreModule {}
