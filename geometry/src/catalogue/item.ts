import { z } from 'zod';
import { conductorSchema, loadSchema, voltWindowSchema } from './electrical.js';

const name = z.string().trim().min(1).max(120);
const note = z.string().max(2000);
const terminalId = z.string().min(1).max(24);
const positive = z.number().positive();
const meters = z.number().min(0).max(10_000);

/** The trade's kinds of fixture. The plan marks each with its initial (see `fixtureInitial`). */
export const fixtureKinds = [
  'path',
  'up',
  'down',
  'flood',
  'wall-wash',
  'step',
  'in-grade',
  'bollard',
  'linear',
  'underwater',
] as const;
export type FixtureKind = (typeof fixtureKinds)[number];

/** The letter a fixture of this kind wears on the plan. */
export function fixtureInitial(kind: FixtureKind): string {
  switch (kind) {
    case 'path':
      return 'P';
    case 'up':
      return 'U';
    case 'down':
      return 'D';
    case 'flood':
    case 'wall-wash':
      return 'F';
    case 'step':
      return 'S';
    case 'in-grade':
      return 'G';
    case 'bollard':
      return 'B';
    case 'linear':
      return 'L';
    case 'underwater':
      return 'W';
  }
}

/** What a light source is: shared by lamps and by fixtures with the light built in. */
const lightSource = {
  load: loadSchema,
  /** What the maker rates it for; outside is a fault. */
  window: voltWindowSchema,
  /** What the company aims at; outside is advice. Null: no aim. */
  target: voltWindowSchema.nullable(),
  lumens: positive.nullable(),
  /** Full angle at which the light has fallen to half of its peak; 360: the same all around. */
  beamDegrees: positive.max(360).nullable(),
  cctKelvin: positive.nullable(),
  /** Measured in the middle of the beam; left out or null: worked out from lumens and beam. */
  peakCandela: positive.nullable().optional(),
  /** Switched by itself or with its zone, apart from its feed; left out: no. */
  smart: z.boolean().optional(),
};

const fixtureCommon = {
  category: z.literal('fixture'),
  name,
  note: note.optional(),
  kind: z.enum(fixtureKinds),
  /** The lead that comes with it, from its splice to the lamp. */
  lead: z.strictObject({ conductor: conductorSchema, lengthMeters: meters }),
  mountingHeightMeters: meters.nullable(),
  /** Share of the light outside of the beam angle that its hood, shield or louvre holds back; left out: none. */
  shieldFactor: z
    .number()
    .min(0, { error: 'At least 0 %.' })
    .max(1, { error: 'At most 100 %: no more light than there is.' })
    .optional(),
  /** Listed for use in water: clearances to pools do not apply. */
  wetListed: z.boolean(),
};

/** A fixture with its light built in. */
export const integratedFixtureSchema = z.strictObject({
  ...fixtureCommon,
  light: z.literal('integrated'),
  ...lightSource,
});
/** A fixture that takes a lamp with the given base. */
export const lampedFixtureSchema = z.strictObject({
  ...fixtureCommon,
  light: z.literal('lamp'),
  base: z.string().min(1).max(24),
  /** The most a lamp in it may draw. */
  maxWatts: positive.nullable(),
});
export const fixtureItemSchema = z.discriminatedUnion('light', [
  integratedFixtureSchema,
  lampedFixtureSchema,
]);

export const lampItemSchema = z.strictObject({
  category: z.literal('lamp'),
  name,
  note: note.optional(),
  base: z.string().min(1).max(24),
  technology: z.enum(['led', 'halogen', 'incandescent']),
  ...lightSource,
  lifeHours: positive.nullable(),
});

export const cableItemSchema = z.strictObject({
  category: z.literal('cable'),
  name,
  note: note.optional(),
  conductor: conductorSchema,
  ampacityAmps: positive.nullable(),
  directBurial: z.boolean(),
});

export const terminalSchema = z.discriminatedUnion('type', [
  z.strictObject({
    type: z.literal('tap'),
    id: terminalId,
    volts: positive.max(60),
    winding: terminalId,
    limitAmps: positive.nullable(),
    maxConductors: z.number().int().min(1).max(12),
  }),
  z.strictObject({
    type: z.literal('common'),
    id: terminalId,
    winding: terminalId,
    limitAmps: positive.nullable(),
    maxConductors: z.number().int().min(1).max(12),
  }),
]);
export type Terminal = z.infer<typeof terminalSchema>;

export const transformerItemSchema = z
  .strictObject({
    category: z.literal('transformer'),
    name,
    note: note.optional(),
    ratedVA: positive,
    nominalLineVolts: positive,
    regulationPercent: z.number().min(0).max(50),
    ratedAt: z.enum(['open', 'load']),
    windings: z
      .array(z.strictObject({ id: terminalId, ratedVA: positive }))
      .min(1)
      .max(8),
    /** In the order in which they sit on the unit, left to right. */
    terminals: z.array(terminalSchema).min(2).max(32),
    supply: z.enum(['ac', 'dc']),
  })
  .superRefine((t, ctx) => {
    const windings = new Set(t.windings.map((w) => w.id));
    const seen = new Set<string>();
    t.terminals.forEach((terminal, i) => {
      if (seen.has(terminal.id))
        ctx.addIssue({
          code: 'custom',
          path: ['terminals', i, 'id'],
          message: `Terminal ${terminal.id} is listed twice.`,
        });
      seen.add(terminal.id);
      if (!windings.has(terminal.winding))
        ctx.addIssue({
          code: 'custom',
          path: ['terminals', i, 'winding'],
          message: `There is no winding ${terminal.winding}.`,
        });
    });
    if (!t.terminals.some((x) => x.type === 'tap') || !t.terminals.some((x) => x.type === 'common'))
      ctx.addIssue({
        code: 'custom',
        path: ['terminals'],
        message: 'A transformer needs at least one tap and one common.',
      });
  });

export const hubItemSchema = z.strictObject({
  category: z.literal('hub'),
  name,
  note: note.optional(),
  ways: z.number().int().min(2).max(32),
});

export const connectorItemSchema = z.strictObject({
  category: z.literal('connector'),
  name,
  note: note.optional(),
  minConductors: z.number().int().min(1).max(12),
  maxConductors: z.number().int().min(1).max(12),
  largestAwg: z.number().int(),
  smallestAwg: z.number().int(),
  directBurial: z.boolean(),
});

export const controlItemSchema = z.strictObject({
  category: z.literal('control'),
  name,
  note: note.optional(),
  kind: z.enum(['timer', 'photocell', 'smart-plug']),
  ratedVA: positive,
  inrushAmps: positive.nullable(),
});

/** What holds a fixture or a transformer in its place, and what protects its cable. */
export const partItemSchema = z.strictObject({
  category: z.literal('part'),
  name,
  note: note.optional(),
  use: z.enum(['ground-stake', 'tree-mount', 'surface-mount', 'transformer-mount', 'conduit', 'other']),
});

export const catalogueItemSchema = z.discriminatedUnion('category', [
  fixtureItemSchema,
  lampItemSchema,
  cableItemSchema,
  transformerItemSchema,
  hubItemSchema,
  connectorItemSchema,
  controlItemSchema,
  partItemSchema,
]);
export type CatalogueItem = z.infer<typeof catalogueItemSchema>;
export type CatalogueCategory = CatalogueItem['category'];
export type FixtureItem = z.infer<typeof fixtureItemSchema>;
export type LampItem = z.infer<typeof lampItemSchema>;
export type CableItem = z.infer<typeof cableItemSchema>;
export type TransformerItem = z.infer<typeof transformerItemSchema>;
export type HubItem = z.infer<typeof hubItemSchema>;
export type ConnectorItem = z.infer<typeof connectorItemSchema>;
export type ControlItem = z.infer<typeof controlItemSchema>;
export type PartItem = z.infer<typeof partItemSchema>;
