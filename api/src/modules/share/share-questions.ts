import { Inject, Injectable } from '@nestjs/common';
import type { Guest } from '../../access/guest.js';
import { ENV } from '../../config/config.module.js';
import type { Env } from '../../config/env.js';
import { badInput, conflict, notFound } from '../../http/app-error.js';
import type { ShownRevision } from '../proposals/proposal-store.js';
import type { Question } from '../proposals/proposals.dto.js';
import type { RevisionDocument } from '../proposals/revision-document.js';
import { aboutOf, QuestionThreads } from '../questions/question-threads.js';
import { type QuestionRow, QuestionsRepository } from '../questions/questions.repository.js';
import { JobEvents } from '../timeline/job-events.repository.js';
import { CompanyMail } from './company-mail.js';
import { questionLetter } from './letters.js';
import type { Ask } from './share.dto.js';
import { jobProposalUrl } from './share-addresses.js';
import { ShownProposal } from './shown-proposal.js';

type Pin = Pick<QuestionRow, 'recordId' | 'sheetId' | 'x' | 'y'>;

/** What guests ask, pinned to what they see. Within the transaction of the request. */
@Injectable()
export class ShareQuestions {
  constructor(
    @Inject(ENV) private readonly env: Env,
    @Inject(ShownProposal) private readonly shown: ShownProposal,
    @Inject(QuestionsRepository) private readonly repository: QuestionsRepository,
    @Inject(QuestionThreads) private readonly threads: QuestionThreads,
    @Inject(CompanyMail) private readonly companyMail: CompanyMail,
    @Inject(JobEvents) private readonly events: JobEvents,
  ) {}

  /** @throws AppError 400 for a light or a point that is not on the page · 409 `withdrawn` */
  async ask(guest: Guest, input: Ask): Promise<Question> {
    const { companyId, proposalId } = guest;
    const shown = await this.shownToAsk(guest);
    const pin = pinOf(shown.document, input);
    const questionId = await this.repository.insert({
      companyId,
      proposalId,
      revisionId: shown.row.id,
      ...pin,
    });
    return this.say(guest, shown, questionId, input.text);
  }

  /** @throws AppError 404 for a question of another proposal · 409 `withdrawn` */
  async reply(guest: Guest, questionId: string, text: string): Promise<Question> {
    const shown = await this.shownToAsk(guest);
    const row = await this.repository.find(guest.companyId, questionId);
    if (row?.proposalId !== guest.proposalId) throw notFound('This question');
    // Something new was said: the company has to look at it again.
    await this.repository.setResolved(guest.companyId, questionId, null);
    return this.say(guest, shown, questionId, text);
  }

  private async shownToAsk(guest: Guest): Promise<ShownRevision> {
    const shown = await this.shown.of(guest);
    if (shown.row.withdrawnAt !== null)
      throw conflict(
        'withdrawn',
        'The company has taken this proposal back. Please call or write to it in another way.',
      );
    return shown;
  }

  private async say(
    guest: Guest,
    { row, document }: ShownRevision,
    questionId: string,
    text: string,
  ): Promise<Question> {
    const { companyId, jobId, email } = guest;
    const name = guest.name || 'Homeowner';
    await this.repository.addMessage({
      companyId,
      questionId,
      side: 'homeowner',
      authorId: null,
      authorName: name,
      text,
    });
    const question = await this.repository.find(companyId, questionId);
    if (!question) throw new Error(`The question ${questionId} is gone.`);
    const about = aboutOf(question, document.lights);
    await this.events.note({ companyId, jobId }, 'question-asked', { about }, { id: null, name });
    const said = { document, name, email, url: jobProposalUrl(this.env.PUBLIC_URL, jobId) };
    await this.companyMail.post(row, questionLetter(said, about, text));
    return this.threads.one(companyId, question);
  }
}

/** A light, a point of a sheet, or the whole. */
function pinOf({ lights, sheets }: RevisionDocument, { recordId, point }: Ask): Pin {
  if (recordId !== null && point !== null)
    throw badInput([
      { pointer: '/point', detail: 'A question is about a light or about a place, not both.' },
    ]);
  if (recordId !== null && !lights.some((light) => light.recordId === recordId))
    throw badInput([{ pointer: '/recordId', detail: 'This light is not part of the proposal.' }]);
  if (point === null) return { recordId, sheetId: null, x: null, y: null };
  const sheet = sheets.find(({ id }) => id === point.sheetId);
  if (!sheet)
    throw badInput([{ pointer: '/point/sheetId', detail: 'This picture is not part of the proposal.' }]);
  const { x, y, sheetId } = point;
  if (x < 0 || y < 0 || x > sheet.widthPx || y > sheet.heightPx)
    throw badInput([{ pointer: '/point', detail: 'This place lies beside the picture.' }]);
  return { recordId: null, sheetId, x, y };
}
