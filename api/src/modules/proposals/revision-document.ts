import { eveningPlaceSchema } from '@lampwright/geometry/light';
import { paymentStagesSchema, quoteGroupSchema, totalsSchema } from '@lampwright/geometry/price';
import { z } from 'zod';

/**
 * What a revision of a proposal says, frozen: the plan, the price and the words. It is stored as canonical
 * JSON, and those bytes are hashed. It holds nothing that the homeowner may not see: no cost, no margin.
 */

const minor = z.number().int();

/** Words of a proposal: the company's, unless the job has its own. Plain text, paragraphs parted by empty lines. */
export const proposalWordsSchema = z.strictObject({
  scope: z.string().max(8000),
  exclusions: z.string().max(8000),
  /** When the work can begin and how long it takes. */
  timeline: z.string().max(4000),
  /** Who books the utility locate. */
  locate: z.string().max(4000),
  warranty: z.string().max(8000),
  terms: z.string().max(20_000),
  /** The cancellation rights of the region. */
  cancellation: z.string().max(8000),
});
export type ProposalWords = z.infer<typeof proposalWordsSchema>;

/** One light as the homeowner sees it. */
export const shownLightSchema = z.strictObject({
  recordId: z.string(),
  sheetId: z.string(),
  /** Sheet pixels. */
  x: z.number(),
  y: z.number(),
  /** "P1". */
  tag: z.string(),
  initial: z.string(),
  kind: z.string(),
  /** What it is, in plain words: "Brass path light, 3 W". */
  name: z.string(),
  /** What it lights, in plain words. */
  lights: z.string(),
  quantity: z.number().int(),
  /** Null: the base. */
  groupId: z.string().nullable(),
  /** Only under "technical details". */
  technical: z.strictObject({
    volts: z.number().nullable(),
    watts: z.number().nullable(),
    lumens: z.number().nullable(),
    beamDegrees: z.number().nullable(),
    cctKelvin: z.number().nullable(),
  }),
});
export type ShownLight = z.infer<typeof shownLightSchema>;

export const shownLineSchema = z.strictObject({
  key: z.string(),
  groupId: z.string().nullable(),
  section: z.string(),
  kind: z.enum(['material', 'labour']),
  name: z.string(),
  quantity: z.number(),
  unit: z.enum(['each', 'foot', 'meter', 'visit']),
  /** Null where the company shows one price a group. */
  priceMinor: minor.nullable(),
});
export type ShownLine = z.infer<typeof shownLineSchema>;

export const shownCombinationSchema = totalsSchema.extend({
  offerable: z.boolean(),
  /** Why it can't be offered, for the homeowner; empty where it can. */
  reason: z.string(),
});
export type ShownCombination = z.infer<typeof shownCombinationSchema>;

export const partySchema = z.strictObject({
  name: z.string(),
  email: z.string(),
  phone: z.string(),
  address: z.string(),
});

export const revisionDocumentSchema = z.strictObject({
  form: z.literal(1),
  number: z.number().int(),
  revision: z.number().int(),
  /** The approved revision that this one changes. */
  changes: z.strictObject({ revision: z.number().int(), hash: z.string(), totalMinor: minor }).nullable(),
  madeAt: z.iso.datetime(),
  validUntil: z.iso.date(),
  currency: z.string(),
  locale: z.string(),
  region: z.string(),
  units: z.enum(['imperial', 'metric']),
  company: partySchema.extend({ licence: z.string() }),
  client: partySchema,
  job: z.strictObject({ id: z.string(), name: z.string(), property: z.string() }),
  plan: z.strictObject({
    version: z.number().int(),
    records: z.array(z.looseObject({ kind: z.string(), id: z.string() })),
    /** The form of the records; left out in documents older than the second form. */
    schema: z.number().int().optional(),
  }),
  sheets: z.array(
    z.strictObject({
      id: z.string(),
      name: z.string(),
      view: z.enum(['plan', 'photo']),
      widthPx: z.number().int(),
      heightPx: z.number().int(),
    }),
  ),
  lights: z.array(shownLightSchema),
  /** Where and in which time zone its evenings are; left out in documents from before there were night pictures. */
  evening: eveningPlaceSchema.optional(),
  price: z.strictObject({
    groups: z.array(quoteGroupSchema),
    lines: z.array(shownLineSchema),
    discountName: z.string(),
    tax: z.strictObject({ name: z.string(), jurisdiction: z.string(), percent: z.number() }).nullable(),
    stages: paymentStagesSchema,
    /** The offered one first. */
    combinations: z.array(shownCombinationSchema),
  }),
  words: proposalWordsSchema,
  cautions: z.array(z.string()),
  acceptedFaults: z.array(
    z.strictObject({ message: z.string(), reason: z.string(), by: z.string(), at: z.iso.datetime() }),
  ),
});
export type RevisionDocument = z.infer<typeof revisionDocumentSchema>;

/** What changed between two revisions. */
export const differencesSchema = z.strictObject({
  added: z.array(z.strictObject({ recordId: z.string(), tag: z.string(), name: z.string() })),
  removed: z.array(z.strictObject({ recordId: z.string(), tag: z.string(), name: z.string() })),
  moved: z.array(
    z.strictObject({
      recordId: z.string(),
      tag: z.string(),
      name: z.string(),
      /** Null where the sheet has no scale. */
      meters: z.number().nullable(),
    }),
  ),
  /** Another lamp, fixture or quantity in the same place. */
  replaced: z.array(
    z.strictObject({ recordId: z.string(), tag: z.string(), was: z.string(), now: z.string() }),
  ),
  lines: z.array(
    z.strictObject({
      name: z.string(),
      wasQuantity: z.number(),
      nowQuantity: z.number(),
      unit: z.string(),
      /** Null where line prices are not shown. */
      byMinor: minor.nullable(),
    }),
  ),
  wasTotalMinor: minor,
  nowTotalMinor: minor,
});
export type Differences = z.infer<typeof differencesSchema>;
