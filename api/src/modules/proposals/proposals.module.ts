import { Module } from '@nestjs/common';
import { ProposalTextsController } from './proposal-texts.controller.js';
import { ProposalTextsService } from './proposal-texts.service.js';
import { ProposalsController } from './proposals.controller.js';
import { ProposalsService } from './proposals.service.js';
import { ProposalsStoreModule } from './proposals-store.module.js';

/** Proposals over HTTP. */
@Module({
  imports: [ProposalsStoreModule],
  controllers: [ProposalsController, ProposalTextsController],
  providers: [ProposalsService, ProposalTextsService],
})
export class ProposalsModule {}
