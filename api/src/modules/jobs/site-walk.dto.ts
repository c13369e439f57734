import { z } from 'zod';

const line = z.string().trim().max(400);
const passage = z.string().trim().max(4000);
const answer = z.enum(['yes', 'no', 'unknown']);

/** Something in the ground or on the house: whether it is there, and what is known of it. */
const presence = z.strictObject({ present: answer, note: line });

/** What is found out on the site walk. Null and `unknown` say that nobody has looked yet. */
export const siteWalkSchema = z.strictObject({
  lineVoltsUnderLoad: z.number().positive().max(600).nullable(),
  outletLocation: line,
  circuitRatingAmps: z.number().positive().max(400).nullable(),
  otherLoadsOnCircuit: line,
  /** By a GFCI, or an RCD in the words of other regions. */
  protected: answer,
  existingTransformer: line,
  existingCable: line,
  irrigation: presence,
  gas: presence,
  petFence: presence,
  associationRules: passage,
  permits: passage,
  notes: passage,
});
export type SiteWalk = z.infer<typeof siteWalkSchema>;
