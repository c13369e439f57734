import { z } from 'zod';

const line = z.string().trim().max(400);
const passage = z.string().trim().max(4000);
export const answerSchema = z.enum(['yes', 'no', 'unknown']);
const presence = z.object({ present: answerSchema, note: line });

/** What is found out on the site walk. Null and `unknown` say that nobody has looked yet. */
export const siteWalkSchema = z.object({
  lineVoltsUnderLoad: z.number().positive().max(600).nullable(),
  outletLocation: line,
  circuitRatingAmps: z.number().positive().max(400).nullable(),
  otherLoadsOnCircuit: line,
  protected: answerSchema,
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
