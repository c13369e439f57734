import { Inject, Injectable } from '@nestjs/common';
import { type Actor, demand } from '../../access/actor.js';
import { Database } from '../../database/database.js';
import { notFound } from '../../http/app-error.js';
import { Outbox } from '../../ports/mail/outbox.js';
import { answerLetter } from '../proposals/letters.js';
import { isLive, ProposalLinks } from '../proposals/links.js';
import { PartiesRepository } from '../proposals/parties.repository.js';
import { ProposalStore } from '../proposals/proposal-store.js';
import type { NewMessage, Question, Questions } from '../proposals/proposals.dto.js';
import { ProposalsRepository } from '../proposals/proposals.repository.js';
import { JobEvents } from '../timeline/job-events.repository.js';
import { aboutOf, QuestionThreads } from './question-threads.js';
import { type QuestionRow, QuestionsRepository } from './questions.repository.js';

@Injectable()
export class QuestionsService {
  constructor(
    @Inject(Database) private readonly database: Database,
    @Inject(QuestionsRepository) private readonly repository: QuestionsRepository,
    @Inject(QuestionThreads) private readonly threads: QuestionThreads,
    @Inject(ProposalsRepository) private readonly proposals: ProposalsRepository,
    @Inject(ProposalStore) private readonly store: ProposalStore,
    @Inject(ProposalLinks) private readonly links: ProposalLinks,
    @Inject(PartiesRepository) private readonly parties: PartiesRepository,
    @Inject(JobEvents) private readonly events: JobEvents,
    @Inject(Outbox) private readonly outbox: Outbox,
  ) {}

  async list(actor: Actor, jobId: string): Promise<Questions> {
    demand(actor, 'proposals.read');
    if (!(await this.proposals.jobExists(actor.companyId, jobId))) throw notFound('This job');
    const proposal = await this.repository.proposalOfJob(actor.companyId, jobId);
    return { items: proposal ? await this.threads.ofProposal(actor.companyId, proposal.id) : [] };
  }

  /** Answers on the page and by mail to everybody who holds a live link. */
  async answer(actor: Actor, jobId: string, questionId: string, { text }: NewMessage): Promise<Question> {
    demand(actor, 'questions.answer');
    const { companyId } = actor;
    const question = await this.questionOf(actor, jobId, questionId);
    const asked = (await this.threads.one(companyId, question)).messages
      .filter(({ side }) => side === 'homeowner')
      .at(-1);
    const shown =
      (await this.store.newestShown(companyId, question.proposalId)) ??
      (await this.store.revision(companyId, question.revisionId));
    if (!shown) throw notFound('This question');
    const { name } = await this.parties.person(actor.userId);
    await this.database.transaction(async () => {
      await this.repository.addMessage({
        companyId,
        questionId,
        side: 'company',
        authorId: actor.userId,
        authorName: name,
        text,
      });
      const now = new Date();
      for (const link of await this.proposals.links(companyId, [question.proposalId])) {
        if (!isLive(link, now)) continue;
        const letter = answerLetter(shown.document, this.links.urlOf(link), asked?.text ?? '', text);
        await this.outbox.post(companyId, link.email, letter);
      }
      const about = aboutOf(question, shown.document.lights);
      const person = { id: actor.userId, name };
      await this.events.note({ companyId, jobId }, 'question-answered', { about }, person);
    });
    return this.threads.one(companyId, question);
  }

  async resolve(actor: Actor, jobId: string, questionId: string): Promise<Question> {
    return this.settle(actor, jobId, questionId, new Date());
  }

  async reopen(actor: Actor, jobId: string, questionId: string): Promise<Question> {
    return this.settle(actor, jobId, questionId, null);
  }

  private async settle(
    actor: Actor,
    jobId: string,
    questionId: string,
    resolvedAt: Date | null,
  ): Promise<Question> {
    demand(actor, 'questions.answer');
    const question = await this.questionOf(actor, jobId, questionId);
    await this.repository.setResolved(actor.companyId, questionId, resolvedAt);
    return this.threads.one(actor.companyId, { ...question, resolvedAt });
  }

  private async questionOf({ companyId }: Actor, jobId: string, questionId: string): Promise<QuestionRow> {
    const proposal = await this.repository.proposalOfJob(companyId, jobId);
    const question = proposal && (await this.repository.find(companyId, questionId));
    if (!question || question.proposalId !== proposal.id) throw notFound('This question');
    return question;
  }
}
