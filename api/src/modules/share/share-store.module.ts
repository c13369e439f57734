import { Module } from '@nestjs/common';
import { PaymentsStoreModule } from '../payments/payments-store.module.js';
import { ProposalsStoreModule } from '../proposals/proposals-store.module.js';
import { CompanyMail } from './company-mail.js';
import { ShareRepository } from './share.repository.js';

const shared = [CompanyMail, ShareRepository];

/** Approvals without HTTP: for the worker too. */
@Module({
  imports: [ProposalsStoreModule, PaymentsStoreModule],
  providers: shared,
  exports: [...shared, ProposalsStoreModule, PaymentsStoreModule],
})
export class ShareStoreModule {}
