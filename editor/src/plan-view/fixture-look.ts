import type { FixtureAim, FixtureState } from '@lampwright/geometry/estimate';
import { chalk, dimBlue, mix, overRed } from './palette';

/** How a fixture's mark is drawn. `waiting`: no answer yet, so it makes no claim. */
export type LookKind = 'in-window' | 'dim' | 'overdriven' | 'dark' | 'off' | 'unwired' | 'waiting';

export interface FixtureLook {
  readonly kind: LookKind;
  /** −1 at the low edge of its window, 1 at the high edge, in steps of a third; 0 in the calm middle. */
  readonly tint: number;
  /** Inside its rating but off the company's aim: a small notch below or above. */
  readonly notch: 'below' | 'above' | null;
}

export interface Bounds {
  readonly minVolts: number;
  readonly maxVolts: number;
}

export interface FixtureReading {
  readonly state: FixtureState;
  readonly aim: FixtureAim | null;
  readonly volts: number;
}

/** The share of a window, at each end, in which a mark begins to take the tint of that end. */
export const EDGE_SHARE = 0.2;

export const waitingLook: FixtureLook = { kind: 'waiting', tint: 0, notch: null };

export const unwiredLook: FixtureLook = { kind: 'unwired', tint: 0, notch: null };

export function fixtureLook(reading: FixtureReading | undefined, window: Bounds | null): FixtureLook {
  if (reading === undefined) return waitingLook;
  if (reading.state !== 'in-window') return { kind: reading.state, tint: 0, notch: null };
  return {
    kind: 'in-window',
    tint: window === null ? 0 : edgeTint(reading.volts, window),
    notch: reading.aim === 'below' || reading.aim === 'above' ? reading.aim : null,
  };
}

function edgeTint(volts: number, { minVolts, maxVolts }: Bounds): number {
  const edge = (maxVolts - minVolts) * EDGE_SHARE;
  if (edge <= 0) return 0;
  const low = 1 - (volts - minVolts) / edge;
  const high = 1 - (maxVolts - volts) / edge;
  const signed = low > high ? -low : high;
  if (Math.max(low, high) <= 0) return 0;
  // In thirds, so that the drawn marks can be kept as a few pictures.
  return (Math.sign(signed) * Math.ceil(Math.min(1, Math.abs(signed)) * 3)) / 3;
}

/** The disc's ground; a tint never comes near the full hue, which is kept for what is wrong. */
export function groundOf(look: FixtureLook): string {
  if (look.tint === 0) return chalk;
  return mix(chalk, look.tint < 0 ? dimBlue : overRed, 0.3 * Math.abs(look.tint));
}

export function isFault(kind: LookKind): boolean {
  switch (kind) {
    case 'dim':
    case 'overdriven':
    case 'dark':
    case 'unwired':
      return true;
    case 'in-window':
    case 'off':
    case 'waiting':
      return false;
  }
}

export function lookWord(kind: LookKind): string {
  switch (kind) {
    case 'in-window':
      return 'In window';
    case 'dim':
      return 'Dim';
    case 'overdriven':
      return 'Overdriven';
    case 'dark':
      return 'Dark';
    case 'off':
      return 'Off';
    case 'unwired':
      return 'Not wired yet';
    case 'waiting':
      return 'No volts yet';
  }
}

/** The order of the legend: what is wrong first. */
export const lookOrder: readonly LookKind[] = [
  'dark',
  'dim',
  'overdriven',
  'unwired',
  'in-window',
  'off',
  'waiting',
];
