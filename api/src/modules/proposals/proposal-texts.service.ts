import { Injectable } from '@nestjs/common';
import type { Actor } from '../../access/actor.js';
import { AppError } from '../../http/app-error.js';
import type { ProposalTextsAnswer, ProposalTextsEdit } from './proposals.dto.js';

const notBuilt = () => new AppError(501, 'not-built', 'This is not built yet.');

@Injectable()
export class ProposalTextsService {
  async get(_actor: Actor): Promise<ProposalTextsAnswer> {
    throw notBuilt();
  }

  async replace(_actor: Actor, _input: ProposalTextsEdit): Promise<ProposalTextsAnswer> {
    throw notBuilt();
  }
}
