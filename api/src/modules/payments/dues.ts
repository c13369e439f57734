import type { StageAmount } from '@lampwright/geometry/price';
import { Inject, Injectable } from '@nestjs/common';
import type { StoredFile } from '../../http/send-file.js';
import { CardService } from '../../ports/payments/card-service.js';
import { Queue } from '../../ports/queue/queue.js';
import type { SharedPage } from '../share/share.dto.js';
import { JobEvents } from '../timeline/job-events.repository.js';
import { CardCheckouts, type Payer } from './card-checkouts.js';
import { balanceOf, changeTo } from './ledger.js';
import { MoneyDocumentsRepository } from './money-documents.repository.js';
import { MoneyFiles } from './money-files.js';
import { paperName } from './money-letters.js';
import { MoneyPapers } from './money-papers.js';
import { PaymentsRepository, type ProposalOfMoney } from './payments.repository.js';

export interface ApprovedPrice {
  readonly companyId: string;
  readonly proposalId: string;
  readonly approvalId: string;
  readonly currency: string;
  readonly totalMinor: number;
  /** Of the approved combination; they add up to the total. */
  readonly stages: readonly StageAmount[];
  /** What was agreed before, where this approves a change order; null for the first approval. */
  readonly before: { readonly totalMinor: number; readonly revision: number } | null;
  readonly revision: number;
}

/** What the ids of papers about money begin with. */
const PAPER = 'money-';

/** What homeowners owe, stage by stage. */
@Injectable()
export class Dues {
  constructor(
    @Inject(PaymentsRepository) private readonly repository: PaymentsRepository,
    @Inject(MoneyDocumentsRepository) private readonly documents: MoneyDocumentsRepository,
    @Inject(MoneyFiles) private readonly files: MoneyFiles,
    @Inject(MoneyPapers) private readonly moneyPapers: MoneyPapers,
    @Inject(CardCheckouts) private readonly checkouts: CardCheckouts,
    @Inject(CardService) private readonly cards: CardService,
    @Inject(JobEvents) private readonly events: JobEvents,
    @Inject(Queue) private readonly queue: Queue,
  ) {}

  /**
   * Makes the dues of an approval, within its transaction; the one due at approval is asked for at once.
   *
   * A change order that costs more adds one due over the difference at finish, whatever stages its revision
   * has: the deposit was for the work as it was agreed first. One that costs less takes the difference off the
   * last dues that are still to be paid; beyond them it is credit, to be refunded or used by the next change.
   */
  async openFor(approved: ApprovedPrice): Promise<void> {
    const proposal = await this.repository.lock(approved);
    if (!proposal) throw new Error('The proposal that was approved is gone.');
    if (approved.before === null) await this.openFirst(proposal, approved);
    else await this.change(proposal, approved, approved.before.totalMinor);
  }

  /** As the homeowner sees them. */
  async shared(companyId: string, proposalId: string): Promise<SharedPage['dues']> {
    const key = { companyId, proposalId };
    const rows = await this.repository.dues(key);
    const payments = await this.repository.payments(key);
    const balance = balanceOf(rows, payments, await this.repository.refunds(key));
    return rows.map(({ id, name, due, requestedAt }, i) => {
      const { outstandingMinor = 0, netMinor = 0, paidMinor = 0 } = balance.dues[i] ?? {};
      const requested = requestedAt !== null;
      return {
        id,
        name,
        due,
        outstandingMinor,
        amountMinor: netMinor,
        paidMinor,
        requested,
        payable: requested && outstandingMinor > 0 && this.cards.offered,
        pending: payments.some((payment) => payment.dueId === id && payment.status === 'open'),
      };
    });
  }

  /**
   * Invoices, receipts and notes of refunds that the homeowner may open: `money-<id>`.
   * @param urlOf where the one who looks finds a paper
   */
  async papers(
    companyId: string,
    proposalId: string,
    urlOf: (paperId: string) => string,
  ): Promise<SharedPage['papers']> {
    const rows = await this.documents.ofProposal({ companyId, proposalId });
    return rows.map((row) => {
      const id = `${PAPER}${row.id}`;
      return { id, name: paperName(row), url: row.pdfKey === null ? null : urlOf(id) };
    });
  }

  /** One of them as a file. Null for what is no such paper, or not made yet. */
  async paper(companyId: string, proposalId: string, paperId: string): Promise<StoredFile | null> {
    if (!paperId.startsWith(PAPER)) return null;
    const documentId = paperId.slice(PAPER.length);
    const rows = await this.documents.ofProposal({ companyId, proposalId });
    const row = rows.find(({ id }) => id === documentId);
    return row ? this.files.of(row) : null;
  }

  /** Begins a payment by card, or goes on with one that is open. */
  async checkout(guest: Payer, dueId: string, returnUrl: string): Promise<{ readonly url: string }> {
    return this.checkouts.begin(guest, dueId, returnUrl);
  }

  private async openFirst(proposal: ProposalOfMoney, approved: ApprovedPrice): Promise<void> {
    const { companyId, approvalId, currency, stages } = approved;
    const sum = stages.reduce((total, { amountMinor }) => total + amountMinor, 0);
    if (sum !== approved.totalMinor)
      throw new Error(`The stages come to ${sum}, the total to ${approved.totalMinor}.`);
    const now = await this.repository.now();
    for (const [position, { name, due, amountMinor }] of stages.entries()) {
      if (amountMinor === 0) continue;
      const row = await this.repository.insertDue({
        companyId,
        proposalId: proposal.proposalId,
        approvalId,
        name,
        due,
        position,
        amountMinor,
        currency,
        requestedAt: due === 'approval' ? now : null,
      });
      if (due !== 'approval') continue;
      await this.events.note(proposal, 'payment-requested', { name, amountMinor }, null);
      await this.moneyPapers.invoice(proposal, row);
    }
  }

  private async change(
    proposal: ProposalOfMoney,
    { companyId, approvalId, currency, totalMinor, revision }: ApprovedPrice,
    beforeMinor: number,
  ): Promise<void> {
    const rows = await this.repository.dues(proposal);
    const payments = await this.repository.payments(proposal);
    const refunds = await this.repository.refunds(proposal);
    const balance = balanceOf(rows, payments, refunds);
    if (balance.agreedMinor !== beforeMinor)
      throw new Error(`The dues come to ${balance.agreedMinor}; ${beforeMinor} was agreed.`);
    const { reduced, moreMinor } = changeTo(totalMinor, balance);
    for (const [id, reducedMinor] of reduced)
      await this.repository.updateDue(companyId, id, { reducedMinor });
    // Whoever is at the card page would pay what is not owed any more.
    for (const payment of payments)
      if (payment.status === 'open' && reduced.has(payment.dueId))
        await this.queue.send('card-checkout.end', { companyId, paymentId: payment.id });
    const after = balanceOf(await this.repository.dues(proposal), payments, refunds);
    // An invoice that is out asks for too much: one over what is left takes its place.
    for (const row of rows)
      if (row.requestedAt !== null && reduced.has(row.id) && isOwed(after, row.id))
        await this.moneyPapers.invoice(proposal, row);
    if (moreMinor === 0) return;
    await this.repository.insertDue({
      companyId,
      proposalId: proposal.proposalId,
      approvalId,
      name: `Change order, revision ${revision}`,
      due: 'finish',
      position: 0,
      amountMinor: moreMinor,
      currency,
    });
  }
}

const isOwed = ({ dues }: ReturnType<typeof balanceOf>, dueId: string): boolean =>
  (dues.find(({ id }) => id === dueId)?.outstandingMinor ?? 0) > 0;
