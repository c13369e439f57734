import { type DynamicModule, Module } from '@nestjs/common';
import { AccessModule } from './access/access.module.js';
import { ConfigModule } from './config/config.module.js';
import { type Env, isLocal } from './config/env.js';
import { DatabaseModule } from './database/database.module.js';
import { OnceModule } from './http/once.module.js';
import { AccountModule } from './modules/account/account.module.js';
import { AuthModule } from './modules/auth/auth.module.js';
import { CatalogueModule } from './modules/catalogue/catalogue.module.js';
import { CatalogueImportModule } from './modules/catalogue-import/catalogue-import.module.js';
import { ClientsModule } from './modules/clients/clients.module.js';
import { CompaniesModule } from './modules/companies/companies.module.js';
import { DevMailModule } from './modules/dev-mail/dev-mail.module.js';
import { EstimatesModule } from './modules/estimates/estimates.module.js';
import { HealthModule } from './modules/health/health.module.js';
import { JobsModule } from './modules/jobs/jobs.module.js';
import { MembersModule } from './modules/members/members.module.js';
import { PaymentsModule } from './modules/payments/payments.module.js';
import { PlansModule } from './modules/plans/plans.module.js';
import { PricingModule } from './modules/pricing/pricing.module.js';
import { PropertiesModule } from './modules/properties/properties.module.js';
import { ProposalsModule } from './modules/proposals/proposals.module.js';
import { QuestionsModule } from './modules/questions/questions.module.js';
import { ShareModule } from './modules/share/share.module.js';
import { SheetsModule } from './modules/sheets/sheets.module.js';
import { TimelineModule } from './modules/timeline/timeline.module.js';
import { MailModule } from './ports/mail/mail.module.js';
import { CardServiceModule } from './ports/payments/card-service.module.js';
import { QueueModule } from './ports/queue/queue.module.js';
import { StorageModule } from './ports/storage/storage.module.js';

/** What the HTTP process is made of. */
@Module({})
export class AppModule {
  static with(env: Env): DynamicModule {
    return {
      module: AppModule,
      imports: [
        ConfigModule.with(env),
        DatabaseModule,
        QueueModule,
        StorageModule,
        MailModule,
        CardServiceModule,
        AccessModule,
        OnceModule,
        AuthModule,
        AccountModule,
        CompaniesModule,
        MembersModule,
        ...(isLocal(env) ? [DevMailModule] : []),
        HealthModule,
        ClientsModule,
        PropertiesModule,
        JobsModule,
        SheetsModule,
        PlansModule,
        CatalogueModule,
        CatalogueImportModule,
        EstimatesModule,
        PricingModule,
        ProposalsModule,
        QuestionsModule,
        ShareModule,
        PaymentsModule,
        TimelineModule,
      ],
    };
  }
}
