import { Inject, Injectable } from '@nestjs/common';
import { ENV } from '../config/config.module.js';
import type { Env } from '../config/env.js';
import { Database } from '../database/database.js';
import { MailRepository } from '../ports/mail/mail.repository.js';
import { Mailer } from '../ports/mail/mailer.js';
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
      });
      await this.repository.markSent(mail.id);
    });
  }
}
