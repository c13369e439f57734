import { type DynamicModule, Module } from '@nestjs/common';
import { ConfigModule } from '../config/config.module.js';
import type { Env } from '../config/env.js';
import { DatabaseModule } from '../database/database.module.js';
import { ProcessSheet } from '../jobs/sheets.js';
import { SummarisePlan } from '../jobs/summarise-plan.js';
import { Decoder } from '../media/decoder.js';
import { CatalogueStoreModule } from '../modules/catalogue/catalogue-store.module.js';
import { PlanStoreModule } from '../modules/plans/plan-store.module.js';
import { PricingStoreModule } from '../modules/pricing/pricing-store.module.js';
import { CompanyTexts } from '../modules/proposals/company-texts.js';
import { ProposalTextsRepository } from '../modules/proposals/proposal-texts.repository.js';
import { SheetStoreModule } from '../modules/sheets/sheet-store.module.js';
import { QueueModule } from '../ports/queue/queue.module.js';
import { StorageModule } from '../ports/storage/storage.module.js';
import { DemoRepository } from './demo.repository.js';
import { DemoService } from './demo.service.js';
import { DemoPrices } from './prices/demo-prices.js';

/** What loading the demo company needs of the product. */
@Module({})
export class DemoModule {
  static with(env: Env): DynamicModule {
    return {
      module: DemoModule,
      imports: [
        ConfigModule.with(env),
        DatabaseModule,
        QueueModule,
        StorageModule,
        CatalogueStoreModule,
        SheetStoreModule,
        PlanStoreModule,
        PricingStoreModule,
      ],
      providers: [
        DemoRepository,
        DemoService,
        DemoPrices,
        CompanyTexts,
        ProposalTextsRepository,
        Decoder,
        ProcessSheet,
        SummarisePlan,
      ],
    };
  }
}
