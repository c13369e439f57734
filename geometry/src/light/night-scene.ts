import { z } from 'zod';
import { fixtureKinds } from '../catalogue/index.js';
import { scheduleSchema } from '../plan/index.js';

/**
 * All that the light of one sheet is worked out from and drawn from: lamps in space, what stops their light, and
 * how the sheet sees the ground. Lengths are metres in the sheet's ground frame with z up; places marked on the
 * sheet are its pixels. Plain data, as it goes to the homeowner's page.
 */
const pixel = z.strictObject({ x: z.number(), y: z.number() });
const positive = z.number().positive();
const degreesK = positive;

export const lightSourceSchema = z.strictObject({
  /** The fixture's record. */
  id: z.string(),
  kind: z.enum(fixtureKinds),
  x: z.number(),
  y: z.number(),
  z: z.number(),
  /** Unit vector along the middle of the beam. */
  axis: z.tuple([z.number(), z.number(), z.number()]),
  /** Of one light, at its rated volts. */
  peakCandela: z.number().min(0),
  /** Radians to half of the peak; null: the same in all directions. */
  halfAngle: positive.nullable(),
  shield: z.number().min(0).max(1),
  /** How many alike stand here. */
  quantity: z.number().int().min(1),
  /** Share of its rated light at its volts: 0 for dark, over 1 for a filament that is overdriven. */
  output: z.number().min(0),
  /** At its volts. */
  cctKelvin: degreesK,
  zoneId: z.string(),
  /** The group that the homeowner takes it with; null: always in. */
  groupId: z.string().nullable(),
  /** The tree that it hangs in, whose crown does not stop its light. */
  treeId: z.string().nullable(),
});
export type LightSource = z.infer<typeof lightSourceSchema>;

/** What is switched together. `feed`: all that hangs on a transformer; `run`: one run with a switch of its own; `smart`: lamps that switch themselves. */
export const controlZoneSchema = z.strictObject({
  id: z.string(),
  kind: z.enum(['feed', 'run', 'smart']),
  name: z.string(),
  schedule: scheduleSchema,
});
export type ControlZone = z.infer<typeof controlZoneSchema>;

export const nightSceneSchema = z.strictObject({
  sheetId: z.string(),
  view: z.enum(['plan', 'photo']),
  widthPx: z.number().int().min(1),
  heightPx: z.number().int().min(1),
  /** Sheet pixels to ground metres, row by row: (x, y, w) = M · (u, v, 1); seen where w > 0. */
  groundMatrix: z.array(z.number()).length(9),
  /** Lux on white that the picture shows as white. */
  whiteLux: positive,
  sources: z.array(lightSourceSchema),
  /** Upright surfaces, along their foot; with the upper edge as seen on a photo. */
  faces: z.array(
    z.strictObject({
      id: z.string(),
      foot: z.array(pixel).min(2),
      top: z.array(pixel).min(2).nullable(),
      heightMeters: positive,
    }),
  ),
  trees: z.array(
    z.strictObject({
      id: z.string(),
      foot: pixel,
      outline: z.array(pixel).min(3),
      heightMeters: positive,
      crownBaseMeters: z.number().min(0),
    }),
  ),
  /** Footprints of buildings that no light goes through. */
  buildings: z.array(
    z.strictObject({ id: z.string(), points: z.array(pixel).min(3), heightMeters: positive }),
  ),
  zones: z.array(controlZoneSchema),
});
export type NightScene = z.infer<typeof nightSceneSchema>;

/** Where and in which time zone the evening is; no place: sunset is not known. */
export const eveningPlaceSchema = z.strictObject({
  place: z
    .strictObject({ latitude: z.number().min(-90).max(90), longitude: z.number().min(-180).max(180) })
    .nullable(),
  timeZone: z.string(),
});
export type EveningPlace = z.infer<typeof eveningPlaceSchema>;
