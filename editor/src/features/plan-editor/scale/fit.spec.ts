import { scaleOfSheet } from '@lampwright/geometry/estimate';
import type { SheetRecord } from '@lampwright/geometry/plan';
import { describe, expect, it } from 'vitest';
import { sheet } from '../tools/driver.testkit';
import { fitOf, horizonText, trustedFrom } from './fit';

function scaleOf(record: SheetRecord) {
  const result = scaleOfSheet(record);
  if (!result.ok) throw new Error(result.message);
  return result.scale;
}

const size = { width: sheet.widthPx, height: sheet.heightPx };
const length = (id: string, x: number, meters: number) =>
  ({ id, kind: 'length', a: { x: 0, y: 0 }, b: { x, y: 0 }, meters }) as const;

/** A camera 2 m up that looks ahead, its horizon at a third of the height: ground at depth z is 800 · 2 / z below it. */
const photo: SheetRecord = {
  ...sheet,
  view: 'photo',
  references: [
    {
      id: 'r',
      kind: 'rectangle',
      corners: [
        { x: 1000 - 800 / 3, y: 500 + 1600 / 3 },
        { x: 1000 + 800 / 3, y: 500 + 1600 / 3 },
        { x: 1000 + 800 / 6, y: 500 + 1600 / 6 },
        { x: 1000 - 800 / 6, y: 500 + 1600 / 6 },
      ],
      widthMeters: 2,
      depthMeters: 3,
    },
  ],
};

describe('how well a scale fits', () => {
  it('asks for a second opinion where there is only one reference', () => {
    expect(fitOf(scaleOf(sheet))).toMatch(/One more reference/);
  });

  it('tells references that agree from those that contradict each other', () => {
    const agree = { ...sheet, references: [length('a', 1000, 10), length('b', 500, 5)] };
    const contradict = { ...sheet, references: [length('a', 1000, 10), length('b', 500, 7)] };
    expect(fitOf(scaleOf(agree))).toMatch(/agree/);
    expect(fitOf(scaleOf(contradict))).toMatch(/contradict/);
  });

  it('trusts a plan everywhere', () => {
    expect(trustedFrom(scaleOf(sheet), size)).toBe(0);
    expect(horizonText(scaleOf(sheet), size, 'metric')).not.toMatch(/trusted/);
  });

  it('trusts a photo only below its horizon, and says from where', () => {
    const from = trustedFrom(scaleOf(photo), size)!;
    // The horizon is at a third of the height; trust ends somewhat below it.
    expect(from).toBeGreaterThan(1 / 3);
    expect(from).toBeLessThan(0.6);
    expect(horizonText(scaleOf(photo), size, 'metric')).toMatch(/In the top \d+ % of the photo/);
  });
});
