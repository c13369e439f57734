import { describe, expect, it } from 'vitest';
import type { Matrix3 } from './homography.js';
import { PhotoScale } from './photo-scale.js';
import { at, seeded } from './yard.testkit.js';

const photo = (homography: readonly number[]) =>
  new PhotoScale({
    homography: homography as unknown as Matrix3,
    unitCovariance: new Array<number>(64).fill(0),
    image: { x: 1200, y: 900, scale: 1 / 400 },
    frame: { originX: 0.3, originY: -0.2, angle: 0.7, unit: 3 },
    references: [],
    misfit: null,
    clickSigmaPixels: 1,
  });

describe('the reading of a photo’s ground', () => {
  const homography = [1.1, 0.2, 0.1, -0.05, -0.6, 0.2, 0.02, 0.3, 1];
  const random = seeded(481);
  const places = Array.from({ length: 20 }, () => at(800 + 800 * random(), 800 + 500 * random()));

  it('has the slopes of the ground by the homography’s entries (central differences, seed 481)', () => {
    const step = 1e-6;
    for (const p of places) {
      const reading = photo(homography).read(p)!;
      for (let k = 0; k < 8; k++) {
        const moved = (d: number) =>
          photo(homography.map((h, i) => (i === k ? h + d : h))).groundFromSheet(p)!;
        const [up, down] = [moved(step), moved(-step)];
        expect(reading.xByParameter[k]).toBeCloseTo((up.x - down.x) / (2 * step), 5);
        expect(reading.yByParameter[k]).toBeCloseTo((up.y - down.y) / (2 * step), 5);
      }
    }
  });

  it('has the slopes of the ground by the click (central differences, seed 481)', () => {
    const step = 1e-3;
    const scale = photo(homography);
    for (const p of places) {
      const [xu, xv, yu, yv] = scale.read(p)!.byClick;
      const slope = (du: number, dv: number) => {
        const up = scale.groundFromSheet(at(p.x + du, p.y + dv))!;
        const down = scale.groundFromSheet(at(p.x - du, p.y - dv))!;
        return { x: (up.x - down.x) / (2 * step), y: (up.y - down.y) / (2 * step) };
      };
      expect(xu).toBeCloseTo(slope(step, 0).x, 8);
      expect(yu).toBeCloseTo(slope(step, 0).y, 8);
      expect(xv).toBeCloseTo(slope(0, step).x, 8);
      expect(yv).toBeCloseTo(slope(0, step).y, 8);
    }
  });

  it('reads the ground that the map gives', () => {
    const scale = photo(homography);
    for (const p of places) expect(scale.read(p)!.ground).toEqual(scale.groundFromSheet(p));
  });
});
