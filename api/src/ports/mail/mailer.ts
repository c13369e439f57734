export interface MailAttachment {
  readonly fileName: string;
  readonly type: string;
  readonly body: Buffer;
}

export interface OutgoingMail {
  /** Stays the same when the same message is sent again, so that a repeat can be recognised. */
  readonly messageId: string;
  readonly to: string;
  readonly subject: string;
  readonly text: string;
  readonly html: string;
  readonly replyTo?: string;
  readonly attachments?: readonly MailAttachment[];
}

/** Hands a message to the mail service. */
export abstract class Mailer {
  /** Resolves when the service has taken the message; throws when it did not. */
  abstract send(mail: OutgoingMail): Promise<void>;
  abstract close(): void;
}
