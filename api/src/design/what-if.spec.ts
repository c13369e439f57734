import { type EstimateRequest, normalizeEstimateRequest } from '@lampwright/geometry/estimate';
import { describe, expect, it } from 'vitest';
import { solveEstimate } from '../circuit/index.js';
import { randomRequest } from '../circuit/random.testkit.js';
import { type WhatIf, whatIf } from './what-if.js';

const led = (id: string, at: string) => ({
  id,
  at,
  load: { kind: 'driver' as const, watts: 6, minVolts: 9 },
  window: { minVolts: 11.5, maxVolts: 12.4 },
});

/** Two lamps on one length of thin cable: the far one has little to spare. */
const chain: EstimateRequest = {
  transformers: [{ id: 'T', ratedVA: 300, taps: [{ id: '12', volts: 12 }], commons: [{ id: 'C' }] }],
  runs: [
    {
      id: 'R',
      transformerId: 'T',
      tapId: '12',
      commonId: 'C',
      source: 's',
      cables: [
        { id: 'k1', from: 's', to: 'a', lengthMeters: 10, conductor: { awg: 14 } },
        { id: 'k2', from: 'a', to: 'b', lengthMeters: 10, conductor: { awg: 14 } },
      ],
      fixtures: [led('near', 'a'), led('far', 'b')],
    },
  ],
};

const voltsOf = (request: EstimateRequest, id: string): number =>
  solveEstimate(normalizeEstimateRequest(request)).fixtures.find((fixture) => fixture.id === id)!.volts;

describe('what may become of a yard', () => {
  it('tells the lowest and highest volts, and the case that gives them', () => {
    const cases: WhatIf[] = [
      { kind: 'line', percent: 95 },
      { kind: 'line', percent: 105 },
      { kind: 'cable', temperatureC: 60 },
      { kind: 'one-lamp-out' },
    ];
    const answer = whatIf(chain, cases);
    const far = answer.fixtures.find(({ id }) => id === 'far')!;
    const lowLine = { ...chain, transformers: [{ ...chain.transformers[0]!, lineVolts: 114 }] };
    const highLine = { ...chain, transformers: [{ ...chain.transformers[0]!, lineVolts: 126 }] };
    expect(far.nominalVolts).toBeCloseTo(voltsOf(chain, 'far'), 9);
    expect(far.lowest).toEqual({ volts: voltsOf(lowLine, 'far'), caseIndex: 0 });
    expect(far.highest).toEqual({ volts: voltsOf(highLine, 'far'), caseIndex: 1 });
    // A driver must hold what it is rated for in every case.
    expect(far.verdict).toBe('fault');
    expect(answer.collapsed).toEqual([]);
  });

  it('does not judge a lamp while it is out, and sees the others rise', () => {
    const [near, far] = whatIf(chain, [{ kind: 'one-lamp-out' }]).fixtures;
    expect(near!.highest.volts).toBeGreaterThan(near!.nominalVolts);
    expect(far!.highest.volts).toBeGreaterThan(far!.nominalVolts);
    expect(far!.lowest).toEqual({ volts: far!.nominalVolts, caseIndex: null });
  });

  it('judges filaments as estimated, and only advises of the rest', () => {
    const halogen = structuredClone(chain);
    for (const fixture of halogen.runs[0]!.fixtures)
      fixture.load = { kind: 'filament', watts: 5, ratedVolts: 12 };
    const verdicts = whatIf(halogen, [{ kind: 'line', percent: 90 }]).fixtures.map(({ verdict }) => verdict);
    expect(verdicts).toEqual(['advice', 'advice']);
  });

  it('adds what may come later at a node, and tells where the supply would collapse', () => {
    const later = whatIf(chain, [{ kind: 'addition', runId: 'R', at: 'b', voltAmps: 20 }]);
    expect(later.fixtures.map(({ id }) => id)).toEqual(['near', 'far']);
    expect(later.fixtures[1]!.lowest.volts).toBeLessThan(later.fixtures[1]!.nominalVolts - 0.3);
  });

  it('brackets the estimate itself on 60 seeded networks', () => {
    for (let seed = 1; seed <= 60; seed++) {
      const request = randomRequest(seed, {
        shape: 'tree',
        mix: 'mixed',
        nodes: 8,
        runs: 2,
        sag: true,
        reach: 4,
      });
      const { fixtures } = whatIf(request, [
        { kind: 'line', percent: 97 },
        { kind: 'line', percent: 103 },
        { kind: 'lighter', share: 0.5 },
      ]);
      for (const { nominalVolts, lowest, highest } of fixtures) {
        expect(lowest.volts, `seed ${seed}`).toBeLessThanOrEqual(nominalVolts);
        expect(highest.volts, `seed ${seed}`).toBeGreaterThanOrEqual(nominalVolts);
      }
    }
  });
});
