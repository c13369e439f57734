import { Module } from '@nestjs/common';
import { JobPricingController } from './job-pricing.controller.js';
import { JobPricingService } from './job-pricing.service.js';
import { PriceBookController } from './price-book.controller.js';
import { PriceBookService } from './price-book.service.js';
import { PricingStoreModule } from './pricing-store.module.js';

/** Prices over HTTP. */
@Module({
  imports: [PricingStoreModule],
  controllers: [PriceBookController, JobPricingController],
  providers: [PriceBookService, JobPricingService],
})
export class PricingModule {}
