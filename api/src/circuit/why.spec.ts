import { normalizeEstimateRequest, whyOf } from '@lampwright/geometry/estimate';
import { expect, it } from 'vitest';
import { NoConvergence, solveEstimate } from './index.js';
import { LOAD_MIXES, randomRequest, SHAPES } from './random.testkit.js';

it('adds up from the tap to every fixture, lead and sag included, on 140 seeded networks of all shapes', () => {
  let told = 0;
  for (let seed = 1; seed <= 140; seed++) {
    const request = randomRequest(seed, {
      shape: SHAPES[seed % SHAPES.length]!,
      mix: LOAD_MIXES[seed % LOAD_MIXES.length]!,
      nodes: 12,
      runs: 2,
      sag: seed % 2 === 0,
      reach: 6,
    });
    let answer: ReturnType<typeof solveEstimate>;
    try {
      answer = solveEstimate(normalizeEstimateRequest(request));
    } catch (error) {
      if (error instanceof NoConvergence) continue;
      throw error;
    }
    const unreached = new Set(
      answer.warnings.flatMap(({ code, subject }) => (code === 'unreached' ? [subject.id] : [])),
    );
    for (const { id, volts } of answer.fixtures) {
      const why = whyOf(request, answer, id);
      if (unreached.has(id) || volts === 0) {
        expect(why, `seed ${seed}`).toBeNull();
        continue;
      }
      told += 1;
      const lost = why!.segments.reduce((sum, { dropVolts }) => sum + dropVolts, 0);
      expect(why!.openVolts - why!.sagVolts - lost - why!.leadVolts, `seed ${seed}, ${id}`).toBeCloseTo(
        volts,
        9,
      );
      for (const [i, segment] of why!.segments.entries())
        if (i > 0) expect(segment.fromVolts).toBeCloseTo(why!.segments[i - 1]!.toVolts, 9);
      expect(why!.leadVolts, `seed ${seed}, ${id}`).toBeGreaterThanOrEqual(-1e-9);
    }
  }
  console.info(`seeds 1 to 140: ${told} fixtures told`);
  expect(told).toBeGreaterThan(1000);
});
