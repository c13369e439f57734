import { createTransport, type Transporter } from 'nodemailer';
import type { Env } from '../../config/env.js';
import { Mailer, type OutgoingMail } from './mailer.js';

/** What the mail service said names people; a failed job keeps its error, so only the kind of it is passed on. */
export class MailNotTaken extends Error {
  constructor(cause: unknown) {
    super(`The mail service did not take the message (${kindOf(cause)}).`);
  }
}

function kindOf(cause: unknown): string {
  if (typeof cause !== 'object' || cause === null) return 'unknown';
  if ('responseCode' in cause && typeof cause.responseCode === 'number') return String(cause.responseCode);
  return 'code' in cause && typeof cause.code === 'string' ? cause.code : 'unknown';
}

/** A server that does not answer must fail the attempt well before the queue gives the job to another. */
const PATIENCE_MS = 10_000;

export class SmtpMailer extends Mailer {
  private readonly transport: Transporter;

  constructor(private readonly env: Env) {
    super();
    this.transport = createTransport({
      url: env.SMTP_URL,
      connectionTimeout: PATIENCE_MS,
      greetingTimeout: PATIENCE_MS,
      socketTimeout: 2 * PATIENCE_MS,
      // Texts are our own: nothing may be pulled in from files or addresses.
      disableFileAccess: true,
      disableUrlAccess: true,
    });
  }

  async send({ messageId, to, subject, text, html, replyTo, attachments = [] }: OutgoingMail): Promise<void> {
    try {
      await this.transport.sendMail({
        from: this.env.MAIL_FROM,
        // As an object, so that nothing in an address can add another recipient.
        to: { name: '', address: to },
        ...(replyTo === undefined ? {} : { replyTo: { name: '', address: replyTo } }),
        subject,
        text,
        html,
        attachments: attachments.map(({ fileName, type, body }) => ({
          filename: fileName,
          contentType: type,
          content: body,
        })),
        messageId,
        headers: { 'Auto-Submitted': 'auto-generated' },
      });
    } catch (error) {
      throw new MailNotTaken(error);
    }
  }

  close(): void {
    this.transport.close();
  }
}
