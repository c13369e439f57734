import { z } from 'zod';
import { choice, quantity, strict } from './field.js';

/** The gauges and cross-sections that the estimate knows; see the solver's conductor table for their ohms. */
export const AWG_GAUGES = [8, 10, 12, 14, 16, 18] as const;
export const SQUARE_MILLIMETRES = [1.5, 2.5, 4, 6, 10, 16] as const;

export const awgConductorSchema = strict('Conductor', { awg: choice('Gauge', AWG_GAUGES) });
export const metricConductorSchema = strict('Conductor', {
  mm2: choice('Cross-section', SQUARE_MILLIMETRES),
});
export const givenConductorSchema = strict('Conductor', {
  ohmsPerKm: quantity('Resistance per conductor', 'Ω/km', { above: 0 }),
});

/** One conductor of a two-wire cable: stranded copper by gauge, class 5 copper by area, or ohms as given at 20 °C. */
export const conductorSchema = z.union([awgConductorSchema, metricConductorSchema, givenConductorSchema]);
export type Conductor = z.infer<typeof conductorSchema>;
