import { Inject, Injectable } from '@nestjs/common';
import { and, asc, eq, gte, lt } from 'drizzle-orm';
import { z } from 'zod';
import { Database } from '../../database/database.js';
import { moneyDocuments, payments, refunds } from '../../database/schema/index.js';
import { moneyDocumentSchema } from '../../paper/money-document.js';
import type { ProposalKey } from './payments.repository.js';

type Row = typeof moneyDocuments.$inferSelect;

/** What is kept of a paper: what it says, and the tax in its amount for the books. */
const contentSchema = z.strictObject({ paper: moneyDocumentSchema, taxMinor: z.number().int() });
export type MoneyContent = z.infer<typeof contentSchema>;

export interface MoneyDocumentRow extends Omit<Row, 'document'> {
  readonly content: MoneyContent;
}

/** One line of the books. */
export interface BookLine extends MoneyDocumentRow {
  readonly method: 'card' | 'cheque' | 'transfer' | 'cash' | null;
  /** What the card service calls it, or what was noted by hand. */
  readonly reference: string;
}

const rowOf = ({ document, ...row }: Row): MoneyDocumentRow => ({
  ...row,
  content: contentSchema.parse(document),
});

/** Invoices, receipts and notes of refunds. */
@Injectable()
export class MoneyDocumentsRepository {
  constructor(@Inject(Database) private readonly database: Database) {}

  async insert(
    values: Omit<typeof moneyDocuments.$inferInsert, 'document'>,
    content: MoneyContent,
  ): Promise<string> {
    const [row] = await this.database.queries
      .insert(moneyDocuments)
      .values({ ...values, document: contentSchema.parse(content) })
      .returning({ id: moneyDocuments.id });
    return row!.id;
  }

  /** Oldest first. */
  async ofProposal({ companyId, proposalId }: ProposalKey): Promise<MoneyDocumentRow[]> {
    const rows = await this.database.queries
      .select()
      .from(moneyDocuments)
      .where(and(eq(moneyDocuments.companyId, companyId), eq(moneyDocuments.proposalId, proposalId)))
      .orderBy(asc(moneyDocuments.createdAt), asc(moneyDocuments.kind), asc(moneyDocuments.number));
    return rows.map(rowOf);
  }

  async find(companyId: string, id: string): Promise<MoneyDocumentRow | null> {
    const [row] = await this.database.queries.select().from(moneyDocuments).where(of(companyId, id));
    return row ? rowOf(row) : null;
  }

  /** The same, held until the running transaction ends. */
  async lock(companyId: string, id: string): Promise<MoneyDocumentRow | null> {
    const [row] = await this.database.queries
      .select()
      .from(moneyDocuments)
      .where(of(companyId, id))
      .for('update');
    return row ? rowOf(row) : null;
  }

  async update(
    companyId: string,
    id: string,
    values: Partial<Pick<Row, 'status' | 'pdfKey' | 'pdfHash' | 'mailedAt'>>,
  ): Promise<void> {
    await this.database.queries.update(moneyDocuments).set(values).where(of(companyId, id));
  }

  /** Everything that was numbered from one moment until before another. */
  async book(companyId: string, from: Date | null, before: Date | null): Promise<BookLine[]> {
    const rows = await this.database.queries
      .select({ document: moneyDocuments, payment: payments, refund: refunds })
      .from(moneyDocuments)
      .leftJoin(
        refunds,
        and(eq(refunds.companyId, moneyDocuments.companyId), eq(refunds.id, moneyDocuments.refundId)),
      )
      .leftJoin(
        payments,
        and(eq(payments.companyId, moneyDocuments.companyId), eq(payments.id, moneyDocuments.paymentId)),
      )
      .where(
        and(
          eq(moneyDocuments.companyId, companyId),
          from === null ? undefined : gte(moneyDocuments.createdAt, from),
          before === null ? undefined : lt(moneyDocuments.createdAt, before),
        ),
      )
      .orderBy(asc(moneyDocuments.createdAt), asc(moneyDocuments.kind), asc(moneyDocuments.number));
    return rows.map(({ document, payment, refund }) => ({
      ...rowOf(document),
      method: rowOf(document).content.paper.received?.method ?? null,
      reference: refund?.providerId ?? payment?.paymentIntentId ?? payment?.note ?? '',
    }));
  }
}

const of = (companyId: string, id: string) =>
  and(eq(moneyDocuments.companyId, companyId), eq(moneyDocuments.id, id));
