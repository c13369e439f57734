import { Inject, Injectable } from '@nestjs/common';
import { Database } from '../../database/database.js';
import { Queue } from '../queue/queue.js';
import { type Letter, renderLetter } from './letter.js';
import { MailRepository } from './mail.repository.js';

/** Where the product puts its mail: written with what it tells about, sent by the worker afterwards. */
@Injectable()
export class Outbox {
  constructor(
    @Inject(Database) private readonly database: Database,
    @Inject(MailRepository) private readonly repository: MailRepository,
    @Inject(Queue) private readonly queue: Queue,
  ) {}

  /**
   * Posts a letter, in the running transaction if there is one.
   * @param companyId whose letter it is, and with whose records it goes; null for a person's own affairs
   */
  async post(companyId: string | null, to: string, letter: Letter): Promise<void> {
    await this.database.transaction(async () => {
      const { text, html } = renderLetter(letter);
      const messageId = await this.repository.insert({
        companyId,
        to,
        subject: letter.subject,
        text,
        html,
        attachments: letter.attachments ?? [],
        replyTo: letter.replyTo ?? null,
      });
      await this.queue.send('mail.send', { messageId });
    });
  }

  /** Forgets whatever was sent to an address, or still waits to be. */
  async forget(address: string): Promise<void> {
    await this.repository.deleteTo(address);
  }
}
