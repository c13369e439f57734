import { z } from 'zod';

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
});
export type CaughtMail = z.infer<typeof caughtMailSchema>;

export const caughtMailListSchema = z.strictObject({ items: z.array(caughtMailSchema) });
