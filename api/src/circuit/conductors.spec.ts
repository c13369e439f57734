import { celsius, meters, ohms } from '@lampwright/geometry/units';
import { describe, expect, it } from 'vitest';
import { conductorAmpacity, conductorOhmsPerMeter, loopOhms } from './conductors.js';

const METERS_PER_1000_FEET = 304.8;
const relative = (got: number, wanted: number) => Math.abs(got / wanted - 1);
const gauges = [18, 16, 14, 12, 10, 8] as const;
const STRAND_LAY = 1.02;

describe('conductor resistance', () => {
  it('agrees with NEC chapter 9 table 8, uncoated copper at 75 °C, stranded and solid, within 1 %', () => {
    const stranded = [7.95, 4.99, 3.14, 1.98, 1.24, 0.778];
    const solid = [7.77, 4.89, 3.07, 1.93, 1.21, 0.764];
    gauges.forEach((awg, i) => {
      const per1000Feet = conductorOhmsPerMeter({ awg }, celsius(75)) * METERS_PER_1000_FEET;
      expect(relative(per1000Feet, stranded[i]!)).toBeLessThan(0.01);
      expect(relative(per1000Feet / STRAND_LAY, solid[i]!)).toBeLessThan(0.01);
    });
  });

  it('follows the temperature note of NEC chapter 9 table 8, R2 = R1 [1 + 0.00323 (T2 − 75)], within 1 %', () => {
    for (const temperature of [0, 20, 25, 40, 60, 90]) {
      const ratio =
        conductorOhmsPerMeter({ awg: 12 }, celsius(temperature)) /
        conductorOhmsPerMeter({ awg: 12 }, celsius(75));
      expect(relative(ratio, 1 + 0.00323 * (temperature - 75))).toBeLessThan(0.01);
    }
  });

  it('takes IEC 60228 class 5, Ω/km at 20 °C, as printed', () => {
    const table = [
      [1.5, 13.3],
      [2.5, 7.98],
      [4, 4.95],
      [6, 3.3],
      [10, 1.91],
      [16, 1.21],
    ] as const;
    for (const [mm2, ohmsPerKm] of table) {
      expect(conductorOhmsPerMeter({ mm2 }, celsius(20)) * 1000).toBeCloseTo(ohmsPerKm, 12);
    }
  });

  it('has 1200 m of 12 mm line at 1.7e-8 Ω·m as 0.18 Ω (Bird, Electrical Circuit Theory, ch. 3)', () => {
    const ohmsPerKm = (1.7e-8 * 1000) / ((Math.PI / 4) * 0.012 ** 2);
    expect(conductorOhmsPerMeter({ ohmsPerKm }, celsius(20)) * 1200).toBeCloseTo(0.18, 3);
  });

  it('has 10 Ω at 20 °C near 13.2 Ω at 100 °C, which takes α as 0.004 (Bird, Electrical Circuit Theory, ch. 3)', () => {
    const hot = conductorOhmsPerMeter({ ohmsPerKm: 10 }, celsius(100)) * 1000;
    expect(hot).toBeCloseTo(10 * (1 + 0.00393 * 80), 12);
    expect(relative(hot, 13.2)).toBeLessThan(0.005);
  });

  it('agrees with the trade constants for drop on 12 V (common practice) within 1.5 %: solid, 20 °C, load at the end', () => {
    const trade = [
      [12, 7500],
      [10, 11920],
      [8, 18960],
    ] as const;
    const feet = 100;
    const watts = 12;
    for (const [awg, k] of trade) {
      const loop = 2 * (conductorOhmsPerMeter({ awg }, celsius(20)) / STRAND_LAY) * feet * 0.3048;
      expect(relative((watts / 12) * loop, (2 * watts * feet) / k)).toBeLessThan(0.015);
    }
  });

  it('adds extra ohms and never falls below a micro-ohm', () => {
    const at20 = celsius(20);
    expect(loopOhms({ ohmsPerKm: 5 }, meters(100), ohms(0.25), at20)).toBeCloseTo(1.25, 12);
    expect(loopOhms({ awg: 8 }, meters(0), ohms(0), at20)).toBe(1e-6);
    expect(loopOhms({ awg: 8 }, meters(0), ohms(0.5e-6), at20)).toBe(1e-6);
  });

  it('knows the ampacity of gauges and areas, not of bare ohms', () => {
    expect(gauges.map((awg) => conductorAmpacity({ awg }))).toEqual([7, 10, 15, 20, 30, 40]);
    expect(([1.5, 2.5, 4, 6, 10, 16] as const).map((mm2) => conductorAmpacity({ mm2 }))).toEqual([
      15, 20, 27, 34, 46, 61,
    ]);
    expect(conductorAmpacity({ ohmsPerKm: 5 })).toBeNull();
  });
});
