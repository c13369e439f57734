import { totalsSchema } from '@lampwright/geometry/price';
import { z } from 'zod';

/** What a signed proposal shows of its approval. */
export const signatureEvidenceSchema = z.strictObject({
  typedName: z.string(),
  /** The sentences agreed to, word for word. */
  agreedTo: z.string(),
  consentedTo: z.string(),
  approvedAt: z.iso.datetime(),
  address: z.string(),
  userAgent: z.string(),
  /** SHA-256 of the revision document and of the unsigned PDF, in hex. */
  revisionHash: z.string(),
  pdfHash: z.string(),
  /** Ids of the groups taken. */
  groups: z.array(z.string()),
  /** The sums of the approved combination. */
  totals: totalsSchema,
});
export type SignatureEvidence = z.infer<typeof signatureEvidenceSchema>;
