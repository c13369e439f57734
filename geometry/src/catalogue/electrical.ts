import { z } from 'zod';

export { type Conductor, conductorSchema, type Load, loadSchema } from '../estimate/contract/index.js';

const volts = z.number().positive().max(60);

/** Bounds in volts, both included. */
export const voltWindowSchema = z
  .strictObject({ minVolts: volts, maxVolts: volts })
  .refine((w) => w.minVolts <= w.maxVolts, {
    error: 'The lowest volts must not be above the highest.',
    path: ['maxVolts'],
  });
export type VoltWindow = z.infer<typeof voltWindowSchema>;
