import { Module } from '@nestjs/common';
import { JobsRepository } from '../jobs/jobs.repository.js';
import { PricingStoreModule } from '../pricing/pricing-store.module.js';
import { TimelineStoreModule } from '../timeline/timeline-store.module.js';
import { CardWords } from './card-words.js';
import { PaymentsController } from './payments.controller.js';
import { PaymentsService } from './payments.service.js';
import { PaymentsStoreModule } from './payments-store.module.js';
import { WebhooksController } from './webhooks.controller.js';

/** Payments over HTTP: the company's side, and the words of the card service. */
@Module({
  imports: [PaymentsStoreModule, PricingStoreModule, TimelineStoreModule],
  controllers: [PaymentsController, WebhooksController],
  providers: [PaymentsService, CardWords, JobsRepository],
})
export class PaymentsModule {}
