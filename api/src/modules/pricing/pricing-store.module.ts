import { Module } from '@nestjs/common';
import { PlanStoreModule } from '../plans/plan-store.module.js';
import { Quotes } from './quotes.js';

/** Working out prices, without HTTP: for proposals and the worker. */
@Module({
  imports: [PlanStoreModule],
  providers: [Quotes],
  exports: [Quotes],
})
export class PricingStoreModule {}
