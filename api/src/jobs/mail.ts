import { buffer } from 'node:stream/consumers';
import { Inject, Injectable } from '@nestjs/common';
import { ENV } from '../config/config.module.js';
import type { Env } from '../config/env.js';
import { Database } from '../database/database.js';
import type { LetterAttachment } from '../ports/mail/letter.js';
import { MailRepository } from '../ports/mail/mail.repository.js';
import { type MailAttachment, Mailer } from '../ports/mail/mailer.js';
import { ObjectStorage } from '../ports/storage/storage.js';
import type { JobHandler } from './job-handler.js';

/**
 * Sends one message, once. The row is held while the mail service takes it, so that two workers can't both
 * send it. Should the process die between the service's yes and the commit, the repeat carries the same
 * Message-ID.
 */
@Injectable()
export class SendMail implements JobHandler<'mail.send'> {
  readonly queue = 'mail.send';

  constructor(
    @Inject(ENV) private readonly env: Env,
    @Inject(Database) private readonly database: Database,
    @Inject(MailRepository) private readonly repository: MailRepository,
    @Inject(Mailer) private readonly mailer: Mailer,
    @Inject(ObjectStorage) private readonly storage: ObjectStorage,
  ) {}

  async handle({ messageId }: { readonly messageId: string }): Promise<void> {
    // On its own, so that an attempt that fails is counted too.
    await this.repository.countAttempt(messageId);
    await this.database.transaction(async () => {
      const mail = await this.repository.lockUnsent(messageId);
      if (!mail) return;
      await this.mailer.send({
        messageId: `<${mail.id}@${new URL(this.env.PUBLIC_URL).hostname}>`,
        to: mail.to,
        subject: mail.subject,
        text: mail.text,
        html: mail.html,
        ...(mail.replyTo === null ? {} : { replyTo: mail.replyTo }),
        attachments: await Promise.all(mail.attachments.map((file) => this.fetch(file))),
      });
      await this.repository.markSent(mail.id);
    });
  }

  /** Throws where the file is not there, which fails the attempt: a letter never goes without what it speaks of. */
  private async fetch({ key, fileName, type }: LetterAttachment): Promise<MailAttachment> {
    const stored = await this.storage.get(key);
    if (!stored) throw new Error('A file to be sent with a message is not in object storage.');
    return { fileName, type, body: await buffer(stored.stream) };
  }
}
