import { formatMoney } from '@lampwright/geometry/price';
import { Inject, Injectable } from '@nestjs/common';
import { type Actor, demand } from '../../access/actor.js';
import { FORMER_MEMBER, UsersRepository } from '../../access/users.repository.js';
import { Database } from '../../database/database.js';
import { badInput, conflict, notFound } from '../../http/app-error.js';
import type { StoredFile } from '../../http/send-file.js';
import { CardService } from '../../ports/payments/card-service.js';
import { Queue } from '../../ports/queue/queue.js';
import { JobsRepository } from '../jobs/jobs.repository.js';
import { PriceBooks } from '../pricing/price-books.js';
import { type EventActor, JobEvents } from '../timeline/job-events.repository.js';
import { AgreementsRepository } from './agreements.repository.js';
import { bookCsv } from './export.js';
import { type Balance, balanceOf, refundedOf } from './ledger.js';
import { MoneyDocumentsRepository } from './money-documents.repository.js';
import { MoneyFiles } from './money-files.js';
import { MoneyPapers } from './money-papers.js';
import type { JobPayments, NewRefund, PaymentsExportQuery, RecordPayment } from './payments.dto.js';
import {
  type DueRow,
  type PaymentOfJob,
  PaymentsRepository,
  type ProposalOfMoney,
  type RefundRow,
} from './payments.repository.js';
import { Settlements } from './settlements.js';

const DAY_MILLISECONDS = 24 * 3_600_000;

interface Money {
  readonly proposal: ProposalOfMoney;
  readonly dues: readonly DueRow[];
  readonly payments: readonly PaymentOfJob[];
  readonly refunds: readonly RefundRow[];
  readonly balance: Balance;
}

/** The company's side of payments. */
@Injectable()
export class PaymentsService {
  constructor(
    @Inject(Database) private readonly database: Database,
    @Inject(PaymentsRepository) private readonly repository: PaymentsRepository,
    @Inject(AgreementsRepository) private readonly agreements: AgreementsRepository,
    @Inject(MoneyDocumentsRepository) private readonly documents: MoneyDocumentsRepository,
    @Inject(MoneyFiles) private readonly files: MoneyFiles,
    @Inject(MoneyPapers) private readonly papers: MoneyPapers,
    @Inject(Settlements) private readonly settlements: Settlements,
    @Inject(JobsRepository) private readonly jobs: JobsRepository,
    @Inject(PriceBooks) private readonly books: PriceBooks,
    @Inject(UsersRepository) private readonly users: UsersRepository,
    @Inject(JobEvents) private readonly events: JobEvents,
    @Inject(CardService) private readonly cards: CardService,
    @Inject(Queue) private readonly queue: Queue,
  ) {}

  async ofJob(actor: Actor, jobId: string): Promise<JobPayments> {
    demand(actor, 'payments.read');
    return this.read(actor.companyId, jobId);
  }

  /** Asks for a due: the invoice goes out by mail. @throws AppError 409 when it was asked for, or is paid */
  async request(actor: Actor, jobId: string, dueId: string): Promise<JobPayments> {
    demand(actor, 'payments.record');
    return this.database.transaction(async () => {
      const { proposal, ...money } = await this.hold(actor.companyId, jobId);
      const due = dueOf(money, dueId);
      if (due.requestedAt !== null)
        throw conflict('already-requested', 'This was asked for already; the invoice has gone out.');
      const amountMinor = outstandingOf(money, dueId);
      if (amountMinor === 0) throw conflict('nothing-owed', 'There is nothing left to ask for here.');
      const requestedAt = await this.repository.now();
      await this.repository.updateDue(actor.companyId, dueId, { requestedAt });
      const { name } = due;
      await this.events.note(proposal, 'payment-requested', { name, amountMinor }, await this.named(actor));
      await this.papers.invoice(proposal, due);
      return this.read(actor.companyId, jobId);
    });
  }

  /** Records what came in by other ways than by card. @throws AppError 409 for more than is owed */
  async record(actor: Actor, jobId: string, dueId: string, input: RecordPayment): Promise<JobPayments> {
    demand(actor, 'payments.record');
    const { companyId, userId } = actor;
    // A day ahead, since it may be tomorrow already where the company is.
    if (Date.parse(input.receivedOn) > Date.now() + DAY_MILLISECONDS)
      throw badInput([{ pointer: '/receivedOn', detail: 'This day is still to come.' }]);
    return this.database.transaction(async () => {
      const { proposal, ...money } = await this.hold(companyId, jobId);
      const due = dueOf(money, dueId);
      const owed = outstandingOf(money, dueId);
      if (input.amountMinor > owed)
        throw conflict(
          'more-than-owed',
          `Only ${await this.written(proposal, owed, due.currency)} is outstanding here.`,
          { outstandingMinor: owed },
        );
      const payment = await this.repository.insertPayment({
        companyId,
        proposalId: proposal.proposalId,
        dueId,
        method: input.method,
        status: 'succeeded',
        amountMinor: input.amountMinor,
        currency: due.currency,
        receivedOn: input.receivedOn,
        note: input.note,
        recordedBy: userId,
        settledAt: await this.repository.now(),
      });
      await this.settlements.received(proposal, payment, due, await this.named(actor));
      // Whoever is at the card page would pay what is not owed any more.
      for (const open of money.payments)
        if (open.dueId === dueId && open.status === 'open')
          await this.queue.send('card-checkout.end', { companyId, paymentId: open.id });
      return this.read(companyId, jobId);
    });
  }

  /**
   * Pays back. By card it is under way until the card service has confirmed it; in other ways the company has
   * done it by hand, and it is recorded here.
   * @throws AppError 409 for more than was paid and not paid back yet
   */
  async refund(actor: Actor, jobId: string, paymentId: string, input: NewRefund): Promise<JobPayments> {
    demand(actor, 'payments.refund');
    const { companyId, userId } = actor;
    return this.database.transaction(async () => {
      const { proposal, payments, refunds } = await this.hold(companyId, jobId);
      const payment = payments.find(({ id }) => id === paymentId);
      if (!payment) throw notFound('This payment');
      if (payment.status !== 'succeeded')
        throw conflict('not-paid', 'Nothing has come in with this payment, so nothing can go back.');
      const byCard = payment.method === 'card';
      if (byCard && !this.cards.offered)
        throw conflict(
          'no-card-payment',
          'No card service is set up, so nothing can be paid back to a card.',
        );
      const left = payment.amountMinor - refundedOf(paymentId, refunds);
      if (input.amountMinor > left)
        throw conflict(
          'more-than-paid',
          `Only ${await this.written(proposal, left, payment.currency)} of this payment is left to pay back.`,
          { leftMinor: left },
        );
      const refund = await this.repository.insertRefund({
        companyId,
        paymentId,
        amountMinor: input.amountMinor,
        reason: input.reason,
        status: 'pending',
        createdBy: userId,
      });
      if (byCard) await this.queue.send('card-refund.send', { companyId, refundId: refund.id });
      else await this.settlements.refundSucceeded(proposal, refund, await this.named(actor));
      return this.read(companyId, jobId);
    });
  }

  async documentPdf(actor: Actor, jobId: string, documentId: string): Promise<StoredFile> {
    demand(actor, 'payments.read');
    const proposal = await this.repository.ofJob(actor.companyId, jobId);
    const rows = proposal ? await this.documents.ofProposal(proposal) : [];
    const row = rows.find(({ id }) => id === documentId);
    const file = row ? this.files.of(row) : null;
    if (!file) throw notFound('This paper');
    return file;
  }

  /** Invoices, receipts and refunds of the company as CSV, by the days (UTC) on which they were numbered. */
  async export(actor: Actor, { from, to }: PaymentsExportQuery): Promise<string> {
    demand(actor, 'payments.export');
    if (from !== undefined && to !== undefined && from > to)
      throw badInput([{ pointer: '/to', detail: 'The last day is before the first.' }]);
    const begin = from === undefined ? null : new Date(from);
    const end = to === undefined ? null : new Date(Date.parse(to) + DAY_MILLISECONDS);
    return bookCsv(await this.documents.book(actor.companyId, begin, end));
  }

  /** @throws AppError 404 */
  private async hold(companyId: string, jobId: string): Promise<Money> {
    const found = await this.repository.ofJob(companyId, jobId);
    const proposal = found && (await this.repository.lock(found));
    if (!proposal) throw notFound('This payment');
    return this.moneyOf(proposal);
  }

  private async moneyOf(proposal: ProposalOfMoney): Promise<Money> {
    const dues = await this.repository.dues(proposal);
    const payments = await this.repository.payments(proposal);
    const refunds = await this.repository.refunds(proposal);
    return { proposal, dues, payments, refunds, balance: balanceOf(dues, payments, refunds) };
  }

  private async read(companyId: string, jobId: string): Promise<JobPayments> {
    if (!(await this.jobs.find(companyId, jobId))) throw notFound('This job');
    const proposal = await this.repository.ofJob(companyId, jobId);
    const agreement = proposal && (await this.agreements.newest(proposal));
    if (!proposal || !agreement) return this.nothing(companyId);
    const { dues, payments, refunds, balance } = await this.moneyOf(proposal);
    const documents = await this.documents.ofProposal(proposal);
    return {
      currency: agreement.document.currency,
      locale: agreement.document.locale,
      agreedMinor: balance.agreedMinor,
      paidMinor: balance.paidMinor,
      outstandingMinor: balance.outstandingMinor,
      creditMinor: balance.creditMinor,
      dues: dues.map(({ id, name, due, amountMinor, reducedMinor, requestedAt }, i) => ({
        id,
        name,
        due,
        amountMinor,
        reducedMinor,
        paidMinor: balance.dues[i]?.paidMinor ?? 0,
        outstandingMinor: balance.dues[i]?.outstandingMinor ?? 0,
        requestedAt: requestedAt?.toISOString() ?? null,
      })),
      payments: payments.map((payment) => ({
        id: payment.id,
        dueId: payment.dueId,
        method: payment.method,
        status: payment.status,
        amountMinor: payment.amountMinor,
        refundedMinor: refundedOf(payment.id, refunds),
        receivedOn: payment.receivedOn,
        note: payment.note,
        recordedBy: payment.recordedByName,
        createdAt: payment.createdAt.toISOString(),
        settledAt: payment.settledAt?.toISOString() ?? null,
      })),
      refunds: refunds.map(({ id, paymentId, amountMinor, reason, status, createdAt }) => ({
        id,
        paymentId,
        amountMinor,
        reason,
        status,
        createdAt: createdAt.toISOString(),
      })),
      documents: documents.map(({ id, kind, number, amountMinor, createdAt, mailedAt, pdfKey }) => ({
        id,
        kind,
        number,
        amountMinor,
        createdAt: createdAt.toISOString(),
        mailedAt: mailedAt?.toISOString() ?? null,
        pdfUrl: pdfKey === null ? null : `/api/jobs/${jobId}/money-documents/${id}/pdf`,
      })),
    };
  }

  /** Before anything was agreed. */
  private async nothing(companyId: string): Promise<JobPayments> {
    const book = await this.books.inForce(companyId);
    if (!book) throw notFound('This job');
    return {
      currency: book.currency,
      locale: book.book.locale,
      agreedMinor: 0,
      paidMinor: 0,
      outstandingMinor: 0,
      creditMinor: 0,
      dues: [],
      payments: [],
      refunds: [],
      documents: [],
    };
  }

  private async written(proposal: ProposalOfMoney, amountMinor: number, currency: string): Promise<string> {
    const agreement = await this.agreements.newest(proposal);
    return formatMoney(amountMinor, currency, agreement?.document.locale ?? 'en-US');
  }

  private async named({ userId }: Actor): Promise<EventActor> {
    return { id: userId, name: (await this.users.find(userId))?.name ?? FORMER_MEMBER };
  }
}

/** @throws AppError 404 */
function dueOf({ dues }: Pick<Money, 'dues'>, dueId: string): DueRow {
  const due = dues.find(({ id }) => id === dueId);
  if (!due) throw notFound('This payment');
  return due;
}

const outstandingOf = ({ balance }: Pick<Money, 'balance'>, dueId: string): number =>
  balance.dues.find(({ id }) => id === dueId)?.outstandingMinor ?? 0;
