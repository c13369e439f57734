import { Injectable } from '@nestjs/common';
import type { Actor } from '../../access/actor.js';
import { AppError } from '../../http/app-error.js';
import type { StoredFile } from '../../http/send-file.js';
import type { JobWords, Proposal, ProposalLink, Revision, RevisionDetail, Send } from './proposals.dto.js';

const notBuilt = () => new AppError(501, 'not-built', 'This is not built yet.');

@Injectable()
export class ProposalsService {
  async get(_actor: Actor, _jobId: string): Promise<Proposal> {
    throw notBuilt();
  }

  async setWords(_actor: Actor, _jobId: string, _input: JobWords): Promise<Proposal> {
    throw notBuilt();
  }

  async freeze(_actor: Actor, _jobId: string): Promise<Revision> {
    throw notBuilt();
  }

  async detail(_actor: Actor, _jobId: string, _revisionId: string): Promise<RevisionDetail> {
    throw notBuilt();
  }

  async pdf(_actor: Actor, _jobId: string, _revisionId: string): Promise<StoredFile> {
    throw notBuilt();
  }

  async signedPdf(_actor: Actor, _jobId: string, _revisionId: string): Promise<StoredFile> {
    throw notBuilt();
  }

  async send(_actor: Actor, _jobId: string, _revisionId: string, _input: Send): Promise<Revision> {
    throw notBuilt();
  }

  async withdraw(_actor: Actor, _jobId: string, _revisionId: string): Promise<Revision> {
    throw notBuilt();
  }

  async release(_actor: Actor, _jobId: string, _revisionId: string): Promise<Revision> {
    throw notBuilt();
  }

  async resend(_actor: Actor, _jobId: string, _linkId: string): Promise<ProposalLink> {
    throw notBuilt();
  }

  async revoke(_actor: Actor, _jobId: string, _linkId: string): Promise<ProposalLink> {
    throw notBuilt();
  }
}
