import type { Conductor, Load, Terminal, VoltWindow } from '@lampwright/geometry/catalogue';

/** What LED drivers of the trade are commonly rated for, and what designers aim at (common practice). */
export const ledWindow: VoltWindow = { minVolts: 9, maxVolts: 15 };
export const ledAim: VoltWindow = { minVolts: 10.5, maxVolts: 13 };
/** Halogen lamps: 90 to 105 % of their 12 V; above 12 V life falls steeply (common practice). */
export const halogenWindow: VoltWindow = { minVolts: 10.8, maxVolts: 12.6 };
export const halogenAim: VoltWindow = { minVolts: 10.8, maxVolts: 12 };

export const led = (
  watts: number,
  powerFactor: number,
): { load: Load; window: VoltWindow; target: VoltWindow } => ({
  load: { kind: 'driver', watts, powerFactor, minVolts: ledWindow.minVolts },
  window: ledWindow,
  target: ledAim,
});

export const halogen = (watts: number): { load: Load; window: VoltWindow; target: VoltWindow } => ({
  load: { kind: 'filament', watts, ratedVolts: 12 },
  window: halogenWindow,
  target: halogenAim,
});

/** A lead as fixtures come with it. */
export const lead = (lengthMeters: number, conductor: Conductor = { awg: 18 }) => ({
  conductor,
  lengthMeters,
});

export const tap = (id: string, volts: number, winding: string, maxConductors: number): Terminal => ({
  type: 'tap',
  id,
  volts,
  winding,
  limitAmps: null,
  maxConductors,
});

/** 25 A is the most that a secondary circuit of a landscape system may carry (NEC article 411). */
export const COMMON_LIMIT_AMPS = 25;

export const common = (
  id: string,
  winding: string,
  maxConductors: number,
  limitAmps: number = COMMON_LIMIT_AMPS,
): Terminal => ({ type: 'common', id, winding, limitAmps, maxConductors });
