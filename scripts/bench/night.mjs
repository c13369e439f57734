// Time of the night picture's steps in Chromium without a GPU, by both renderers, and how far their pictures differ.
import { onNightPage } from './night.kit.mjs';

const SIZES = [60, 200];
const ROUNDS = 60;
const KINDS = ['webgl', 'canvas'];
const STEPS = /** @type {const} */ ([
  ['build', 'first picture'],
  ['drag', 'one fixture dragged'],
  ['group', 'group switched'],
  ['evening', 'evening moved on'],
  ['bare', 'bare picture'],
]);

/**
 * @param {(line: string) => void} print
 * @param {{ signal?: AbortSignal }} context
 */
export async function run(print, context) {
  await onNightPage(async (page) => {
    print('Milliseconds from the change to the picture: map 720 px, picture 1200 × 800 px.');
    print('bare: a ready picture of that size put on the canvas, or up as a texture, and nothing else.');
    print(`${'renderer  fixtures  step'.padEnd(42)}   median      p95`);
    for (const kind of KINDS)
      for (const fixtures of SIZES) {
        context.signal?.throwIfAborted();
        /** @type {Record<string, number[]>} */
        const times = await page.evaluate(`window.benchNight('${kind}', ${fixtures}, ${ROUNDS})`);
        for (const [name, words] of STEPS) {
          const sorted = (times[name] ?? []).toSorted((a, b) => a - b);
          const at = (/** @type {number} */ share) => sorted[Math.floor((sorted.length - 1) * share)] ?? 0;
          print(
            `${kind.padEnd(8)} ${String(fixtures).padStart(9)}  ${words.padEnd(22)} ${at(0.5).toFixed(1).padStart(8)} ${at(0.95).toFixed(1).padStart(8)}`,
          );
        }
      }
    print('\nThe two pictures, in steps of 255:');
    for (const altitude of [-12, -4, 2]) {
      /** @type {import('./night.kit.mjs').NightDifference} */
      const d = await page.evaluate(`window.compareNight(${altitude})`);
      print(
        `sun at ${altitude}°: mean ${d.mean.toFixed(4)}, over 1: ${((100 * d.over1) / d.values).toFixed(4)} %, over 3: ${((100 * d.over3) / d.values).toFixed(4)} %, most ${d.most}`,
      );
    }
  });
}
