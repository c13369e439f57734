import { itemPriceSchema, jobPricingSchema, priceBookSchema, quoteSchema } from '@lampwright/geometry/price';
import { z } from 'zod';

const version = z.number().int().min(0);

export const priceBookAnswerSchema = z.strictObject({
  version,
  book: priceBookSchema,
  /** Of the company's settings; amounts are in its minor units. */
  currency: z.string(),
});
export type PriceBookAnswer = z.infer<typeof priceBookAnswerSchema>;

export const priceBookEditSchema = z.strictObject({ baseVersion: version, book: priceBookSchema });
export type PriceBookEdit = z.infer<typeof priceBookEditSchema>;

export const cataloguePriceSchema = z.strictObject({
  itemId: z.uuid(),
  /** Cost, supplier and order number are emptied for those who don't see costs. */
  price: itemPriceSchema,
  since: z.iso.datetime(),
});
export const cataloguePricesSchema = z.strictObject({
  currency: z.string(),
  locale: z.string(),
  /** Whether whoever asked sees costs, and may change prices. */
  seesCosts: z.boolean(),
  items: z.array(cataloguePriceSchema),
});
export type CataloguePrices = z.infer<typeof cataloguePricesSchema>;

export const itemPriceEditSchema = z.strictObject({ price: itemPriceSchema });
export type ItemPriceEdit = z.infer<typeof itemPriceEditSchema>;

export const priceHistorySchema = z.strictObject({
  /** Newest first. */
  items: z.array(
    z.strictObject({
      price: itemPriceSchema,
      since: z.iso.datetime(),
      by: z.string(),
      /** The file it came from; null for one typed in. */
      importedFrom: z.string().nullable(),
    }),
  ),
});
export type PriceHistory = z.infer<typeof priceHistorySchema>;

export const jobPricingAnswerSchema = z.strictObject({ version, pricing: jobPricingSchema });
export type JobPricingAnswer = z.infer<typeof jobPricingAnswerSchema>;

/** Saved only on top of the version it was made from: otherwise 409 `pricing-conflict` with the present one. */
export const jobPricingEditSchema = z.strictObject({ baseVersion: version, pricing: jobPricingSchema });
export type JobPricingEdit = z.infer<typeof jobPricingEditSchema>;

export const acceptanceSchema = z.strictObject({
  id: z.uuid(),
  reason: z.string(),
  by: z.string(),
  at: z.iso.datetime(),
});
export type Acceptance = z.infer<typeof acceptanceSchema>;

export const openFaultSchema = z.strictObject({
  /** Names the fault: code and records. */
  key: z.string(),
  code: z.string(),
  recordId: z.string(),
  message: z.string(),
  /** Null while nobody answers for it. One accepted for other words (other volts) does not count any more. */
  acceptance: acceptanceSchema.nullable(),
});

/** Whether a combination of groups may be offered. */
export const combinationCheckSchema = z.strictObject({
  groups: z.array(z.string()),
  offerable: z.boolean(),
  /** Sentences of the faults in its way. */
  faults: z.array(z.string()),
});
export type CombinationCheck = z.infer<typeof combinationCheckSchema>;

/** Something in the way of a proposal. */
export const obstacleSchema = z.strictObject({
  /** As a sentence. */
  message: z.string(),
  /** Where it is mended: on the plan, or in a part of the price screen. */
  mend: z.enum(['plan', 'faults', 'lines', 'groups', 'terms']),
});
export type Obstacle = z.infer<typeof obstacleSchema>;

/** Of the price book: what a job's terms are chosen from, and what holds where it says nothing. No rates. */
export const quoteTermsSchema = z.strictObject({
  taxes: priceBookSchema.shape.taxes,
  defaultTaxId: priceBookSchema.shape.defaultTaxId,
  stages: priceBookSchema.shape.stages,
  depositCap: priceBookSchema.shape.depositCap,
  controlItemId: priceBookSchema.shape.controlItemId,
  aimingVisits: priceBookSchema.shape.rates.shape.aimingVisits,
});
export type QuoteTerms = z.infer<typeof quoteTermsSchema>;

export const quoteAnswerSchema = z.strictObject({
  planVersion: version,
  pricingVersion: version,
  seesCosts: z.boolean(),
  quote: quoteSchema,
  terms: quoteTermsSchema,
  /** Of the whole plan. */
  faults: z.array(openFaultSchema),
  checks: z.array(combinationCheckSchema),
  /** What stands in the way of a proposal; empty when nothing does. */
  obstacles: z.array(obstacleSchema),
});
export type QuoteAnswer = z.infer<typeof quoteAnswerSchema>;

export const acceptFaultSchema = z.strictObject({
  faultKey: z.string().min(1).max(300),
  /** As shown to whoever accepts it: it is refused when the fault has other words by now. */
  message: z.string().min(1).max(1000),
  reason: z.string().trim().min(3, { error: 'Please say why this fault is acceptable.' }).max(1000),
});
export type AcceptFault = z.infer<typeof acceptFaultSchema>;

/** The bill of materials without any money, for those who build. */
export const materialsSchema = z.strictObject({
  planVersion: version,
  lines: z.array(
    z.strictObject({
      key: z.string(),
      groupId: z.string().nullable(),
      section: z.string(),
      name: z.string(),
      quantity: z.number(),
      unit: z.string(),
      source: z.string(),
      recordIds: z.array(z.string()),
    }),
  ),
});
export type Materials = z.infer<typeof materialsSchema>;
