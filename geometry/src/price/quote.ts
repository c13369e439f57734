import { z } from 'zod';
import { amountSchema, saleUnitSchema, signedAmountSchema } from './price-book.js';

/** A price, worked out: lines, groups and the totals of every combination of groups. Money in minor units. */

export const lineSections = [
  'fixtures',
  'lamps',
  'cable',
  'connectors',
  'mounting',
  'conduit',
  'hubs',
  'transformers',
  'controls',
  'labour',
  'other',
] as const;
export type LineSection = (typeof lineSections)[number];

export const quoteLineSchema = z.strictObject({
  /** Stays the same when the plan changes, so that an override finds its line again. */
  key: z.string(),
  /** Null: the base, which is always in. */
  groupId: z.string().nullable(),
  section: z.enum(lineSections),
  kind: z.enum(['material', 'labour']),
  name: z.string(),
  quantity: z.number(),
  unit: saleUnitSchema,
  /** Where the quantity comes from, in one sentence: "P1 to P5", "112 ft drawn, 14 ft slack, 10 % waste". */
  source: z.string(),
  /** Records of the plan that it counts. */
  recordIds: z.array(z.string()),
  /** Catalogue item, where it is one. */
  itemId: z.string().nullable(),
  /** Null: nobody has said what it costs. */
  priceMinor: amountSchema.nullable(),
  /** Null: not known, or not for the eyes of whoever asked. */
  costMinor: amountSchema.nullable(),
  taxable: z.boolean(),
  origin: z.enum(['plan', 'manual', 'overridden']),
  /** What the plan alone says, where it was overridden. */
  planned: z.strictObject({ quantity: z.number(), priceMinor: amountSchema.nullable() }).nullable(),
  /** Of the override. */
  note: z.string(),
});
export type QuoteLine = z.infer<typeof quoteLineSchema>;

export const stageAmountSchema = z.strictObject({
  id: z.string(),
  name: z.string(),
  due: z.enum(['approval', 'start', 'finish']),
  /** The share as agreed; null for the last, which takes the rest. */
  percent: z.number().nullable(),
  amountMinor: amountSchema,
  /** The law's cap made it less than its share. */
  capped: z.boolean(),
});
export type StageAmount = z.infer<typeof stageAmountSchema>;

/**
 * The sums of one combination of groups:
 * total = subtotal − discount + tax; the stages add up to the total.
 */
export const totalsSchema = z.strictObject({
  /** Ids of the groups that are in, in the order of the groups. */
  groups: z.array(z.string()),
  subtotalMinor: amountSchema,
  discountMinor: amountSchema,
  /** What the tax is taken of, after its share of the discount. */
  taxableMinor: amountSchema,
  taxMinor: amountSchema,
  totalMinor: amountSchema,
  stages: z.array(stageAmountSchema),
});
export type Totals = z.infer<typeof totalsSchema>;

export const quoteGroupSchema = z.strictObject({
  /** Null: the base. */
  id: z.string().nullable(),
  name: z.string(),
  description: z.string(),
  on: z.boolean(),
  fixtures: z.number().int(),
  /** Sum of its lines; lines without a price count as nothing, and are told as a warning. */
  priceMinor: amountSchema,
});
export type QuoteGroup = z.infer<typeof quoteGroupSchema>;

export const quoteWarningSchema = z.strictObject({
  code: z.enum([
    'no-price',
    'no-part',
    'no-connector',
    'no-control',
    'length-unknown',
    'override-without-line',
    'deposit-capped',
    'no-tax',
    'empty-group',
    'item-not-in-catalogue',
  ]),
  message: z.string(),
  lineKey: z.string().nullable(),
  recordIds: z.array(z.string()),
});
export type QuoteWarning = z.infer<typeof quoteWarningSchema>;

export const quoteSchema = z.strictObject({
  currency: z.string(),
  locale: z.string(),
  groups: z.array(quoteGroupSchema),
  lines: z.array(quoteLineSchema),
  discountName: z.string(),
  tax: z.strictObject({ name: z.string(), jurisdiction: z.string(), percent: z.number() }).nullable(),
  /** Every combination; the one with each group as it is offered first. */
  combinations: z.array(totalsSchema),
  /** Costs of the first combination; null where not for the eyes of whoever asked. */
  margin: z
    .strictObject({
      costMinor: amountSchema,
      overheadMinor: amountSchema,
      /** Price before tax less cost and overhead. */
      profitMinor: signedAmountSchema,
      /** Profit as a share of the price before tax; null where that is 0. */
      profitPercent: z.number().nullable(),
    })
    .nullable(),
  warnings: z.array(quoteWarningSchema),
});
export type Quote = z.infer<typeof quoteSchema>;
