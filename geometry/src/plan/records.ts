import { z } from 'zod';
import { catalogueItemSchema, conductorSchema } from '../catalogue/index.js';
import { scheduleSchema } from './schedule.js';

/**
 * The records of a plan. A plan is a set of these, keyed by id; every edit is one change that puts and
 * removes whole records. Placed records hold sheet pixels: metres are derived through the sheet's
 * calibration, so recalibrating moves nothing.
 */

/** Not led by an underscore, so that no id can be the name of an object's prototype. */
export const recordIdSchema = z.string().regex(/^[A-Za-z0-9-][A-Za-z0-9_-]{0,63}$/, {
  error: 'A record id has 1 to 64 letters, digits, - or _, and does not begin with _.',
});
const id = recordIdSchema;
const name = z.string().max(120);
const number = z.number().int().min(1).max(99_999);
const meters = z.number().min(0).max(10_000);

/** Sheet pixels; a little outside of the sheet is allowed, absurdly far is not. */
export const pointSchema = z.strictObject({
  x: z.number().min(-100_000).max(100_000),
  y: z.number().min(-100_000).max(100_000),
});
export type PlanPoint = z.infer<typeof pointSchema>;

const placed = { sheetId: id, at: pointSchema };

export const lengthReferenceSchema = z.strictObject({
  id,
  kind: z.literal('length'),
  a: pointSchema,
  b: pointSchema,
  meters: z.number().positive().max(10_000),
});
export const rectangleReferenceSchema = z.strictObject({
  id,
  kind: z.literal('rectangle'),
  /** In order around; width is corner 0 to 1, depth is corner 1 to 2. */
  corners: z.tuple([pointSchema, pointSchema, pointSchema, pointSchema]),
  widthMeters: z.number().positive().max(10_000),
  depthMeters: z.number().positive().max(10_000),
});
export const referenceSchema = z.discriminatedUnion('kind', [
  lengthReferenceSchema,
  rectangleReferenceSchema,
]);
export type ReferenceRecord = z.infer<typeof referenceSchema>;

/** A drawing the plan is made over. The image itself is the stored sheet of the same id. */
export const sheetRecordSchema = z.strictObject({
  kind: z.literal('sheet'),
  id,
  name,
  order: z.number().int().min(0).max(9999),
  widthPx: z.number().int().min(1).max(4096),
  heightPx: z.number().int().min(1).max(4096),
  view: z.enum(['plan', 'photo']),
  /** Known for drawings rasterised from paper; null for photos and scans of unknown resolution. */
  pixelsPerPaperMeter: z.number().positive().nullable(),
  references: z.array(referenceSchema).max(50),
  /** Typed drawing scale: metres of ground per metre of paper (1:100 is 100). */
  groundMetersPerPaperMeter: z.number().positive().max(1_000_000).nullable(),
  /** Lux on white that the night picture of this sheet shows as white; null: the usual. */
  whiteLux: z.number().min(0.1).max(10_000).nullable(),
});

export const transformerRecordSchema = z.strictObject({
  kind: z.literal('transformer'),
  id,
  ...placed,
  number,
  name,
  itemId: id,
  /** Line volts at its outlet; null: the plan's. */
  lineVolts: z.number().positive().max(600).nullable(),
  /** When its control switches it; null: as the plan says. */
  schedule: scheduleSchema.nullable(),
  note: z.string().max(2000),
});

/** Where the feed of a transformer drawn on another sheet comes onto this one. */
export const feedRecordSchema = z.strictObject({
  kind: z.literal('feed'),
  id,
  ...placed,
  transformerId: id,
  name,
});

/**
 * Where a fixture points. `tilt`: towards a place on the ground (for its direction only), so many degrees up
 * from straight down (90 is level, 180 straight up). `point`: at a place on the ground or so high above it.
 */
export const aimSchema = z.discriminatedUnion('kind', [
  z.strictObject({
    kind: z.literal('tilt'),
    toward: pointSchema,
    degreesFromDown: z.number().min(0).max(180),
  }),
  z.strictObject({ kind: z.literal('point'), at: pointSchema, heightMeters: meters.max(100) }),
]);
export type Aim = z.infer<typeof aimSchema>;

export const fixtureRecordSchema = z.strictObject({
  kind: z.literal('fixture'),
  id,
  ...placed,
  number,
  name,
  itemId: id,
  /** The lamp in it, where the fixture takes one; null otherwise. */
  lampId: id.nullable(),
  quantity: z.number().int().min(1).max(1000),
  /** Null: the lead that comes with the item. */
  lead: z.strictObject({ conductor: conductorSchema, lengthMeters: meters }).nullable(),
  /** Null: as its kind usually points. */
  aim: aimSchema.nullable(),
  /** Of the light above the ground; null: the item's. */
  mountingHeightMeters: meters.max(100).nullable(),
  /** The zone that its smart lamp is switched with; null: with the feed. */
  zoneId: id.nullable(),
  note: z.string().max(2000),
});

/** A point where cables meet: a hub with its box, a buried splice, or the capped end of a cable. */
export const junctionRecordSchema = z.strictObject({
  kind: z.literal('junction'),
  id,
  ...placed,
  style: z.enum(['hub', 'splice']),
  number,
  name,
  itemId: id.nullable(),
});

/** A feed from one tap and one common of a transformer, and all cable that hangs on it. */
export const runRecordSchema = z.strictObject({
  kind: z.literal('run'),
  id,
  number,
  name,
  transformerId: id,
  tapId: z.string().min(1).max(24),
  commonId: z.string().min(1).max(24),
  /** With a switch of its own on its home run: when that is on. Null: it is on with its transformer. */
  schedule: scheduleSchema.nullable(),
});

/** A length of cable between two records (transformer, feed, fixture or junction) of one sheet. */
export const cableRecordSchema = z.strictObject({
  kind: z.literal('cable'),
  id,
  sheetId: id,
  /** The run it belongs to; null while nothing feeds it. */
  runId: id.nullable(),
  fromId: id,
  toId: id,
  /** Bends between the ends, in order. */
  via: z.array(pointSchema).max(500),
  itemId: id,
  /** Length measured on site, in place of the drawn one; slack and rise still come on top. */
  measuredMeters: meters.nullable(),
  /** Null: the plan's setting for that kind of end. */
  slackFromMeters: meters.nullable(),
  slackToMeters: meters.nullable(),
  riseMeters: meters,
  /** Resistance of splices and terminals on it. */
  extraOhms: z.number().min(0).max(1000),
  /** The person drawing it confirmed marked-to-marked where it closes a loop or joins two fed ends. */
  markedToMarked: z.boolean(),
});

const share = z.number().min(0).max(1);

/** What light is wanted along a measured path or in an area. */
export const lightTargetSchema = z.strictObject({
  /** Least lux anywhere; null: none asked. */
  leastLux: z.number().positive().max(10_000).nullable(),
  meanLux: z.number().positive().max(10_000).nullable(),
  /** Least divided by mean. */
  uniformity: share.nullable(),
});
export type LightTarget = z.infer<typeof lightTargetSchema>;

export const areaUses = ['lawn', 'bed', 'paved', 'building', 'canopy', 'water', 'lot-line'] as const;
export type AreaUse = (typeof areaUses)[number];
export const areaRecordSchema = z.strictObject({
  kind: z.literal('area'),
  id,
  sheetId: id,
  use: z.enum(areaUses),
  name,
  points: z.array(pointSchema).min(3).max(2000),
  heightMeters: meters.nullable(),
  lightTarget: lightTargetSchema.nullable(),
});

/**
 * An upright surface: a house face, a wall, a fence. `foot` runs along the ground. On a photo, `top` is its
 * upper edge as seen there, point by point above `foot`; on a drawing from above it is null.
 */
export const faceRecordSchema = z
  .strictObject({
    kind: z.literal('face'),
    id,
    sheetId: id,
    name,
    foot: z.array(pointSchema).min(2).max(50),
    top: z.array(pointSchema).min(2).max(50).nullable(),
    heightMeters: z.number().positive().max(100),
  })
  .refine((face) => face.top === null || face.top.length === face.foot.length, {
    error: 'The upper edge of a face has as many points as its foot.',
    path: ['top'],
  });

/**
 * A tree or shrub. `foot` is where it stands; `outline` is the crown: on a photo its silhouette, on a drawing
 * its edge seen from above.
 */
export const treeRecordSchema = z
  .strictObject({
    kind: z.literal('tree'),
    id,
    sheetId: id,
    name,
    foot: pointSchema,
    outline: z.array(pointSchema).min(3).max(500),
    /** Of the top of the crown above the ground. */
    heightMeters: z.number().positive().max(100),
    /** Of the lower edge of the crown; 0 for a shrub. */
    crownBaseMeters: meters.max(100),
  })
  .refine((tree) => tree.crownBaseMeters < tree.heightMeters, {
    error: 'The crown must begin below the top of the tree.',
    path: ['crownBaseMeters'],
  });

/** Lights with smart lamps that are switched together, apart from their feed. */
export const zoneRecordSchema = z.strictObject({
  kind: z.literal('zone'),
  id,
  name: z.string().trim().min(1).max(120),
  schedule: scheduleSchema,
});

export const measurementRecordSchema = z.strictObject({
  kind: z.literal('measurement'),
  id,
  sheetId: id,
  points: z.array(pointSchema).min(2).max(500),
  /** Set where it is a path that is to be lit. */
  lightTarget: lightTargetSchema.nullable(),
});

export const noteRecordSchema = z.strictObject({
  kind: z.literal('note'),
  id,
  ...placed,
  text: z.string().max(4000),
});

/** The plan's own copy of a catalogue item that it uses. */
export const itemRecordSchema = z.strictObject({
  kind: z.literal('item'),
  id,
  /** The catalogue entry it was copied from. */
  sourceId: z.string().max(64).nullable(),
  item: catalogueItemSchema,
});

export const SETTINGS_ID = 'settings';
export const settingsRecordSchema = z.strictObject({
  kind: z.literal('settings'),
  id: z.literal(SETTINGS_ID),
  lineVolts: z.number().positive().max(600),
  conductorTemperatureC: z.number().min(-60).max(120),
  slackAtFixtureMeters: meters,
  slackAtTransformerMeters: meters,
  slackAtJunctionMeters: meters,
  /** The region's least distance of a fixture from water. */
  waterClearanceMeters: meters,
  /** When the lights are on, where nothing else is said. */
  schedule: scheduleSchema,
});

export const planRecordSchema = z.discriminatedUnion('kind', [
  sheetRecordSchema,
  transformerRecordSchema,
  feedRecordSchema,
  fixtureRecordSchema,
  junctionRecordSchema,
  runRecordSchema,
  cableRecordSchema,
  areaRecordSchema,
  faceRecordSchema,
  treeRecordSchema,
  zoneRecordSchema,
  measurementRecordSchema,
  noteRecordSchema,
  itemRecordSchema,
  settingsRecordSchema,
]);

export type PlanRecord = z.infer<typeof planRecordSchema>;
export type RecordKind = PlanRecord['kind'];
export type RecordOf<K extends RecordKind> = Extract<PlanRecord, { kind: K }>;
export type SheetRecord = RecordOf<'sheet'>;
export type TransformerRecord = RecordOf<'transformer'>;
export type FeedRecord = RecordOf<'feed'>;
export type FixtureRecord = RecordOf<'fixture'>;
export type JunctionRecord = RecordOf<'junction'>;
export type RunRecord = RecordOf<'run'>;
export type CableRecord = RecordOf<'cable'>;
export type AreaRecord = RecordOf<'area'>;
export type FaceRecord = RecordOf<'face'>;
export type TreeRecord = RecordOf<'tree'>;
export type ZoneRecord = RecordOf<'zone'>;
export type MeasurementRecord = RecordOf<'measurement'>;
export type NoteRecord = RecordOf<'note'>;
export type ItemRecord = RecordOf<'item'>;
export type SettingsRecord = RecordOf<'settings'>;

/** A plan: its records by id. Treated as immutable. */
export type PlanDocument = ReadonlyMap<string, PlanRecord>;
