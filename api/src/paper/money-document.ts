import { z } from 'zod';
import { partySchema } from '../modules/proposals/revision-document.js';

/** What an invoice, a receipt or the note of a refund says, frozen with its number. Money in minor units. */
export const moneyDocumentSchema = z.strictObject({
  form: z.literal(1),
  kind: z.enum(['invoice', 'receipt', 'refund']),
  number: z.number().int().positive(),
  date: z.iso.date(),
  currency: z.string(),
  locale: z.string(),
  region: z.string(),
  company: partySchema.extend({ licence: z.string() }),
  client: partySchema,
  jobName: z.string(),
  proposal: z.strictObject({ number: z.number().int(), revision: z.number().int() }),
  /** What it is for; the lines add up to the total. */
  lines: z
    .array(z.strictObject({ name: z.string().max(400), amountMinor: z.number().int() }))
    .min(1)
    .max(200),
  /** Such as what tax is held in the total; empty where there is nothing to say. */
  taxNote: z.string().max(1000),
  /** Of an invoice what is asked for, of a receipt what came in, of a refund what goes back. */
  totalMinor: z.number().int(),
  /** Paid on the whole of the agreed work so far, this document included. */
  paidMinor: z.number().int(),
  /** Still to be paid on the whole of the agreed work, after this document. */
  outstandingMinor: z.number().int(),
  /** How the money came or goes; null on an invoice. */
  received: z
    .strictObject({
      method: z.enum(['card', 'cheque', 'transfer', 'cash']),
      on: z.iso.date(),
    })
    .nullable(),
  terms: z.string().max(20_000),
});
export type MoneyDocument = z.infer<typeof moneyDocumentSchema>;
