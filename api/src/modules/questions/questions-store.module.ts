import { Module } from '@nestjs/common';
import { QuestionThreads } from './question-threads.js';
import { QuestionsRepository } from './questions.repository.js';

/** Questions without HTTP: for the homeowner's page too. */
@Module({
  providers: [QuestionsRepository, QuestionThreads],
  exports: [QuestionsRepository, QuestionThreads],
})
export class QuestionsStoreModule {}
