import { z } from 'zod';

/** What the estimate answers; numbers are unrounded, SI. */

/**
 * `off`: an off load · `unwired`: no cable reaches it · `dark`: gives no useful light · `dim`: below its window ·
 * `overdriven`: above its window · `in-window`: bounds included. The first that fits, in this order.
 */
export const fixtureStateSchema = z.enum(['off', 'unwired', 'dark', 'dim', 'overdriven', 'in-window']);
export type FixtureState = z.infer<typeof fixtureStateSchema>;

/** Where the volts lie against the company's target, bounds included. */
export const fixtureAimSchema = z.enum(['below', 'inside', 'above']);
export type FixtureAim = z.infer<typeof fixtureAimSchema>;

/** `volts` at the end of its lead; `amps` and `voltAmps` of all its quantity together. */
export const fixtureAnswerSchema = z.strictObject({
  id: z.string(),
  volts: z.number(),
  amps: z.number(),
  voltAmps: z.number(),
  dropPercent: z.number(),
  state: fixtureStateSchema,
  aim: fixtureAimSchema.nullable(),
});
export type FixtureAnswer = z.infer<typeof fixtureAnswerSchema>;

/** `amps` is positive from `from` to `to`; `ampacityPercent` is null where no ampacity is known. */
export const cableAnswerSchema = z.strictObject({
  id: z.string(),
  amps: z.number(),
  fromVolts: z.number(),
  toVolts: z.number(),
  dropVolts: z.number(),
  lossWatts: z.number(),
  ampacityPercent: z.number().nullable(),
});
export type CableAnswer = z.infer<typeof cableAnswerSchema>;

/** Lowest and highest volts are over fixtures that are reached and not off; null where there are none. */
export const runAnswerSchema = z.strictObject({
  id: z.string(),
  terminalVolts: z.number(),
  amps: z.number(),
  voltAmps: z.number(),
  lowestVolts: z.number().nullable(),
  highestVolts: z.number().nullable(),
  lengthMeters: z.number(),
});
export type RunAnswer = z.infer<typeof runAnswerSchema>;

/** `loadPercent` is null for a common without a limit. */
export const commonAnswerSchema = z.strictObject({
  transformerId: z.string(),
  id: z.string(),
  amps: z.number(),
  loadPercent: z.number().nullable(),
});
export type CommonAnswer = z.infer<typeof commonAnswerSchema>;

export const tapAnswerSchema = z.strictObject({
  transformerId: z.string(),
  id: z.string(),
  amps: z.number(),
});
export type TapAnswer = z.infer<typeof tapAnswerSchema>;

export const transformerAnswerSchema = z.strictObject({
  id: z.string(),
  voltAmps: z.number(),
  loadPercent: z.number(),
  lossWatts: z.number(),
});
export type TransformerAnswer = z.infer<typeof transformerAnswerSchema>;

export const warningCodeSchema = z.enum([
  'common-over-limit',
  'tap-over-limit',
  'cable-over-ampacity',
  'transformer-over-target',
  'transformer-over-rating',
  'winding-over-rating',
  'unreached',
  'weak-short',
]);
export type WarningCode = z.infer<typeof warningCodeSchema>;

/** `transformerId` comes with taps, commons and windings, whose ids are unique only within their transformer. */
export const warningSubjectSchema = z.strictObject({
  kind: z.enum(['common', 'tap', 'winding', 'transformer', 'cable', 'fixture', 'run']),
  id: z.string(),
  transformerId: z.string().optional(),
});
export type WarningSubject = z.infer<typeof warningSubjectSchema>;

export const estimateWarningSchema = z.strictObject({
  code: warningCodeSchema,
  subject: warningSubjectSchema,
  message: z.string(),
});
export type EstimateWarning = z.infer<typeof estimateWarningSchema>;

export const estimateAnswerSchema = z.strictObject({
  fixtures: z.array(fixtureAnswerSchema),
  cables: z.array(cableAnswerSchema),
  runs: z.array(runAnswerSchema),
  commons: z.array(commonAnswerSchema),
  taps: z.array(tapAnswerSchema),
  transformers: z.array(transformerAnswerSchema),
  warnings: z.array(estimateWarningSchema),
});
export type EstimateAnswer = z.infer<typeof estimateAnswerSchema>;
