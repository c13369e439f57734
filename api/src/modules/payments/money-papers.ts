import { formatMoney, proportionOf } from '@lampwright/geometry/price';
import { Inject, Injectable } from '@nestjs/common';
import type { MoneyDocument } from '../../paper/money-document.js';
import { Queue } from '../../ports/queue/queue.js';
import { CountersRepository } from '../numbering/counters.repository.js';
import { type Agreement, AgreementsRepository } from './agreements.repository.js';
import { type Balance, balanceOf } from './ledger.js';
import { MoneyDocumentsRepository } from './money-documents.repository.js';
import {
  type DueRow,
  type PaymentRow,
  PaymentsRepository,
  type ProposalOfMoney,
  type RefundRow,
} from './payments.repository.js';

interface Paper {
  readonly kind: MoneyDocument['kind'];
  readonly subject: { readonly dueId?: string; readonly paymentId?: string; readonly refundId?: string };
  readonly name: string;
  readonly amountMinor: number;
  readonly taxMinor: number;
  readonly received: MoneyDocument['received'];
  readonly date: string;
  readonly terms: string;
}

/**
 * Numbers and freezes invoices, receipts and notes of refunds, in the transaction of what they tell of; the
 * worker puts them on paper and mails them.
 */
@Injectable()
export class MoneyPapers {
  constructor(
    @Inject(PaymentsRepository) private readonly repository: PaymentsRepository,
    @Inject(AgreementsRepository) private readonly agreements: AgreementsRepository,
    @Inject(MoneyDocumentsRepository) private readonly documents: MoneyDocumentsRepository,
    @Inject(CountersRepository) private readonly counters: CountersRepository,
    @Inject(Queue) private readonly queue: Queue,
  ) {}

  /** Asks for what is outstanding of a due. */
  async invoice(proposal: ProposalOfMoney, due: DueRow): Promise<void> {
    const { agreement, balance, today } = await this.ground(proposal);
    const amountMinor = balance.dues.find(({ id }) => id === due.id)?.outstandingMinor ?? 0;
    await this.issue(proposal, agreement, balance, {
      kind: 'invoice',
      subject: { dueId: due.id },
      name: due.name,
      amountMinor,
      taxMinor: proportionOf(amountMinor, agreement.taxMinor, agreement.totalMinor),
      received: null,
      date: today,
      terms: agreement.document.words.terms,
    });
  }

  /** For a payment that has come in by now. */
  async receipt(proposal: ProposalOfMoney, due: DueRow, payment: PaymentRow): Promise<void> {
    const { agreement, balance, settledMinor, today } = await this.ground(proposal);
    await this.issue(proposal, agreement, balance, {
      kind: 'receipt',
      subject: { paymentId: payment.id },
      name: due.name,
      amountMinor: payment.amountMinor,
      taxMinor: taxBetween(agreement, settledMinor - payment.amountMinor, settledMinor),
      received: { method: payment.method, on: payment.receivedOn ?? today },
      date: today,
      terms: '',
    });
  }

  /** For a refund that has gone out by now. */
  async refundNote(
    proposal: ProposalOfMoney,
    due: DueRow,
    payment: PaymentRow,
    refund: RefundRow,
  ): Promise<void> {
    const { agreement, balance, settledMinor, today } = await this.ground(proposal);
    await this.issue(proposal, agreement, balance, {
      kind: 'refund',
      subject: { paymentId: payment.id, refundId: refund.id },
      name: `Paid back of: ${due.name}`,
      amountMinor: refund.amountMinor,
      taxMinor: taxBetween(agreement, settledMinor, settledMinor + refund.amountMinor),
      received: { method: payment.method, on: today },
      date: today,
      terms: '',
    });
  }

  private async ground(proposal: ProposalOfMoney) {
    const agreement = await this.agreements.newest(proposal);
    if (!agreement) throw new Error('There is money on a proposal that nobody approved.');
    const dues = await this.repository.dues(proposal);
    const payments = await this.repository.payments(proposal);
    const refunds = await this.repository.refunds(proposal);
    return {
      agreement,
      balance: balanceOf(dues, payments, refunds),
      /** What came in less what went out, without refunds that are only under way. */
      settledMinor: balanceOf(
        dues,
        payments,
        refunds.filter(({ status }) => status === 'succeeded'),
      ).paidMinor,
      today: (await this.repository.now()).toISOString().slice(0, 10),
    };
  }

  private async issue(
    { companyId, proposalId, number: proposalNumber }: ProposalOfMoney,
    { document, revision }: Agreement,
    balance: Balance,
    paper: Paper,
  ): Promise<void> {
    const number = await this.counters.next(companyId, paper.kind);
    const { currency, locale, region, company, client, job } = document;
    const documentId = await this.documents.insert(
      {
        companyId,
        proposalId,
        kind: paper.kind,
        number,
        ...paper.subject,
        amountMinor: paper.amountMinor,
        currency,
      },
      {
        paper: {
          form: 1,
          kind: paper.kind,
          number,
          date: paper.date,
          currency,
          locale,
          region,
          company,
          client,
          jobName: job.name,
          proposal: { number: proposalNumber, revision },
          lines: [{ name: paper.name, amountMinor: paper.amountMinor }],
          taxNote: taxNote(document, paper.taxMinor),
          totalMinor: paper.amountMinor,
          paidMinor: balance.paidMinor,
          outstandingMinor: balance.outstandingMinor,
          received: paper.received,
          terms: paper.terms,
        },
        taxMinor: paper.taxMinor,
      },
    );
    await this.queue.send('money-document.make', { companyId, documentId });
  }
}

/**
 * The tax in what brings the sum of payments from one amount to another, at the share that tax has in what is
 * agreed now. Each is the difference of two rounded sums, so that they add up to the tax of the whole when the
 * whole is paid, as long as no change order alters that share.
 */
export function taxBetween(
  { taxMinor, totalMinor }: Pick<Agreement, 'taxMinor' | 'totalMinor'>,
  fromMinor: number,
  toMinor: number,
): number {
  const upTo = (paidMinor: number) => proportionOf(Math.max(0, paidMinor), taxMinor, totalMinor);
  return upTo(toMinor) - upTo(fromMinor);
}

function taxNote({ price: { tax }, currency, locale }: Agreement['document'], taxMinor: number): string {
  if (tax === null) return '';
  return `${formatMoney(taxMinor, currency, locale)} of this is ${tax.name} (${tax.percent} %).`;
}
