import { Inject, Injectable } from '@nestjs/common';
import { and, asc, eq, isNull, sql } from 'drizzle-orm';
import { Database } from '../../database/database.js';
import { dues, paymentEvents, payments, proposals, refunds, users } from '../../database/schema/index.js';

export type DueRow = typeof dues.$inferSelect;
export type PaymentRow = typeof payments.$inferSelect;
export type RefundRow = typeof refunds.$inferSelect;

/** The proposal that money belongs to. */
export interface ProposalKey {
  readonly companyId: string;
  readonly proposalId: string;
}

export interface ProposalOfMoney extends ProposalKey {
  readonly jobId: string;
  readonly number: number;
}

export interface PaymentOfJob extends PaymentRow {
  /** Of the member who recorded it; empty for a payment by card. */
  readonly recordedByName: string;
}

const proposalColumns = {
  companyId: proposals.companyId,
  proposalId: proposals.id,
  jobId: proposals.jobId,
  number: proposals.number,
};

/** Dues, payments and refunds. */
@Injectable()
export class PaymentsRepository {
  constructor(@Inject(Database) private readonly database: Database) {}

  /** Held until the running transaction ends: whoever changes the money of a proposal takes this first. */
  async lock({ companyId, proposalId }: ProposalKey): Promise<ProposalOfMoney | null> {
    const [row] = await this.database.queries
      .select(proposalColumns)
      .from(proposals)
      .where(and(eq(proposals.companyId, companyId), eq(proposals.id, proposalId)))
      .for('no key update');
    return row ?? null;
  }

  async ofJob(companyId: string, jobId: string): Promise<ProposalOfMoney | null> {
    const [row] = await this.database.queries
      .select(proposalColumns)
      .from(proposals)
      .where(and(eq(proposals.companyId, companyId), eq(proposals.jobId, jobId)));
    return row ?? null;
  }

  /** In the order in which they fall due. */
  async dues({ companyId, proposalId }: ProposalKey): Promise<DueRow[]> {
    return this.database.queries
      .select()
      .from(dues)
      .where(and(eq(dues.companyId, companyId), eq(dues.proposalId, proposalId)))
      .orderBy(asc(dues.createdAt), asc(dues.approvalId), asc(dues.position));
  }

  async insertDue(values: typeof dues.$inferInsert): Promise<DueRow> {
    const [row] = await this.database.queries.insert(dues).values(values).returning();
    return row!;
  }

  async updateDue(
    companyId: string,
    id: string,
    values: Partial<Pick<DueRow, 'reducedMinor' | 'requestedAt'>>,
  ): Promise<void> {
    await this.database.queries
      .update(dues)
      .set(values)
      .where(and(eq(dues.companyId, companyId), eq(dues.id, id)));
  }

  /** Oldest first. */
  async payments({ companyId, proposalId }: ProposalKey): Promise<PaymentOfJob[]> {
    const rows = await this.database.queries
      .select({ payment: payments, name: users.name })
      .from(payments)
      .leftJoin(users, eq(users.id, payments.recordedBy))
      .where(and(eq(payments.companyId, companyId), eq(payments.proposalId, proposalId)))
      .orderBy(asc(payments.createdAt), asc(payments.id));
    return rows.map(({ payment, name }) => ({ ...payment, recordedByName: name ?? '' }));
  }

  async findPayment(companyId: string, id: string): Promise<PaymentRow | null> {
    const [row] = await this.database.queries
      .select()
      .from(payments)
      .where(and(eq(payments.companyId, companyId), eq(payments.id, id)));
    return row ?? null;
  }

  /** Of whatever company: the card service names nothing but its own ids. */
  async byCheckout(checkoutId: string): Promise<PaymentRow | null> {
    const [row] = await this.database.queries
      .select()
      .from(payments)
      .where(eq(payments.checkoutId, checkoutId));
    return row ?? null;
  }

  /** Of whatever company. */
  async byPaymentIntent(paymentIntentId: string): Promise<PaymentRow | null> {
    const [row] = await this.database.queries
      .select()
      .from(payments)
      .where(eq(payments.paymentIntentId, paymentIntentId));
    return row ?? null;
  }

  async insertPayment(values: typeof payments.$inferInsert): Promise<PaymentRow> {
    const [row] = await this.database.queries.insert(payments).values(values).returning();
    return row!;
  }

  async updatePayment(
    companyId: string,
    id: string,
    values: Partial<
      Pick<PaymentRow, 'status' | 'settledAt' | 'paymentIntentId' | 'checkoutId' | 'checkoutUrl' | 'note'>
    >,
  ): Promise<void> {
    await this.database.queries
      .update(payments)
      .set(values)
      .where(and(eq(payments.companyId, companyId), eq(payments.id, id)));
  }

  /** Notes the page of an open payment that has none yet; false if it has one, or is not open any more. */
  async nameCheckout(
    companyId: string,
    id: string,
    checkout: { readonly checkoutId: string; readonly checkoutUrl: string | null },
  ): Promise<boolean> {
    const named = await this.database.queries
      .update(payments)
      .set(checkout)
      .where(
        and(
          eq(payments.companyId, companyId),
          eq(payments.id, id),
          eq(payments.status, 'open'),
          isNull(payments.checkoutId),
        ),
      )
      .returning({ id: payments.id });
    return named.length > 0;
  }

  /** Oldest first. */
  async refunds({ companyId, proposalId }: ProposalKey): Promise<RefundRow[]> {
    const rows = await this.database.queries
      .select({ refund: refunds })
      .from(refunds)
      .innerJoin(payments, and(eq(payments.companyId, refunds.companyId), eq(payments.id, refunds.paymentId)))
      .where(and(eq(refunds.companyId, companyId), eq(payments.proposalId, proposalId)))
      .orderBy(asc(refunds.createdAt), asc(refunds.id));
    return rows.map(({ refund }) => refund);
  }

  async findRefund(companyId: string, id: string): Promise<RefundRow | null> {
    const [row] = await this.database.queries
      .select()
      .from(refunds)
      .where(and(eq(refunds.companyId, companyId), eq(refunds.id, id)));
    return row ?? null;
  }

  async insertRefund(values: typeof refunds.$inferInsert): Promise<RefundRow> {
    const [row] = await this.database.queries.insert(refunds).values(values).returning();
    return row!;
  }

  async updateRefund(
    companyId: string,
    id: string,
    values: Partial<Pick<RefundRow, 'status' | 'settledAt' | 'providerId'>>,
  ): Promise<void> {
    await this.database.queries
      .update(refunds)
      .set(values)
      .where(and(eq(refunds.companyId, companyId), eq(refunds.id, id)));
  }

  async knowsEvent(eventId: string): Promise<boolean> {
    const [row] = await this.database.queries
      .select({ eventId: paymentEvents.eventId })
      .from(paymentEvents)
      .where(eq(paymentEvents.eventId, eventId));
    return row !== undefined;
  }

  /** False if it was noted before; waits for a transaction that is noting it. */
  async noteEvent(eventId: string, type: string): Promise<boolean> {
    const noted = await this.database.queries
      .insert(paymentEvents)
      .values({ eventId, type })
      .onConflictDoNothing()
      .returning({ eventId: paymentEvents.eventId });
    return noted.length > 0;
  }

  /** The database's own clock, so that times of one transaction agree. */
  async now(): Promise<Date> {
    const { rows } = await this.database.queries.execute<{ now: Date }>(sql`SELECT now() AS now`);
    return new Date(rows[0]!.now);
  }
}
