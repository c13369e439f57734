import type { Load } from '@lampwright/geometry/estimate';
import { describe, expect, it } from 'vitest';
import { oneRun, solve } from './feeder.testkit.js';
import { aimOf, stateOf } from './state.js';

const window = { minVolts: 9, maxVolts: 15 };
const driver: Load & { powerFactor: number } = { kind: 'driver', watts: 4, powerFactor: 1, minVolts: 10 };
const filament: Load = { kind: 'filament', watts: 20, ratedVolts: 12 };
const resistive: Load = { kind: 'resistive', watts: 20, ratedVolts: 12 };
const current: Load = { kind: 'current', amps: 1 };

describe('state', () => {
  it.each([
    ['off before all else', { kind: 'off' } as const, 0, false, 'off'],
    ['unwired before dark', driver, 0, false, 'unwired'],
    ['driver below 0.8 × its minimum', driver, 7.99, true, 'dark'],
    ['driver at 0.8 × its minimum', driver, 8, true, 'dim'],
    ['filament below half its rating', filament, 5.99, true, 'dark'],
    ['filament at half its rating', filament, 6, true, 'dim'],
    ['resistive below half its rating', resistive, 5.99, true, 'dark'],
    ['resistive at half its rating', resistive, 6, true, 'dim'],
    ['current below its tenth', current, 1.19, true, 'dark'],
    ['current at its tenth', current, 1.2, true, 'dim'],
    ['just below the window', driver, 8.9999, true, 'dim'],
    ['at the window’s lower bound', driver, 9, true, 'in-window'],
    ['at the window’s upper bound', driver, 15, true, 'in-window'],
    ['just above the window', driver, 15.0001, true, 'overdriven'],
  ] as const)('%s', (_, load, volts, reached, state) => {
    expect(stateOf({ load, window }, volts, reached, 12)).toBe(state);
  });

  it('says where the volts lie against the target, bounds included', () => {
    const target = { minVolts: 10.5, maxVolts: 13 };
    expect([10.49, 10.5, 12, 13, 13.01].map((volts) => aimOf(target, volts))).toEqual([
      'below',
      'inside',
      'inside',
      'inside',
      'above',
    ]);
    expect(aimOf(undefined, 12)).toBeNull();
  });

  it('still gives an off fixture’s volts and aim', () => {
    const fixture = {
      id: 'f',
      at: 's',
      load: { kind: 'off' } as const,
      window,
      target: { minVolts: 13, maxVolts: 14 },
    };
    expect(solve(oneRun(12, [], [fixture])).fixtures[0]).toMatchObject({
      volts: 12,
      state: 'off',
      aim: 'below',
    });
  });
});
