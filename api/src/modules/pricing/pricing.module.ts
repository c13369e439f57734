import { Module } from '@nestjs/common';
import { PlanStoreModule } from '../plans/plan-store.module.js';
import { TimelineStoreModule } from '../timeline/timeline-store.module.js';
import { JobPricingController } from './job-pricing.controller.js';
import { JobPricingService } from './job-pricing.service.js';
import { PriceBookController } from './price-book.controller.js';
import { PriceBookService } from './price-book.service.js';
import { PricingStoreModule } from './pricing-store.module.js';

/** Prices over HTTP. */
@Module({
  imports: [PricingStoreModule, PlanStoreModule, TimelineStoreModule],
  controllers: [PriceBookController, JobPricingController],
  providers: [PriceBookService, JobPricingService],
})
export class PricingModule {}
