import { Injectable } from '@nestjs/common';
import type { Actor } from '../../access/actor.js';
import { AppError } from '../../http/app-error.js';
import type {
  Acceptance,
  AcceptFault,
  JobPricingAnswer,
  JobPricingEdit,
  Materials,
  QuoteAnswer,
} from './pricing.dto.js';

const notBuilt = () => new AppError(501, 'not-built', 'This is not built yet.');

@Injectable()
export class JobPricingService {
  async get(_actor: Actor, _jobId: string): Promise<JobPricingAnswer> {
    throw notBuilt();
  }

  async replace(_actor: Actor, _jobId: string, _input: JobPricingEdit): Promise<JobPricingAnswer> {
    throw notBuilt();
  }

  async quote(_actor: Actor, _jobId: string): Promise<QuoteAnswer> {
    throw notBuilt();
  }

  async materials(_actor: Actor, _jobId: string): Promise<Materials> {
    throw notBuilt();
  }

  async accept(_actor: Actor, _jobId: string, _input: AcceptFault): Promise<Acceptance> {
    throw notBuilt();
  }

  async withdrawAcceptance(_actor: Actor, _jobId: string, _acceptanceId: string): Promise<void> {
    throw notBuilt();
  }
}
