/**
 * Requests of a known shape and size for the solver's bench: drivers of 3 to 5 W in sum 150 W, on cable that
 * drops a volt or two, so that every size is the same kind of yard.
 * @typedef {'chain' | 'tree' | 'hub' | 'mesh'} Shape
 */

/** @type {readonly Shape[]} */
export const shapes = ['chain', 'tree', 'hub', 'mesh'];
export const sizes = [10, 100, 1000, 5000];

/**
 * Joints between nodes 0 (the source) … count.
 * @param {Shape} shape @param {number} count @returns {[number, number][]}
 */
export function joints(shape, count) {
  /** @type {[number, number][]} */
  const pairs = [];
  const width = Math.max(2, Math.round(Math.sqrt(count + 1)));
  for (let i = 1; i <= count; i += 1) {
    if (shape === 'chain') pairs.push([i - 1, i]);
    if (shape === 'tree') pairs.push([Math.floor((i - 1) / 2), i]);
    if (shape === 'hub') pairs.push([i === 1 ? 0 : 1, i]);
    if (shape === 'mesh') {
      if (i % width !== 0) pairs.push([i - 1, i]);
      if (i >= width) pairs.push([i - width, i]);
    }
  }
  return pairs;
}

const nodeName = (/** @type {number} */ i) => (i === 0 ? 's' : `n${i}`);

/** Length of every joint: a chain's add up, so its joints are the shorter the more there are. */
export const metersOf = (/** @type {Shape} */ shape, /** @type {number} */ count) =>
  shape === 'chain' ? 40 / count : shape === 'hub' ? 4 : 6;

/** @param {Shape} shape @param {number} count */
export function requestOf(shape, count) {
  const lengthMeters = metersOf(shape, count);
  return {
    transformers: [
      { id: 'T', ratedVA: 300, taps: [{ id: 'tap', volts: 13 }], commons: [{ id: 'C', limitAmps: 25 }] },
    ],
    runs: [
      {
        id: 'R',
        transformerId: 'T',
        tapId: 'tap',
        commonId: 'C',
        source: 's',
        cables: joints(shape, count).map(([from, to], i) => ({
          id: `k${i}`,
          from: nodeName(from),
          to: nodeName(to),
          lengthMeters,
          conductor: { awg: 10 },
        })),
        fixtures: Array.from({ length: count }, (_, i) => ({
          id: `f${i + 1}`,
          at: nodeName(i + 1),
          load: { kind: 'driver', watts: ((3 + (i % 3)) * 37.5) / count, powerFactor: 0.95, minVolts: 9 },
          lead: { conductor: { awg: 18 }, lengthMeters: 1 },
          window: { minVolts: 9, maxVolts: 15 },
        })),
      },
    ],
  };
}

/**
 * Median microseconds of a call, after a warm-up; the number of repeats follows from the time they take.
 * @param {() => unknown} call @param {number} [budget] milliseconds for all repeats
 */
export function medianMicroseconds(call, budget = 600) {
  const started = performance.now();
  call();
  const first = performance.now() - started;
  const repeats = Math.max(1, Math.min(400, Math.floor(budget / Math.max(first, 0.05))));
  for (let i = 0; i < Math.min(200, repeats); i += 1) call();
  const times = [];
  for (let i = 0; i < repeats; i += 1) {
    const start = performance.now();
    call();
    times.push(performance.now() - start);
  }
  times.sort((a, b) => a - b);
  return 1000 * (times[Math.floor(times.length / 2)] ?? first);
}
