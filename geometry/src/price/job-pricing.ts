import { z } from 'zod';
import { recordIdSchema } from '../plan/index.js';
import { amountSchema, paymentStagesSchema, percentSchema, saleUnitSchema } from './price-book.js';

/** The most groups that a homeowner can switch: 2⁶ combinations are each checked. */
export const MAX_GROUPS = 6;

const groupId = z.string().regex(/^[A-Za-z0-9-]{1,40}$/, { error: 'A group id has letters, digits and -.' });

/** Lights that the homeowner may take or leave together. */
export const groupSchema = z.strictObject({
  id: groupId,
  name: z.string().trim().min(1).max(60),
  /** For the homeowner, in plain words. */
  description: z.string().trim().max(400),
  /** Taken unless the homeowner switches it off; otherwise offered as an addition. */
  on: z.boolean(),
});
export type Group = z.infer<typeof groupSchema>;

export const discountSchema = z.discriminatedUnion('kind', [
  z.strictObject({ kind: z.literal('none') }),
  z.strictObject({ kind: z.literal('percent'), percent: percentSchema.max(100), name: z.string().max(60) }),
  z.strictObject({ kind: z.literal('amount'), amountMinor: amountSchema, name: z.string().max(60) }),
]);
export type Discount = z.infer<typeof discountSchema>;

/** A quantity: at most three decimals, so that lines are exact. */
export const quantitySchema = z
  .number()
  .min(0)
  .max(1_000_000)
  .refine((n) => Math.abs(n * 1000 - Math.round(n * 1000)) < 1e-6, {
    error: 'A quantity has at most three decimals.',
  });

/** A line that somebody wrote by hand. */
export const manualLineSchema = z.strictObject({
  id: z.string().regex(/^[A-Za-z0-9-]{1,40}$/),
  /** Null: the base. */
  groupId: groupId.nullable(),
  kind: z.enum(['material', 'labour']),
  name: z.string().trim().min(1).max(160),
  quantity: quantitySchema,
  unit: saleUnitSchema,
  /** For one unit. The price is made from the cost where it is null. */
  costMinor: amountSchema.nullable(),
  priceMinor: amountSchema.nullable(),
  taxable: z.boolean(),
});
export type ManualLine = z.infer<typeof manualLineSchema>;

/** What somebody put in place of what the plan says, for one line. */
export const lineOverrideSchema = z.strictObject({
  quantity: quantitySchema.nullable(),
  /** Of the whole line. */
  priceMinor: amountSchema.nullable(),
  /** Why, for whoever reads it later. */
  note: z.string().trim().max(300),
});
export type LineOverride = z.infer<typeof lineOverrideSchema>;

export const jobPricingSchema = z
  .strictObject({
    groups: z.array(groupSchema).max(MAX_GROUPS),
    /** Group by fixture record; a fixture that is not named here is in the base. */
    members: z.record(recordIdSchema, groupId),
    /** Null: the company's default. */
    taxId: z.string().max(40).nullable(),
    /** The work is not taxed at all, whatever the jurisdiction. */
    taxExempt: z.boolean(),
    discount: discountSchema,
    manualLines: z.array(manualLineSchema).max(300),
    /** By line key. One whose line is gone is kept and told. */
    overrides: z.record(z.string().max(200), lineOverrideSchema),
    /** Catalogue item of each transformer's control, by transformer record; null: none. Not named: the company's. */
    controls: z.record(recordIdSchema, z.uuid().nullable()),
    /** Null: the company's. */
    aimingVisits: z.number().int().min(0).max(20).nullable(),
    stages: paymentStagesSchema.nullable(),
  })
  .superRefine((pricing, ctx) => {
    const ids = new Set(pricing.groups.map(({ id }) => id));
    if (ids.size !== pricing.groups.length)
      ctx.addIssue({ code: 'custom', path: ['groups'], message: 'Two groups have the same id.' });
    for (const [record, group] of Object.entries(pricing.members))
      if (!ids.has(group))
        ctx.addIssue({ code: 'custom', path: ['members', record], message: `There is no group ${group}.` });
    const lines = new Set<string>();
    pricing.manualLines.forEach((line, i) => {
      if (line.groupId !== null && !ids.has(line.groupId))
        ctx.addIssue({
          code: 'custom',
          path: ['manualLines', i, 'groupId'],
          message: `There is no group ${line.groupId}.`,
        });
      if (lines.has(line.id))
        ctx.addIssue({
          code: 'custom',
          path: ['manualLines', i, 'id'],
          message: 'Two lines have the same id.',
        });
      lines.add(line.id);
    });
  });
export type JobPricing = z.infer<typeof jobPricingSchema>;

/** What a job begins with. */
export const emptyPricing: JobPricing = {
  groups: [],
  members: {},
  taxId: null,
  taxExempt: false,
  discount: { kind: 'none' },
  manualLines: [],
  overrides: {},
  controls: {},
  aimingVisits: null,
  stages: null,
};
