import { Injectable } from '@nestjs/common';
import type { Actor } from '../../access/actor.js';
import { AppError } from '../../http/app-error.js';
import type { NewMessage, Question, Questions } from '../proposals/proposals.dto.js';

const notBuilt = () => new AppError(501, 'not-built', 'This is not built yet.');

@Injectable()
export class QuestionsService {
  async list(_actor: Actor, _jobId: string): Promise<Questions> {
    throw notBuilt();
  }

  async answer(_actor: Actor, _jobId: string, _questionId: string, _input: NewMessage): Promise<Question> {
    throw notBuilt();
  }

  async resolve(_actor: Actor, _jobId: string, _questionId: string): Promise<Question> {
    throw notBuilt();
  }

  async reopen(_actor: Actor, _jobId: string, _questionId: string): Promise<Question> {
    throw notBuilt();
  }
}
