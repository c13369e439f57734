import {
  type EstimateRequest,
  estimateAnswerSchema,
  normalizeEstimateRequest,
  parseEstimateRequest,
} from '@lampwright/geometry/estimate';
import { describe, expect, it } from 'vitest';
import { chain, fixtureAt, oneRun, wire } from './feeder.testkit.js';
import { missesOf } from './kirchhoff.testkit.js';
import { NoConvergence } from './no-convergence.js';
import { seeded } from './random.testkit.js';
import { solveEstimate } from './solve.js';

/** Either an answer of finite numbers that satisfies the model, or NoConvergence with a sentence; nothing else. */
function answerOrSentence(request: EstimateRequest): 'answer' | 'sentence' {
  expect(parseEstimateRequest(request)).toMatchObject({ ok: true });
  try {
    const answer = solveEstimate(normalizeEstimateRequest(request));
    expect(estimateAnswerSchema.safeParse(answer).error).toBeUndefined();
    expect(missesOf(request, answer).power).toBeLessThan(1e-6);
    return 'answer';
  } catch (error) {
    expect(error).toBeInstanceOf(NoConvergence);
    expect((error as NoConvergence).message).toMatch(/^[A-Z].*\.$/);
    return 'sentence';
  }
}

const driver = (watts: number, minVolts = 9) => ({ kind: 'driver', watts, minVolts }) as const;

describe('extreme numbers', () => {
  it.each([
    ['very large load', chain(12, [0.5], [driver(1e12)])],
    ['very small load', chain(12, [0.5], [driver(1e-12)])],
    [
      'ten kilometres of thin cable',
      oneRun(
        12,
        [{ ...wire('k', 's', 'n', 0), lengthMeters: 10_000, conductor: { awg: 18 } }],
        [fixtureAt('f', 'n', driver(5))],
      ),
    ],
    ['minimum volts far above the supply', chain(12, [0.5], [driver(5, 1e6)])],
    [
      'a thousand alike on a micro-ohm',
      oneRun(12, [wire('k', 's', 'n', 0)], [{ ...fixtureAt('f', 'n', driver(50)), quantity: 1000 }]),
    ],
    [
      'a transformer of a milliwatt',
      oneRun(12, [], [fixtureAt('f', 's', driver(50))], { ratedVA: 0.001, regulationPercent: 10 }),
    ],
    [
      'a full percent of regulation',
      oneRun(12, [], [fixtureAt('f', 's', driver(50))], { ratedVA: 50, regulationPercent: 100 }),
    ],
    [
      'an ampacity of next to nothing',
      oneRun(12, [{ ...wire('k', 's', 'n', 1), ampacityAmps: 1e-320 }], [fixtureAt('f', 'n', driver(5))]),
    ],
  ])('answers %s', (_, request) => {
    expect(answerOrSentence(request)).toBe('answer');
  });

  it.each([
    [
      'a line of 1e308 V',
      oneRun(12, [wire('k', 's', 'n', 1)], [fixtureAt('f', 'n', driver(5))], { lineVolts: 1e308 }),
    ],
    [
      'resistance past all bounds',
      oneRun(
        12,
        [{ ...wire('k', 's', 'n', 1), lengthMeters: 10_000, conductor: { ohmsPerKm: 1e308 } }],
        [fixtureAt('f', 'n', driver(5))],
      ),
    ],
    ['a load past all bounds', chain(12, [1], [{ kind: 'resistive', watts: 1e308, ratedVolts: 1e-300 }])],
  ])('answers or says in words: %s', (_, request) => {
    answerOrSentence(request);
  });

  it('says so, without an answer, exactly at and around the nose of a supply', () => {
    for (const part of [1 - 1e-9, 1 - 1e-12, 1, 1 + 1e-12, 1 + 1e-9, 1 + 1e-6]) {
      answerOrSentence(chain(30, [1.5], [driver(150 * part, 0.01)]));
    }
  });

  it('takes random extremes', () => {
    const random = seeded(77);
    const wild = (low: number, high: number) => 10 ** (low + (high - low) * random());
    const outcomes = Array.from({ length: 300 }, () => {
      const count = 1 + Math.floor(6 * random());
      return answerOrSentence(
        chain(
          wild(-3, Math.log10(60)),
          Array.from({ length: count }, () => wild(-7, 4)),
          Array.from({ length: count }, () => {
            const kind = Math.floor(4 * random());
            if (kind === 0) return { kind: 'driver', watts: wild(-6, 6), minVolts: wild(-3, 3) };
            if (kind === 1) return { kind: 'filament', watts: wild(-6, 6), ratedVolts: wild(-3, 3) };
            if (kind === 2) return { kind: 'current', amps: wild(-6, 6) };
            return { kind: 'resistive', watts: wild(-6, 6), ratedVolts: wild(-3, 3) };
          }),
        ),
      );
    });
    expect(outcomes.filter((outcome) => outcome === 'answer').length).toBeGreaterThan(290);
  });

  it('handles a hundred thousand cables in one run', () => {
    const cables = Array.from({ length: 90_000 }, (_, i) =>
      wire(`k${i}`, i === 0 ? 's' : `n${i - 1}`, `n${i}`, 1e-6),
    );
    expect(answerOrSentence(oneRun(12, cables, [fixtureAt('f', 'n89999', driver(5))]))).toBe('answer');
  });
});
