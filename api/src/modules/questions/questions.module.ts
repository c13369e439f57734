import { Module } from '@nestjs/common';
import { ProposalsStoreModule } from '../proposals/proposals-store.module.js';
import { QuestionsController } from './questions.controller.js';
import { QuestionsService } from './questions.service.js';
import { QuestionsStoreModule } from './questions-store.module.js';

/** Questions of homeowners, on the company’s side. */
@Module({
  imports: [QuestionsStoreModule, ProposalsStoreModule],
  controllers: [QuestionsController],
  providers: [QuestionsService],
})
export class QuestionsModule {}
