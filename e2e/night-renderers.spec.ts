import { expect, test } from '@playwright/test';
import { type NightDifference, onNightPage } from '../scripts/bench/night.kit.mjs';

/**
 * What the two renderers may differ by: the one has half floats, and filters them by a graphics card's own rules.
 * In steps of 255, for 99.9 % of all values.
 */
const TOLERANCE = 3;
const SHARE_WITHIN = 0.999;

test('WebGL and the plain canvas show the same night, without bands, also after the context was lost', async () => {
  test.setTimeout(300_000);
  await onNightPage(async (page) => {
    for (const altitude of [-12, -4, 2]) {
      const d = await page.evaluate<NightDifference>(`window.compareNight(${altitude})`);
      console.log(
        `Sun at ${altitude}°: mean difference ${d.mean.toFixed(4)}, over ${TOLERANCE}: ${d.over3} of ${d.values}, most ${d.most} of 255`,
      );
      expect(d.over3 / d.values).toBeLessThan(1 - SHARE_WITHIN);
      expect(d.mean).toBeLessThan(0.25);
    }
    const lost = await page.evaluate<NightDifference>('window.loseNight()');
    expect(lost.most).toBe(0);
    for (const kind of ['webgl', 'canvas']) {
      const ramp = await page.evaluate<{ longestRun: number; largestStep: number }>(
        `window.rampNight('${kind}')`,
      );
      console.log(
        `${kind}: longest run in a dark ramp ${ramp.longestRun} px, largest step ${ramp.largestStep.toFixed(3)}`,
      );
      // Without dither its few values would run for hundreds of pixels, and step by 1.
      expect(ramp.longestRun).toBeLessThan(120);
      expect(ramp.largestStep).toBeLessThan(0.2);
    }
  });
});
