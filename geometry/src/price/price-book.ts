import { z } from 'zod';
import { fixtureKinds } from '../catalogue/index.js';

/**
 * What a company's work costs and how a price is made of it. Money is in whole minor units of the company's
 * currency (cents); percents have at most four decimals.
 */

/** Money that is never negative, in minor units. */
export const amountSchema = z.number().int().min(0).max(1_000_000_000_000);
/** Money either way, in minor units. */
export const signedAmountSchema = z.number().int().min(-1_000_000_000_000).max(1_000_000_000_000);

/** Percent; a ten-thousandth of a percent is the finest step, so that 6.625 % is kept exactly. */
const fourDecimals = (n: number) => Math.abs(n * 10_000 - Math.round(n * 10_000)) < 1e-6;
export const percentSchema = z
  .number()
  .min(0)
  .max(1000)
  .refine(fourDecimals, { error: 'A percentage has at most four decimals.' });
const sharePercentSchema = z
  .number()
  .min(0)
  .max(100)
  .refine(fourDecimals, { error: 'A percentage has at most four decimals.' });

/** A unit in which things are counted on a proposal. */
export const saleUnits = ['each', 'foot', 'meter', 'visit'] as const;
export const saleUnitSchema = z.enum(saleUnits);
export type SaleUnit = z.infer<typeof saleUnitSchema>;

const wholeThousandths = (n: number) => Math.abs(n * 1000 - Math.round(n * 1000)) < 1e-6;
/** How many units a sum or a package is for: at most three decimals, so that lines are exact. */
const unitCountSchema = z
  .number()
  .min(0.001)
  .max(100_000)
  .refine(wholeThousandths, { error: 'At most three decimals, please.' });

/** What one catalogue item costs, and how it is bought. */
export const itemPriceSchema = z.strictObject({
  /** What the company pays for `per` units; null: not known. */
  costMinor: amountSchema.nullable(),
  /** What it sells `per` units for; null: made from the cost by overhead and markup. */
  priceMinor: amountSchema.nullable(),
  /** How many units the two sums are for, such as 250 for a spool of 250 ft. */
  per: unitCountSchema,
  unit: z.enum(['each', 'foot', 'meter']),
  /** It is bought in whole multiples of this many units. */
  increment: unitCountSchema,
  taxable: z.boolean(),
  supplier: z.string().trim().max(120),
  /** The supplier's number for it. */
  orderNumber: z.string().trim().max(60),
});
export type ItemPrice = z.infer<typeof itemPriceSchema>;

/** Markup is a share of the cost on top of it; margin is the share of the price that is not cost. */
export const profitSchema = z.discriminatedUnion('by', [
  z.strictObject({ by: z.literal('markup'), percent: percentSchema }),
  z.strictObject({
    by: z.literal('margin'),
    percent: z
      .number()
      .min(0)
      .max(95)
      .refine(fourDecimals, { error: 'A percentage has at most four decimals.' }),
  }),
]);
export type Profit = z.infer<typeof profitSchema>;

/** What the company's own hands cost. Each is a cost, to which overhead and markup come. */
export const rateCardSchema = z.strictObject({
  /** Placing and wiring one fixture, by its kind. */
  perFixture: z.strictObject(
    Object.fromEntries(fixtureKinds.map((kind) => [kind, amountSchema])) as Record<
      (typeof fixtureKinds)[number],
      typeof amountSchema
    >,
  ),
  /** The length that `perTrenched` and `perBored` are for. */
  lengthUnit: z.enum(['foot', 'meter']),
  perTrenched: amountSchema,
  /** Under paving. */
  perBored: amountSchema,
  perTransformer: amountSchema,
  /** On top of its fixture, for a light in a tree. */
  perTreeMount: amountSchema,
  perAimingVisit: amountSchema,
  /** How many a job has, where it does not say otherwise. */
  aimingVisits: z.number().int().min(0).max(20),
});
export type RateCard = z.infer<typeof rateCardSchema>;

export const taxSchema = z.strictObject({
  id: z.string().min(1).max(40),
  /** As it stands on the proposal: "Sales tax", "VAT". */
  name: z.string().trim().min(1).max(60),
  /** Where it holds. */
  jurisdiction: z.string().trim().max(80),
  percent: sharePercentSchema,
  onMaterials: z.boolean(),
  onLabour: z.boolean(),
});
export type Tax = z.infer<typeof taxSchema>;

/** A part of the price and when it falls due. The last stage takes what the others leave. */
export const paymentStageSchema = z.strictObject({
  id: z.string().min(1).max(40),
  name: z.string().trim().min(1).max(60),
  due: z.enum(['approval', 'start', 'finish']),
  /** Of the total; that of the last stage is not looked at. */
  percent: sharePercentSchema,
});
export type PaymentStage = z.infer<typeof paymentStageSchema>;

export const paymentStagesSchema = z
  .array(paymentStageSchema)
  .min(1)
  .max(6)
  .superRefine((stages, ctx) => {
    const early = stages.slice(0, -1).reduce((sum, stage) => sum + stage.percent, 0);
    if (early > 100)
      ctx.addIssue({
        code: 'custom',
        path: [],
        message: 'The stages before the last come to more than 100 %.',
      });
    stages.forEach((stage, i) => {
      if (stages.findIndex(({ id }) => id === stage.id) !== i)
        ctx.addIssue({ code: 'custom', path: [i, 'id'], message: `The stage ${stage.id} is listed twice.` });
    });
  });

/** What parts the plan does not show are taken from the catalogue by default: ids of catalogue items. */
export const partUses = [
  'ground-stake',
  'tree-mount',
  'surface-mount',
  'transformer-mount',
  'conduit',
] as const;
export type PartUse = (typeof partUses)[number];
const itemId = z.uuid();

export const priceBookSchema = z.strictObject({
  /** BCP 47, for the words and figures of money: "en-US". */
  locale: z
    .string()
    .max(35)
    .regex(/^[a-z]{2,3}(-[A-Za-z0-9]{2,8})*$/, { error: 'A locale looks like en-US.' }),
  rates: rateCardSchema,
  /** Rent, vehicles, insurance: a share of cost that comes on top before markup. */
  overheadPercent: percentSchema,
  materials: profitSchema,
  labour: profitSchema,
  /** Cable bought beyond what is measured. */
  cableWastePercent: sharePercentSchema,
  conduitWastePercent: sharePercentSchema,
  taxes: z.array(taxSchema).max(30),
  defaultTaxId: z.string().nullable(),
  stages: paymentStagesSchema,
  /** The most that the law lets the company ask for before work begins; null: no such cap. */
  depositCap: z.strictObject({
    percent: sharePercentSchema.nullable(),
    amountMinor: amountSchema.nullable(),
  }),
  designersSeeCosts: z.boolean(),
  /** Whether the homeowner sees a price beside each line, or one a group. */
  showLinePrices: z.boolean(),
  /** Null: the first that the catalogue has. */
  parts: z.strictObject(
    Object.fromEntries(partUses.map((use) => [use, itemId.nullable()])) as Record<
      PartUse,
      z.ZodNullable<typeof itemId>
    >,
  ),
  /** The control of a transformer, where the job does not say otherwise. Null: none. */
  controlItemId: itemId.nullable(),
  validDays: z.number().int().min(1).max(365),
});
export type PriceBook = z.infer<typeof priceBookSchema>;
