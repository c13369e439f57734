import { Module } from '@nestjs/common';
import { ProposalTextsController } from './proposal-texts.controller.js';
import { ProposalTextsService } from './proposal-texts.service.js';
import { ProposalsController } from './proposals.controller.js';
import { ProposalsService } from './proposals.service.js';

/** Proposals over HTTP. */
@Module({
  controllers: [ProposalsController, ProposalTextsController],
  providers: [ProposalsService, ProposalTextsService],
})
export class ProposalsModule {}
