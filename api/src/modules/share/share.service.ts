import { Inject, Injectable } from '@nestjs/common';
import type { Guest } from '../../access/guest.js';
import { ENV } from '../../config/config.module.js';
import type { Env } from '../../config/env.js';
import { Database } from '../../database/database.js';
import { notFound } from '../../http/app-error.js';
import type { StoredFile } from '../../http/send-file.js';
import { Dues } from '../payments/dues.js';
import { differencesOf } from '../proposals/differences.js';
import { picturedSheets } from '../proposals/pictures.js';
import { type ApprovedRevision, ProposalStore, type ShownRevision } from '../proposals/proposal-store.js';
import type { NewMessage, Question } from '../proposals/proposals.dto.js';
import type { Differences } from '../proposals/revision-document.js';
import { QuestionThreads } from '../questions/question-threads.js';
import { JobEvents } from '../timeline/job-events.repository.js';
import { Answers } from './answers.js';
import type { GuestCaller } from './guest-caller.js';
import { sentencesOf } from './sentences.js';
import type { Approve, Ask, Checkout, Decline, SharedNight, SharedPage } from './share.dto.js';
import { ShareRepository } from './share.repository.js';
import { backUrl, LIGHT_PICTURE_MEDIA, lightPictureUrl, pictureUrl } from './share-addresses.js';
import { ShareNights } from './share-nights.js';
import { SharePapers } from './share-papers.js';
import { ShareQuestions } from './share-questions.js';
import { ShownProposal } from './shown-proposal.js';

/** What a homeowner sees and does by a link. Reading writes nothing. */
@Injectable()
export class ShareService {
  constructor(
    @Inject(ENV) private readonly env: Env,
    @Inject(Database) private readonly database: Database,
    @Inject(ShownProposal) private readonly shown: ShownProposal,
    @Inject(ProposalStore) private readonly store: ProposalStore,
    @Inject(ShareRepository) private readonly repository: ShareRepository,
    @Inject(QuestionThreads) private readonly questions: QuestionThreads,
    @Inject(ShareQuestions) private readonly asking: ShareQuestions,
    @Inject(Answers) private readonly answers: Answers,
    @Inject(SharePapers) private readonly papers: SharePapers,
    @Inject(ShareNights) private readonly nights: ShareNights,
    @Inject(Dues) private readonly dues: Dues,
    @Inject(JobEvents) private readonly events: JobEvents,
  ) {}

  async page(guest: Guest, linkId: string): Promise<SharedPage> {
    demandOwn(guest, linkId);
    const { companyId, proposalId } = guest;
    const shown = await this.shown.of(guest);
    const { row, document } = shown;
    const approved = await this.store.approved(companyId, proposalId);
    const nights = this.nights.shown(shown);
    const { plan: _plan, evening: _evening, ...shownDocument } = document;
    return {
      ...(await this.shown.standingOf(shown)),
      recipient: guest.name,
      revisionId: row.id,
      document: shownDocument,
      hash: row.hash,
      pictures: picturedSheets(row, document).map(({ id, widthPx, heightPx }) => ({
        sheetId: id,
        url: pictureUrl(linkId, id),
        light: { url: lightPictureUrl(linkId, id), media: LIGHT_PICTURE_MEDIA },
        widthPx,
        heightPx,
        night: nights.get(id) ?? null,
      })),
      differences: approved && differencesFrom(approved, shown),
      approval: approved && {
        typedName: approved.approval.typedName,
        at: approved.approval.approvedAt.toISOString(),
        groups: approved.approval.groups as string[],
        totalMinor: approved.approval.totalMinor,
        revision: approved.row.revision,
      },
      sentences: sentencesOf(document),
      questions: await this.questions.ofProposal(companyId, proposalId),
      dues: await this.dues.shared(companyId, proposalId),
      papers: await this.papers.list(guest, shown),
    };
  }

  async night(guest: Guest, linkId: string): Promise<SharedNight> {
    demandOwn(guest, linkId);
    return this.nights.of(await this.shown.of(guest));
  }

  /** A person looks at it: told by their gesture, since programs open links too. */
  async opened(guest: Guest, linkId: string): Promise<void> {
    demandOwn(guest, linkId);
    const { companyId, jobId, name } = guest;
    await this.database.transaction(async () => {
      const { row } = await this.shown.of(guest);
      const first = await this.repository.seen(companyId, linkId);
      if (!first) return;
      const { revision } = row;
      await this.events.note({ companyId, jobId }, 'proposal-opened', { revision }, { id: null, name });
    });
  }

  async picture(guest: Guest, linkId: string, sheetId: string, light: boolean): Promise<StoredFile> {
    demandOwn(guest, linkId);
    return this.papers.picture(guest, await this.shown.of(guest), sheetId, light);
  }

  async paper(guest: Guest, linkId: string, paperId: string): Promise<StoredFile> {
    demandOwn(guest, linkId);
    return this.papers.file(guest, await this.shown.of(guest), paperId);
  }

  async ask(guest: Guest, linkId: string, input: Ask): Promise<Question> {
    demandOwn(guest, linkId);
    return this.database.transaction(() => this.asking.ask(guest, input));
  }

  async reply(guest: Guest, linkId: string, questionId: string, { text }: NewMessage): Promise<Question> {
    demandOwn(guest, linkId);
    return this.database.transaction(() => this.asking.reply(guest, questionId, text));
  }

  async approve(guest: Guest, linkId: string, input: Approve, caller: GuestCaller): Promise<SharedPage> {
    demandOwn(guest, linkId);
    return this.database.transaction(async () => {
      await this.answers.approve(guest, input, caller);
      return this.page(guest, linkId);
    });
  }

  async decline(guest: Guest, linkId: string, input: Decline): Promise<SharedPage> {
    demandOwn(guest, linkId);
    return this.database.transaction(async () => {
      await this.answers.decline(guest, input);
      return this.page(guest, linkId);
    });
  }

  /** The card service brings the payer back to the page that they left from, and learns no token. */
  async checkout(guest: Guest, linkId: string, dueId: string): Promise<Checkout> {
    demandOwn(guest, linkId);
    return this.dues.checkout(guest, dueId, backUrl(this.env.PUBLIC_URL, linkId));
  }
}

/** The guard has compared them already; nothing here hangs on that alone. */
function demandOwn(guest: Guest, linkId: string): void {
  if (guest.linkId !== linkId) throw notFound('This proposal');
}

/** Null where what is shown is what was approved. The sum before is what was agreed, of the parts taken. */
function differencesFrom(approved: ApprovedRevision, shown: ShownRevision): Differences | null {
  if (approved.row.id === shown.row.id) return null;
  return {
    ...differencesOf(approved.document, shown.document),
    wasTotalMinor: approved.approval.totalMinor,
  };
}
