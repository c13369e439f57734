import { z } from 'zod';
import { jobStages } from '../jobs/jobs.dto.js';
import { proposalStateSchema } from '../proposals/proposals.dto.js';

/** Amounts are left out for crew. */
export const timelineSchema = z.strictObject({
  /** Newest first. */
  items: z.array(
    z.strictObject({
      id: z.uuid(),
      at: z.iso.datetime(),
      kind: z.string(),
      /** Who did it: a member, the homeowner's name, or empty for the product itself. */
      actor: z.string(),
      /** One sentence: "Approved by Maren Holloway", "Deposit paid by card". */
      sentence: z.string(),
      amountMinor: z.number().int().nullable(),
    }),
  ),
  currency: z.string(),
  locale: z.string(),
});
export type Timeline = z.infer<typeof timelineSchema>;

const cardSchema = z.strictObject({
  jobId: z.uuid(),
  name: z.string(),
  client: z.string(),
  stage: z.enum(jobStages),
  proposal: proposalStateSchema.nullable(),
  /** What is owed next, and by whom. */
  next: z.strictObject({ by: z.enum(['company', 'homeowner']), what: z.string() }),
  openQuestions: z.number().int(),
  /** Null for crew. */
  totalMinor: z.number().int().nullable(),
  outstandingMinor: z.number().int().nullable(),
  updatedAt: z.iso.datetime(),
});
export const boardSchema = z.strictObject({
  currency: z.string(),
  locale: z.string(),
  columns: z.array(
    z.strictObject({
      stage: z.enum(jobStages),
      /** All of them; the cards are the newest 50. */
      count: z.number().int(),
      cards: z.array(cardSchema),
    }),
  ),
});
export type Board = z.infer<typeof boardSchema>;

export const numbersQuerySchema = z.strictObject({
  from: z.iso.date().optional(),
  to: z.iso.date().optional(),
});
export type NumbersQuery = z.infer<typeof numbersQuerySchema>;
export const numbersSchema = z.strictObject({
  currency: z.string(),
  locale: z.string(),
  from: z.iso.date(),
  to: z.iso.date(),
  /** Proposals first sent in that time, and those of them that were won by now. */
  sent: z.number().int(),
  won: z.number().int(),
  declined: z.number().int(),
  waiting: z.number().int(),
  wonShare: z.number().nullable(),
  sentMinor: z.number().int(),
  wonMinor: z.number().int(),
  /** Of the won ones, from first sending to approval. */
  medianDaysToYes: z.number().nullable(),
  /** Over all time: agreed, and not paid yet. */
  outstandingMinor: z.number().int(),
  receivedMinor: z.number().int(),
});
export type Numbers = z.infer<typeof numbersSchema>;
