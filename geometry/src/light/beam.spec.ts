import { describe, expect, it } from 'vitest';
import { seeded } from '../plan/plan.testkit.js';
import { type Beam, beamFromLumens, halfAngleOf, intensityAt, lumensOf } from './beam.js';
import { luxAt } from './illuminance.js';
import { lamp, randomAxis, spaceWith, towards, up } from './light.testkit.js';
import type { LightSource } from './night-scene.js';
import { beamOf } from './space.js';

/**
 * Lumens on the inside of a sphere of 1 m about the lamp, by its lux: a grid of latitude and longitude,
 * which knows nothing of the beam's axis. No integral of the beam's own is used.
 */
function lumensOnSphere(source: LightSource, rows: number): number {
  const space = spaceWith({ sources: [source] });
  const columns = 2 * rows;
  let sum = 0;
  for (let i = 0; i < rows; i++) {
    const polar = (Math.PI * (i + 0.5)) / rows;
    const z = Math.cos(polar);
    const level = Math.sin(polar);
    for (let j = 0; j < columns; j++) {
      const turn = (2 * Math.PI * (j + 0.5)) / columns;
      sum += level * onSphere(space, source, level * Math.cos(turn), level * Math.sin(turn), z);
    }
  }
  return (sum * 2 * Math.PI ** 2) / (rows * columns);
}

function onSphere(
  space: ReturnType<typeof spaceWith>,
  { x, y, z }: LightSource,
  dx: number,
  dy: number,
  dz: number,
): number {
  return luxAt(space, { x: x + dx, y: y + dy, z: z + dz }, { x: -dx, y: -dy, z: -dz });
}

describe('a beam', () => {
  it('has half of its peak at half of its beam angle', () => {
    for (const degrees of [8, 36, 120, 240]) {
      const beam: Beam = { peakCandela: 800, halfAngle: halfAngleOf(degrees), shield: 0 };
      expect(intensityAt(beam, 0)).toBe(800);
      expect(intensityAt(beam, ((degrees / 2) * Math.PI) / 180)).toBeCloseTo(400, 9);
    }
  });

  it('is 2·d·tan(β/2) wide at half of its light, d from the lamp', () => {
    // Cone diameter at half intensity, Ø = 2d·tan(β/2): common photometric practice. 36° at 3 m: 1.95 m.
    const degrees = 36;
    const d = 3;
    const diameter = 2 * d * Math.tan((degrees / 2) * (Math.PI / 180));
    expect(diameter).toBeCloseTo(1.95, 2);
    const source = lamp([0, 0, 0], { candela: 1000 }, degrees, { axis: up });
    const at = Math.atan2(diameter / 2, d);
    expect(intensityAt(beamOf(source), at) / 1000).toBeCloseTo(0.5, 9);
  });

  it('falls without a step from its axis to behind it', () => {
    for (const shield of [0, 0.6, 1]) {
      const beam: Beam = { peakCandela: 100, halfAngle: halfAngleOf(60), shield };
      const falls: number[] = [];
      for (let angle = 0.001; angle <= Math.PI; angle += 0.001)
        falls.push(intensityAt(beam, angle - 0.001) - intensityAt(beam, angle));
      expect(Math.min(...falls)).toBeGreaterThan(-1e-12);
      expect(Math.max(...falls)).toBeLessThan(0.5);
    }
  });

  it('keeps all of its light within the beam angle when it is shielded, and loses the share outside', () => {
    const bare: Beam = { peakCandela: 100, halfAngle: halfAngleOf(40), shield: 0 };
    const shielded: Beam = { ...bare, shield: 0.75 };
    for (const degrees of [0, 5, 19.9]) {
      const angle = (degrees * Math.PI) / 180;
      expect(intensityAt(shielded, angle)).toBe(intensityAt(bare, angle));
    }
    const far = (35 * Math.PI) / 180;
    expect(intensityAt(shielded, far) / intensityAt(bare, far)).toBeCloseTo(0.25, 9);
    expect(beamFromLumens(300, 40, 0.75).peakCandela).toBe(beamFromLumens(300, 40).peakCandela);
  });

  it('of a bell holds about 1.4 times what a uniform cone of its peak and half-peak angle does', () => {
    // Uniform cone: Φ = 2πI₀(1 − cos β/2), elementary. For narrow bells the ratio goes to 1/ln 2 = 1.443.
    for (const degrees of [6, 15, 24, 36]) {
      const halfAngle = halfAngleOf(degrees);
      const cone = 2 * Math.PI * (1 - Math.cos(halfAngle));
      const ratio = lumensOf({ peakCandela: 1, halfAngle, shield: 0 }) / cone;
      expect(ratio).toBeGreaterThan(1.38);
      expect(ratio).toBeLessThan(1.45);
    }
    const narrow = halfAngleOf(2);
    expect(
      lumensOf({ peakCandela: 1, halfAngle: narrow, shield: 0 }) / (2 * Math.PI * (1 - Math.cos(narrow))),
    ).toBeCloseTo(1 / Math.LN2, 3);
  });

  it.each([
    ['narrow', 12, towards(0, 0, -1), 0],
    ['usual', 36, towards(1, 2, 3), 0],
    ['wide', 120, towards(-1, 0.3, -0.2), 0],
    ['wider than half of the sphere', 240, towards(0, -1, 1), 0],
    ['all around', 360, towards(0, 0, -1), 0],
    ['shielded', 60, towards(3, -1, 0.5), 0.8],
  ] as const)('%s: its lux over a sphere add up to its lumens within 0.5 %%', (_, degrees, axis, shield) => {
    const source = lamp([3, -2, 5], { lumens: 560 }, degrees, { axis, shield });
    const expected = lumensOf(beamOf(source));
    if (shield === 0) expect(expected).toBeCloseTo(560, 6);
    else expect(expected).toBeLessThan(560);
    const measured = lumensOnSphere(source, 500);
    expect(Math.abs(measured / expected - 1)).toBeLessThan(0.005);
  });

  it('holds the lumens that random directions find in it', () => {
    const seed = 20261201;
    const random = seeded(seed);
    for (const degrees of [24, 60, 130, 360]) {
      const source = lamp([0, 0, 0], { lumens: 400 }, degrees, { axis: randomAxis(random) });
      const space = spaceWith({ sources: [source] });
      const count = 400_000;
      let sum = 0;
      let squares = 0;
      for (let i = 0; i < count; i++) {
        const lumens = 4 * Math.PI * onSphere(space, source, ...randomAxis(random));
        sum += lumens;
        squares += lumens * lumens;
      }
      const mean = sum / count;
      const sigma = Math.sqrt((squares / count - mean * mean) / count);
      expect(sigma / 400, `seed ${seed}, ${degrees}°`).toBeLessThan(0.01);
      expect(Math.abs(mean - 400), `seed ${seed}, ${degrees}°`).toBeLessThan(4 * sigma + 400 * 1e-6);
    }
  });
});
