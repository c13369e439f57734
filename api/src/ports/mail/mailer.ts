export interface OutgoingMail {
  /** Stays the same when the same message is sent again, so that a repeat can be recognised. */
  readonly messageId: string;
  readonly to: string;
  readonly subject: string;
  readonly text: string;
  readonly html: string;
}

/** Hands a message to the mail service. */
export abstract class Mailer {
  /** Resolves when the service has taken the message; throws when it did not. */
  abstract send(mail: OutgoingMail): Promise<void>;
  abstract close(): void;
}
