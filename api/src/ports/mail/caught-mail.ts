import { z } from 'zod';

/** What came with a message; its bytes are had beside it. */
export const caughtAttachmentSchema = z.strictObject({
  fileName: z.string(),
  type: z.string(),
  bytes: z.number().int(),
});

export type CaughtAttachment = z.infer<typeof caughtAttachmentSchema>;

/** A message as the local catcher keeps it and hands it out. */
export const caughtMailSchema = z.strictObject({
  id: z.string(),
  receivedAt: z.iso.datetime(),
  messageId: z.string(),
  from: z.string(),
  /** Those it was delivered to, by the envelope. */
  to: z.array(z.string()),
  subject: z.string(),
  text: z.string(),
  html: z.string(),
  /** Messages of earlier versions have neither. */
  replyTo: z.string().default(''),
  attachments: z.array(caughtAttachmentSchema).default([]),
});
export type CaughtMail = z.infer<typeof caughtMailSchema>;

export const caughtMailListSchema = z.strictObject({ items: z.array(caughtMailSchema) });
