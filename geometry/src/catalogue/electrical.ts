import { z } from 'zod';

const positive = z.number().positive();

/** Conductor of a two-wire cable or lead; the resistances behind each form are those of the estimate contract. */
export const conductorSchema = z.union([
  z.strictObject({
    awg: z.union([z.literal(8), z.literal(10), z.literal(12), z.literal(14), z.literal(16), z.literal(18)]),
  }),
  z.strictObject({
    mm2: z.union([z.literal(1.5), z.literal(2.5), z.literal(4), z.literal(6), z.literal(10), z.literal(16)]),
  }),
  z.strictObject({ ohmsPerKm: positive }),
]);
export type Conductor = z.infer<typeof conductorSchema>;

/** What a lamp or fixture draws; kinds and exponents are those of the estimate contract. */
export const loadSchema = z.discriminatedUnion('kind', [
  z.strictObject({
    kind: z.literal('driver'),
    watts: positive,
    powerFactor: z.number().positive().max(1).optional(),
    minVolts: positive.max(60),
  }),
  z.strictObject({ kind: z.literal('filament'), watts: positive, ratedVolts: positive.max(60) }),
  z.strictObject({ kind: z.literal('resistive'), watts: positive, ratedVolts: positive.max(60) }),
  z.strictObject({ kind: z.literal('current'), amps: positive }),
  z.strictObject({ kind: z.literal('off') }),
]);
export type Load = z.infer<typeof loadSchema>;

/** Bounds in volts, both included. */
export const voltWindowSchema = z
  .strictObject({ minVolts: positive.max(60), maxVolts: positive.max(60) })
  .refine((w) => w.minVolts <= w.maxVolts, {
    error: 'The lowest volts must not be above the highest.',
    path: ['maxVolts'],
  });
export type VoltWindow = z.infer<typeof voltWindowSchema>;
