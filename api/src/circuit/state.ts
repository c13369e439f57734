import type { FixtureAim, FixtureState, NormalizedFixture, VoltRange } from '@lampwright/geometry/estimate';
import { CURRENT_KNEE } from './loads.js';

/** Bounds are included; this much either way is rounding, not a fault of the wiring. */
const ROUNDING_VOLTS = 1e-9;
/** A driver this far below its minimum gives no useful light. */
const DRIVER_DARK = 0.8;
/** So does a lamp below this part of its rated volts. */
const LAMP_DARK = 0.5;

/** The first state that fits, in the contract's order. `open` is the tap's volts without load. */
export function stateOf(
  { load, window }: Pick<NormalizedFixture, 'load' | 'window'>,
  volts: number,
  reached: boolean,
  open: number,
): FixtureState {
  if (load.kind === 'off') return 'off';
  if (!reached) return 'unwired';
  if (volts < darkBelow(load, open) - ROUNDING_VOLTS) return 'dark';
  if (volts < window.minVolts - ROUNDING_VOLTS) return 'dim';
  if (volts > window.maxVolts + ROUNDING_VOLTS) return 'overdriven';
  return 'in-window';
}

function darkBelow(load: Exclude<NormalizedFixture['load'], { kind: 'off' }>, open: number): number {
  switch (load.kind) {
    case 'driver':
      return DRIVER_DARK * load.minVolts;
    case 'filament':
    case 'resistive':
      return LAMP_DARK * load.ratedVolts;
    case 'current':
      return CURRENT_KNEE * open;
  }
}

/** Where the volts lie against what the company aims at; null without a target. */
export function aimOf(target: VoltRange | undefined, volts: number): FixtureAim | null {
  if (!target) return null;
  if (volts < target.minVolts - ROUNDING_VOLTS) return 'below';
  if (volts > target.maxVolts + ROUNDING_VOLTS) return 'above';
  return 'inside';
}
