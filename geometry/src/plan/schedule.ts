import { z } from 'zod';

/** A clock time at the property, `HH:MM`. */
export const clockSchema = z.string().regex(/^([01]\d|2[0-3]):[0-5]\d$/, {
  error: 'A time of day is written as HH:MM, such as 22:30.',
});

const sunMinutes = z.number().int().min(-180).max(600);

/** When lights go on or off: by the sun at the property, so many minutes after (or before), or by the clock. */
export const switchTimeSchema = z.discriminatedUnion('kind', [
  z.strictObject({ kind: z.literal('sunset'), minutesAfter: sunMinutes }),
  z.strictObject({ kind: z.literal('sunrise'), minutesAfter: sunMinutes }),
  z.strictObject({ kind: z.literal('clock'), at: clockSchema }),
]);
export type SwitchTime = z.infer<typeof switchTimeSchema>;

/** One stretch of light each night, from `on` to the next `off`. */
export const scheduleSchema = z.strictObject({ on: switchTimeSchema, off: switchTimeSchema });
export type Schedule = z.infer<typeof scheduleSchema>;

/** From sunset until eleven at night: common practice, no source. */
export const usualSchedule: Schedule = {
  on: { kind: 'sunset', minutesAfter: 0 },
  off: { kind: 'clock', at: '23:00' },
};
