import { Inject, Injectable } from '@nestjs/common';
import { type Actor, demand } from '../../access/actor.js';
import { allows } from '../../access/permissions.js';
import { badInput, notFound } from '../../http/app-error.js';
import { jobStages } from '../jobs/jobs.dto.js';
import { type BookInForce, PriceBooks } from '../pricing/price-books.js';
import { RevisionViews } from '../proposals/views.js';
import { nextStep } from './next-step.js';
import { amountOf, isAboutMoney, sentenceForCrew, sentenceOf } from './sentences.js';
import type { Board, Numbers, NumbersQuery, Timeline } from './timeline.dto.js';
import { type SentProposal, TimelineRepository } from './timeline.repository.js';

const DAY_MS = 86_400_000;
const USUAL_DAYS = 365;

@Injectable()
export class TimelineService {
  constructor(
    @Inject(TimelineRepository) private readonly repository: TimelineRepository,
    @Inject(RevisionViews) private readonly views: RevisionViews,
    @Inject(PriceBooks) private readonly books: PriceBooks,
  ) {}

  async ofJob(actor: Actor, jobId: string): Promise<Timeline> {
    demand(actor, 'timeline.read');
    const job = await this.repository.job(actor.companyId, jobId);
    if (!job) throw notFound('This job');
    const seesMoney = allows(actor.role, 'prices.read');
    const events = await this.repository.events(actor.companyId, jobId);
    const items = events
      .filter(({ kind }) => seesMoney || !isAboutMoney(kind))
      .map(({ id, kind, actorName, data, createdAt }) => ({
        id,
        at: createdAt.toISOString(),
        kind,
        actor: actorName,
        sentence: seesMoney ? sentenceOf(kind, data) : sentenceForCrew(kind, data),
        amountMinor: seesMoney ? amountOf(data) : null,
      }));
    items.push({
      id: jobId,
      at: job.createdAt.toISOString(),
      kind: 'job-made',
      actor: '',
      sentence: `${job.name} began`,
      amountMinor: null,
    });
    const { currency, book } = await this.bookOf(actor);
    return { items, currency, locale: book.locale };
  }

  async board(actor: Actor): Promise<Board> {
    demand(actor, 'board.read');
    const seesMoney = allows(actor.role, 'prices.read');
    const counts = await this.repository.countsByStage(actor.companyId);
    const rows = await this.repository.cards(actor.companyId);
    const proposals = rows.flatMap(({ proposalId }) => proposalId ?? []);
    const states = await this.views.states(actor.companyId, proposals);
    const { currency, book } = await this.bookOf(actor);
    return {
      currency,
      locale: book.locale,
      columns: jobStages.map((stage) => ({
        stage,
        count: counts.get(stage) ?? 0,
        cards: rows
          .filter((row) => row.stage === stage)
          .map((row) => {
            const proposal = states.get(row.proposalId ?? '') ?? null;
            return {
              jobId: row.jobId,
              name: row.name,
              client: row.client,
              stage,
              proposal,
              next: nextStep(row, proposal),
              openQuestions: row.openQuestions,
              totalMinor: seesMoney ? (row.agreedMinor ?? row.offeredMinor) : null,
              outstandingMinor: seesMoney ? row.outstandingMinor : null,
              updatedAt: row.updatedAt.toISOString(),
            };
          }),
      })),
    };
  }

  async numbers(actor: Actor, query: NumbersQuery): Promise<Numbers> {
    demand(actor, 'numbers.read');
    const to = query.to ?? dayOf(new Date());
    const from = query.from ?? dayOf(new Date(Date.parse(to) - USUAL_DAYS * DAY_MS));
    if (from > to) throw badInput([{ pointer: '/from', detail: 'The period ends before it begins.' }]);
    const end = Date.parse(to) + DAY_MS;
    const sent = (await this.repository.sentProposals(actor.companyId)).filter(
      ({ firstSentAt }) => firstSentAt.getTime() >= Date.parse(from) && firstSentAt.getTime() < end,
    );
    const won = sent.filter(({ approvedAt }) => approvedAt !== null);
    const declined = sent.filter(({ approvedAt, declined: no }) => approvedAt === null && no);
    const { currency, book } = await this.bookOf(actor);
    return {
      currency,
      locale: book.locale,
      from,
      to,
      sent: sent.length,
      won: won.length,
      declined: declined.length,
      waiting: sent.length - won.length - declined.length,
      wonShare: sent.length === 0 ? null : won.length / sent.length,
      sentMinor: sum(sent.map(({ offeredMinor }) => offeredMinor)),
      wonMinor: sum(won.map(({ agreedMinor }) => agreedMinor ?? 0)),
      medianDaysToYes: median(won.map(daysToYes)),
      ...(await this.repository.money(actor.companyId)),
    };
  }

  private async bookOf(actor: Actor): Promise<BookInForce> {
    const inForce = await this.books.inForce(actor.companyId);
    if (!inForce) throw notFound('This company');
    return inForce;
  }
}

const dayOf = (date: Date): string => date.toISOString().slice(0, 10);
const sum = (amounts: readonly number[]): number => amounts.reduce((total, amount) => total + amount, 0);

const daysToYes = ({ firstSentAt, approvedAt }: SentProposal): number =>
  ((approvedAt?.getTime() ?? 0) - firstSentAt.getTime()) / DAY_MS;

function median(values: readonly number[]): number | null {
  if (values.length === 0) return null;
  const sorted = [...values].sort((a, b) => a - b);
  const middle = Math.floor(sorted.length / 2);
  const [low = 0, high = 0] =
    sorted.length % 2 === 0 ? sorted.slice(middle - 1, middle + 1) : [sorted[middle], sorted[middle]];
  return Math.round(((low + high) / 2) * 10) / 10;
}
