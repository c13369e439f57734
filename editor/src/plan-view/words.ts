import type { Bounds } from './fixture-look';

/**
 * Volts as a person reads them: one decimal, since meter and line noise make the second one meaningless;
 * a second one only where the first would put the reading on the wrong side of a limit.
 */
export function voltsText(volts: number, limits: Bounds | null): string {
  const text = volts.toFixed(1);
  if (limits !== null && liesAbout(volts, Number(text), limits)) return `${volts.toFixed(2)} V`;
  return `${text} V`;
}

function liesAbout(volts: number, shown: number, { minVolts, maxVolts }: Bounds): boolean {
  return volts < minVolts !== shown < minVolts || volts > maxVolts !== shown > maxVolts;
}

export function ampsText(amps: number): string {
  return `${Math.abs(amps).toFixed(1)} A`;
}

export function voltAmpsText(voltAmps: number): string {
  return voltAmps < 10 ? `${voltAmps.toFixed(1)} VA` : `${Math.round(voltAmps)} VA`;
}

/** 0 to 100 %; a share just over a limit is never rounded down onto it. */
export function percentText(percent: number): string {
  const rounded = Math.round(percent);
  if (percent > 100 && rounded === 100) return `${(Math.ceil(percent * 10) / 10).toFixed(1)} %`;
  if (percent > 80 && rounded === 80) return `${(Math.ceil(percent * 10) / 10).toFixed(1)} %`;
  return `${rounded} %`;
}
