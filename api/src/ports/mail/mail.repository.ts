import { Inject, Injectable } from '@nestjs/common';
import { and, eq, isNull, sql } from 'drizzle-orm';
import { z } from 'zod';
import { Database } from '../../database/database.js';
import { mailMessages } from '../../database/schema/index.js';
import type { LetterAttachment } from './letter.js';

export interface MailRow extends Omit<typeof mailMessages.$inferSelect, 'attachments'> {
  readonly attachments: readonly LetterAttachment[];
}

export interface NewMail {
  readonly companyId: string | null;
  readonly to: string;
  readonly subject: string;
  readonly text: string;
  readonly html: string;
  readonly attachments: readonly LetterAttachment[];
  readonly replyTo: string | null;
}

const attachmentsSchema = z.array(
  z.strictObject({ key: z.string(), fileName: z.string(), type: z.string() }),
);

@Injectable()
export class MailRepository {
  constructor(@Inject(Database) private readonly database: Database) {}

  async insert(mail: NewMail): Promise<string> {
    const [row] = await this.database.queries.insert(mailMessages).values(mail).returning({
      id: mailMessages.id,
    });
    return row!.id;
  }

  /** The message if it has not been sent, held against other senders until the running transaction ends. */
  async lockUnsent(id: string): Promise<MailRow | null> {
    const [row] = await this.database.queries
      .select()
      .from(mailMessages)
      .where(and(eq(mailMessages.id, id), isNull(mailMessages.sentAt)))
      .for('update');
    return row ? { ...row, attachments: attachmentsSchema.parse(row.attachments) } : null;
  }

  async countAttempt(id: string): Promise<void> {
    await this.database.queries
      .update(mailMessages)
      .set({ attempts: sql`${mailMessages.attempts} + 1` })
      .where(eq(mailMessages.id, id));
  }

  /** What was sent holds one-time links, so only the fact of it is kept. */
  async markSent(id: string): Promise<void> {
    await this.database.queries
      .update(mailMessages)
      .set({ sentAt: new Date(), text: '', html: '' })
      .where(eq(mailMessages.id, id));
  }

  async deleteTo(address: string): Promise<void> {
    await this.database.queries.delete(mailMessages).where(eq(sql`lower(${mailMessages.to})`, address));
  }
}
