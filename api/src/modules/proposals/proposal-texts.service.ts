import { Inject, Injectable } from '@nestjs/common';
import { type Actor, demand } from '../../access/actor.js';
import { conflict, notFound } from '../../http/app-error.js';
import { CompanyTexts } from './company-texts.js';
import type { ProposalTextsAnswer, ProposalTextsEdit } from './proposals.dto.js';

@Injectable()
export class ProposalTextsService {
  constructor(@Inject(CompanyTexts) private readonly texts: CompanyTexts) {}

  async get(actor: Actor): Promise<ProposalTextsAnswer> {
    demand(actor, 'proposals.read');
    return this.present(actor);
  }

  async replace(actor: Actor, { baseVersion, texts }: ProposalTextsEdit): Promise<ProposalTextsAnswer> {
    demand(actor, 'proposals.edit');
    const saved = await this.texts.save(actor.companyId, baseVersion, texts);
    if (saved) return saved;
    throw conflict(
      'texts-conflict',
      'Somebody else has changed the texts in the meantime. Here they are as they are now.',
      { ...(await this.present(actor)) },
    );
  }

  private async present(actor: Actor): Promise<ProposalTextsAnswer> {
    const inForce = await this.texts.inForce(actor.companyId);
    if (!inForce) throw notFound('This company');
    return inForce;
  }
}
