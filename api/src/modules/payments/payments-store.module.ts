import { Module } from '@nestjs/common';
import { Dues } from './dues.js';

/** Dues and their papers, without HTTP: for approvals, the homeowner's page and the worker. */
@Module({
  providers: [Dues],
  exports: [Dues],
})
export class PaymentsStoreModule {}
