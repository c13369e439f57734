import { describe, expect, it } from 'vitest';
import type { Load } from '../catalogue/index.js';
import { lampOutput, lifeInWords } from './output.js';

const window = { minVolts: 9, maxVolts: 15 };
const driver: Load = { kind: 'driver', watts: 4, powerFactor: 0.9, minVolts: 9 };
const filament: Load = { kind: 'filament', watts: 20, ratedVolts: 12 };
const halogenWindow = { minVolts: 10, maxVolts: 12.6 };

describe('a filament', () => {
  const at = (volts: number) => lampOutput(filament, halogenWindow, volts, 2900);

  it('at 90 % of its volts gives 0.70 of its light and lives 3.9 times as long', () => {
    // Lamp rerating: light ∝ V^3.4–3.5, life ∝ V^−12…−16 (IES handbook exponent 13, from memory); computed.
    const { output, lifeFactor, cctKelvin, note } = at(10.8);
    expect(output).toBeCloseTo(0.7, 2);
    expect(lifeFactor).toBeCloseTo(3.9, 1);
    expect(cctKelvin).toBeCloseTo(2900 * 0.9 ** 0.42, 6);
    expect(note).toBe(
      'Underdriven: 30 % dimmer and warmer, lamp life about 3.9 times on paper; the life of dimmed halogen is unreliable.',
    );
  });

  it('overdriven is brighter and says what that costs', () => {
    const { output, note } = at(13.45);
    expect(output).toBeCloseTo(1.474, 3);
    expect(note).toBe('Overdriven: 47 % brighter, lamp life about a quarter.');
  });

  it('is as rated at its volts and says nothing near them', () => {
    expect(at(12)).toEqual({ output: 1, cctKelvin: 2900, lifeFactor: 1, note: null });
    expect(at(12.1).note).toBeNull();
    expect(at(11.9).note).toBeNull();
  });

  it('is dark below half of its volts, as the estimate has it, and not at half', () => {
    expect(at(5.99).output).toBe(0);
    expect(at(6).output).toBeGreaterThan(0.09);
    expect(at(0).note).toMatch(/^Dark: 0 V/);
    expect(lampOutput({ kind: 'resistive', watts: 20, ratedVolts: 12 }, window, 5.99, 2800).output).toBe(0);
  });
});

describe('a driver', () => {
  const at = (volts: number) => lampOutput(driver, window, volts, 2700);

  it('gives its rated light and colour from its minimum up', () => {
    for (const volts of [9, 10, 12, 15])
      expect(at(volts)).toEqual({ output: 1, cctKelvin: 2700, lifeFactor: null, note: null });
  });

  it('fades without a step to dark at 0.8 of its minimum', () => {
    let last = 1;
    for (let volts = 9; volts >= 7.2; volts -= 0.01) {
      const { output } = at(volts);
      expect(output).toBeLessThanOrEqual(last);
      expect(last - output).toBeLessThan(0.02);
      last = output;
    }
    expect(last).toBeLessThan(0.001);
    expect(at(8.1).output).toBeCloseTo(0.5, 6);
    expect(at(8.1).note).toBe(
      'Fading: below the 9 V that its driver needs it gives about 50 % of its light.',
    );
    expect(at(7.19)).toMatchObject({ output: 0, note: expect.stringMatching(/^Dark: 7\.2 V/) });
  });

  it('over its window is no brighter and says what that may cost', () => {
    expect(at(15.5)).toMatchObject({
      output: 1,
      note: expect.stringMatching(/above the 15 V .* may fail early/),
    });
  });
});

describe('other loads', () => {
  it('of constant current give light by their watts below the window and none without volts', () => {
    const current: Load = { kind: 'current', amps: 0.35 };
    expect(lampOutput(current, window, 12, 2700)).toMatchObject({ output: 1, note: null });
    expect(lampOutput(current, window, 6, 2700).output).toBeCloseTo(2 / 3, 9);
    expect(lampOutput(current, window, 1.4, 2700).output).toBe(0);
  });

  it('that are off give none at any volts', () => {
    for (const volts of [null, 0, 12])
      expect(lampOutput({ kind: 'off' }, window, volts, 2700).output).toBe(0);
  });

  it('are at their rated light while no volts are known', () => {
    for (const load of [driver, filament, { kind: 'current', amps: 1 } as const])
      expect(lampOutput(load, window, null, 2800)).toEqual({
        output: 1,
        cctKelvin: 2800,
        lifeFactor: null,
        note: null,
      });
  });
});

it('says life in round words', () => {
  const said = [30, 3.9, 1, 0.9, 0.7, 0.5, 0.22, 0.1, 0.01].map(lifeInWords);
  expect(said).toEqual([
    'more than ten times',
    'about 3.9 times',
    'about 1.0 times',
    'about nine tenths',
    'about two thirds',
    'about half',
    'about a fifth',
    'about a tenth',
    'less than a tenth',
  ]);
});
