import { z } from 'zod';
import { conductorSchema } from './conductor.js';
import { shown } from './fault.js';
import { choice, list, name, quantity, strict } from './field.js';

/**
 * What is asked of the estimate: transformers, and the runs of cable on their terminals. SI throughout: metres,
 * ohms, volts, amperes, watts, volt-amperes, °C. Defaults are filled in by `normalizeEstimateRequest`, not here, so
 * that the same schema describes what a caller may send.
 */

/** The most that a low-voltage terminal or window may say. */
const MAX_VOLTS = 60;
const MAX_LENGTH_METERS = 10_000;

const watts = quantity('Watts', 'W', { above: 0 });
const ratedVolts = quantity('Rated volts', 'V', { above: 0 });
const lengthMeters = quantity('Length', 'm', { atLeast: 0, atMost: MAX_LENGTH_METERS });
const extraOhms = quantity('Extra resistance', 'Ω', { atLeast: 0 });

export const driverLoadSchema = strict('Load', {
  kind: z.literal('driver'),
  watts,
  powerFactor: quantity('Power factor', '', { above: 0, atMost: 1 }).optional(),
  minVolts: quantity('Minimum volts', 'V', { above: 0 }),
});
export const filamentLoadSchema = strict('Load', { kind: z.literal('filament'), watts, ratedVolts });
export const resistiveLoadSchema = strict('Load', { kind: z.literal('resistive'), watts, ratedVolts });
export const currentLoadSchema = strict('Load', {
  kind: z.literal('current'),
  amps: quantity('Amps', 'A', { atLeast: 0 }),
});
export const offLoadSchema = strict('Load', { kind: z.literal('off') });

export const loadSchema = z.discriminatedUnion(
  'kind',
  [driverLoadSchema, filamentLoadSchema, resistiveLoadSchema, currentLoadSchema, offLoadSchema],
  {
    // Called for a load that is no object as well as for one of an unknown kind.
    error: ({ input }) =>
      typeof input === 'object' && input !== null
        ? 'Kind of load must be one of driver, filament, resistive, current, off.'
        : input === undefined
          ? 'Load is missing; it must be an object with a kind.'
          : `Load must be an object with a kind; got ${shown(input)}.`,
  },
);
export type Load = z.infer<typeof loadSchema>;

/** A range of volts, both bounds included. */
export const voltRangeSchema = strict('Range of volts', {
  minVolts: quantity('Lowest volts', 'V', { above: 0 }),
  maxVolts: quantity('Highest volts', 'V', { above: 0, atMost: MAX_VOLTS }),
});
export type VoltRange = z.infer<typeof voltRangeSchema>;

export const leadSchema = strict('Lead', {
  conductor: conductorSchema,
  lengthMeters,
  extraOhms: extraOhms.optional(),
});
export type Lead = z.infer<typeof leadSchema>;

export const fixtureSchema = strict('Fixture', {
  id: name('Fixture id'),
  at: name('Node of the fixture'),
  quantity: quantity('Quantity', '', { atLeast: 1, atMost: 1000, whole: true }).optional(),
  load: loadSchema,
  lead: leadSchema.optional(),
  window: voltRangeSchema,
  target: voltRangeSchema.optional(),
});
export type EstimateFixture = z.infer<typeof fixtureSchema>;

export const cableSchema = strict('Cable', {
  id: name('Cable id'),
  from: name('Node at the start of the cable'),
  to: name('Node at the end of the cable'),
  lengthMeters,
  conductor: conductorSchema,
  extraOhms: extraOhms.optional(),
  ampacityAmps: quantity('Ampacity', 'A', { above: 0 }).optional(),
});
export type EstimateCable = z.infer<typeof cableSchema>;

export const runSchema = strict('Run', {
  id: name('Run id'),
  transformerId: name('Transformer of the run'),
  tapId: name('Tap of the run'),
  commonId: name('Common of the run'),
  source: name('Source node of the run'),
  cables: list('Cables', cableSchema),
  fixtures: list('Fixtures', fixtureSchema),
});
export type EstimateRun = z.infer<typeof runSchema>;

export const windingSchema = strict('Winding', {
  id: name('Winding id'),
  ratedVA: quantity('Rated VA of the winding', 'VA', { above: 0 }),
});
export type EstimateWinding = z.infer<typeof windingSchema>;

export const tapSchema = strict('Tap', {
  id: name('Tap id'),
  volts: quantity('Volts of the tap', 'V', { above: 0, atMost: MAX_VOLTS }),
  winding: name('Winding of the tap').optional(),
  limitAmps: quantity('Limit of the tap', 'A', { above: 0 }).optional(),
});
export type EstimateTap = z.infer<typeof tapSchema>;

export const commonSchema = strict('Common', {
  id: name('Common id'),
  limitAmps: quantity('Limit of the common', 'A', { above: 0 }).optional(),
  winding: name('Winding of the common').optional(),
});
export type EstimateCommon = z.infer<typeof commonSchema>;

export const transformerSchema = strict('Transformer', {
  id: name('Transformer id'),
  ratedVA: quantity('Rated VA', 'VA', { above: 0 }),
  lineVolts: quantity('Line volts', 'V', { above: 0 }).optional(),
  nominalLineVolts: quantity('Nominal line volts', 'V', { above: 0 }).optional(),
  regulationPercent: quantity('Regulation', '%', { atLeast: 0, atMost: 100 }).optional(),
  ratedAt: choice('Rated at', ['open', 'load']).optional(),
  windings: list('Windings', windingSchema)
    .min(1, 'Windings must name at least one, or be left out.')
    .optional(),
  taps: list('Taps', tapSchema),
  commons: list('Commons', commonSchema),
});
export type EstimateTransformer = z.infer<typeof transformerSchema>;

export const estimateRequestSchema = strict('Request', {
  conductorTemperatureC: quantity('Conductor temperature', '°C', { atLeast: -60, atMost: 120 }).optional(),
  transformers: list('Transformers', transformerSchema),
  runs: list('Runs', runSchema),
});
export type EstimateRequest = z.infer<typeof estimateRequestSchema>;
