import { describe, expect, it } from 'vitest';
import { seeded } from '../sheet/yard.testkit.js';
import { chromaticityOf, encodedOf, LUMA, lampColour, linearOf } from './colour.js';
import { composeNight, hashOf, type Picture } from './compose.js';
import type { LightMap } from './layers.js';
import { lookAt, skyLuxAt } from './look.js';

function picture(width: number, height: number, at: (x: number, y: number) => number): Picture {
  const data = new Uint8ClampedArray(width * height * 4);
  for (let i = 0; i < width * height; i++) {
    data.fill(at(i % width, Math.floor(i / width)), 4 * i, 4 * i + 3);
    data[4 * i + 3] = 255;
  }
  return { width, height, data };
}

function light(width: number, height: number, lux: (x: number, y: number) => number): LightMap {
  const rgba = new Float32Array(width * height * 4);
  for (let i = 0; i < width * height; i++) rgba.fill(lux(i % width, Math.floor(i / width)), 4 * i, 4 * i + 3);
  return { view: 'photo', width, height, rgba, leaves: new Uint8Array(width * height), version: 1 };
}

const meanOf = (data: Uint8ClampedArray) =>
  data.reduce((sum, value, i) => sum + (i % 4 < 3 ? value : 0), 0) / (data.length * 0.75);

describe('the picture', () => {
  it('is the photo itself by day without lamps', () => {
    const random = seeded(7);
    const photo = picture(64, 48, () => Math.floor(256 * random()));
    const dark = light(16, 12, () => 0);
    expect(composeNight(photo, dark, lookAt(30), 40)).toEqual(photo.data);
    expect(composeNight(photo, { ...dark, view: 'plan' }, lookAt(30), 40)).toEqual(photo.data);
  });

  it('grows darker from minute to minute as the sun goes down, and never brighter', () => {
    // Of a drawing its paper alone: the lines on it turn pale. White paper grows bluer to the last, which moves the
    // mean of its codes by a twentieth of a step where the ambient light no longer falls.
    const sheets = [
      { view: 'photo', shade: (x: number) => 4 * x, slack: 0.05, most: 45 },
      { view: 'plan', shade: (x: number) => 225 + Math.floor(x / 2), slack: 0.06, most: 60 },
    ] as const;
    for (const { view, shade, slack, most } of sheets) {
      const photo = picture(60, 40, shade);
      let before = 256;
      for (let altitude = 14; altitude >= -20; altitude -= 0.5) {
        const mean = meanOf(composeNight(photo, { ...light(4, 4, () => 0), view }, lookAt(altitude), 40));
        expect(mean).toBeLessThanOrEqual(before + slack);
        before = mean;
      }
      expect(before).toBeGreaterThan(5);
      expect(before).toBeLessThan(most);
    }
  });

  it('keeps the lines of a drawing apart from its paper through the whole evening', () => {
    const drawing = picture(60, 40, (x) => (x % 6 === 0 ? 20 : 255));
    for (let altitude = 14; altitude >= -20; altitude -= 0.5) {
      const dark = { ...light(4, 4, () => 0), view: 'plan' as const };
      const data = composeNight(drawing, dark, lookAt(altitude), 40);
      const [line, paper] = [0, 3].map((x) =>
        meanOf(data.subarray(4 * (60 * 20 + x), 4 * (60 * 20 + x + 1))),
      );
      // By day dark on light, by night light on dark; in between one passes the other.
      if (altitude > -2) expect(paper).toBeGreaterThan(line! + 40);
      if (altitude < -9) expect(line).toBeGreaterThan(paper! + 25);
    }
  });

  it('shows the lux of white as near white, and ever more light never darker', () => {
    const white = picture(4, 4, () => 255);
    let before = 0;
    for (const lux of [0, 0.5, 1, 2, 5, 10, 20, 40, 100, 1000, 30_000]) {
      const mean = meanOf(
        composeNight(
          white,
          light(4, 4, () => lux),
          lookAt(-12),
          40,
        ),
      );
      expect(mean).toBeGreaterThanOrEqual(before);
      before = mean;
    }
    expect(before).toBe(255);
    expect(
      meanOf(
        composeNight(
          white,
          light(4, 4, () => 40),
          lookAt(-12),
          40,
        ),
      ),
    ).toBeGreaterThan(215);
  });

  it('has no steps in a dark gradient', () => {
    const width = 600;
    const height = 64;
    const photo = picture(width, height, () => 128);
    // Five steps of 255 over the whole width: undithered, each would be a band of 120 px.
    const data = composeNight(
      photo,
      light(60, 4, (x) => 0.01 * x),
      lookAt(-18),
      40,
    );
    const column = (x: number) => {
      let sum = 0;
      for (let y = 0; y < height; y++) for (let k = 0; k < 20; k++) sum += data[(y * width + x + k) * 4]!;
      return sum / (height * 20);
    };
    const means = Array.from({ length: width / 20 }, (_, i) => column(i * 20));
    const whole = means.at(-1)! - means[0]!;
    expect(whole).toBeGreaterThan(2);
    means.slice(1).forEach((mean, i) => {
      const step = mean - means[i]!;
      expect(step).toBeGreaterThan(-0.12);
      expect(step).toBeLessThan(whole / 29 + 0.25);
    });
  });

  it('dithers the same pixel the same way', () => {
    expect(hashOf(12, 34)).toBe(hashOf(12, 34));
    const values = Array.from(
      { length: 10_000 },
      (_, i) => (hashOf(i % 100, Math.floor(i / 100)) & 0x3ff) / 1024,
    );
    expect(values.reduce((a, b) => a + b) / values.length).toBeCloseTo(0.5, 2);
  });

  it('keeps light in a crown’s gaps off the sky behind it', () => {
    const sky = picture(4, 4, () => 220);
    const bare = light(4, 4, () => 20);
    const gap = { ...bare, leaves: new Uint8Array(16).fill(255) };
    const dark = composeNight(
      sky,
      light(4, 4, () => 0),
      lookAt(-12),
      40,
    );
    expect(composeNight(sky, gap, lookAt(-12), 40)).toEqual(dark);
    expect(meanOf(composeNight(sky, bare, lookAt(-12), 40))).toBeGreaterThan(meanOf(dark) + 50);
  });
});

describe('colour', () => {
  it('of a black body at 2856 K is that of illuminant A (CIE 15: x 0.4476, y 0.4074)', () => {
    const { x, y } = chromaticityOf(2856);
    expect(Math.abs(x - 0.4476)).toBeLessThan(0.001);
    expect(Math.abs(y - 0.4074)).toBeLessThan(0.001);
  });

  it('is white at the camera’s balance, warm below, cool above, and of one unit of luminance', () => {
    for (const part of lampColour(4000)) expect(part).toBeCloseTo(1, 3);
    for (const kelvin of [500, 1800, 2200, 2700, 3000, 3500, 5000, 6500, 40_000]) {
      const [r, g, b] = lampColour(kelvin);
      expect(r * LUMA[0] + g * LUMA[1] + b * LUMA[2]).toBeCloseTo(1, 9);
      expect(Math.sign(r - b)).toBe(kelvin < 4000 ? 1 : -1);
    }
    expect(lampColour(2700)[2]).toBeLessThan(lampColour(3000)[2]);
  });

  it('goes through sRGB and back', () => {
    for (let code = 0; code <= 255; code++)
      expect(255 * encodedOf(linearOf(code / 255))).toBeCloseTo(code, 6);
  });
});

it('knows how bright the sky is at the ends of the twilights', () => {
  expect(skyLuxAt(-6)).toBeCloseTo(3.4, 6);
  expect(skyLuxAt(-12)).toBeCloseTo(0.008, 6);
  expect(skyLuxAt(-40)).toBe(skyLuxAt(-18));
});
