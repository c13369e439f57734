import { Module } from '@nestjs/common';
import { QuestionsStoreModule } from '../questions/questions-store.module.js';
import { Answers } from './answers.js';
import { ShareController } from './share.controller.js';
import { ShareService } from './share.service.js';
import { ShareNights } from './share-nights.js';
import { SharePageFacts } from './share-page-facts.js';
import { SharePapers } from './share-papers.js';
import { ShareQuestions } from './share-questions.js';
import { ShareStoreModule } from './share-store.module.js';
import { ShownProposal } from './shown-proposal.js';

/** What a homeowner sees and does by a link. */
@Module({
  imports: [ShareStoreModule, QuestionsStoreModule],
  controllers: [ShareController],
  providers: [Answers, ShareNights, SharePageFacts, SharePapers, ShareQuestions, ShareService, ShownProposal],
})
export class ShareModule {}
