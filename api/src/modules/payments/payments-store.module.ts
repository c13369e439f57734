import { Module } from '@nestjs/common';
import { NumberingModule } from '../numbering/numbering.module.js';
import { TimelineStoreModule } from '../timeline/timeline-store.module.js';
import { AgreementsRepository } from './agreements.repository.js';
import { CardCheckouts } from './card-checkouts.js';
import { CardRefunds } from './card-refunds.js';
import { Dues } from './dues.js';
import { MoneyDocumentsRepository } from './money-documents.repository.js';
import { MoneyFiles } from './money-files.js';
import { MoneyPapers } from './money-papers.js';
import { PaymentsRepository } from './payments.repository.js';
import { Settlements } from './settlements.js';

const shared = [
  AgreementsRepository,
  CardCheckouts,
  CardRefunds,
  Dues,
  MoneyDocumentsRepository,
  MoneyFiles,
  MoneyPapers,
  PaymentsRepository,
  Settlements,
];

/** Dues and their papers, without HTTP: for approvals, the homeowner's page and the worker. */
@Module({
  imports: [NumberingModule, TimelineStoreModule],
  providers: shared,
  exports: shared,
})
export class PaymentsStoreModule {}
