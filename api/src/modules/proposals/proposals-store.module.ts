import { Module } from '@nestjs/common';
import { TimelineStoreModule } from '../timeline/timeline-store.module.js';
import { ProposalStore } from './proposal-store.js';
import { ProposalsRepository } from './proposals.repository.js';

/** Reading proposals, without HTTP: for the homeowner's page, payments and the worker. */
@Module({
  imports: [TimelineStoreModule],
  providers: [ProposalsRepository, ProposalStore],
  exports: [ProposalsRepository, ProposalStore],
})
export class ProposalsStoreModule {}
