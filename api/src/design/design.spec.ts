import { describe, expect, it } from 'vitest';
import { cheapestByTrying, patient, randomProblem } from './design.testkit.js';
import { designSite } from './site.js';

const BLOCK = 50;

describe('designing the wiring of a site', () => {
  it.each([1, 51, 101, 151])(
    'finds nothing dearer than trying every choice does, on 50 small sites (seeds from %i)',
    (first) => {
      const counts = { designed: 0, impossible: 0 };
      for (let seed = first; seed < first + BLOCK; seed++) {
        const problem = randomProblem(seed);
        const site = problem.sites[0]!;
        const result = designSite(problem, site, patient);
        const cheapest = cheapestByTrying(problem, site);
        switch (result.kind) {
          case 'designed':
            counts.designed += 1;
            expect(result.design.costMinor, `seed ${seed}`).toBe(cheapest);
            expect(result.design.leastMinor, `seed ${seed}: proven`).toBe(cheapest);
            break;
          case 'impossible':
            counts.impossible += 1;
            expect(cheapest, `seed ${seed}: ${JSON.stringify(result.why)}`).toBeNull();
            break;
          case 'unsettled':
            expect.fail(`seed ${seed} was not settled`);
        }
      }
      console.info(`seeds ${first} to ${first + BLOCK - 1}: ${JSON.stringify(counts)}`);
      expect(counts.designed).toBeGreaterThan(15);
      expect(counts.impossible).toBeGreaterThan(3);
    },
  );

  it('ends at once with what it knows when it is stopped', () => {
    const problem = randomProblem(3);
    const result = designSite(problem, problem.sites[0]!, { stopped: () => true, progress: () => {} });
    expect(result).toEqual({ kind: 'unsettled', siteId: 'site', leastMinor: 0 });
  });

  it('names one lamp that no tap and cable can feed', () => {
    const problem = randomProblem(5);
    const site = problem.sites[0]!;
    const [run] = site.runs;
    const [fixture, ...others] = run!.fixtures;
    const hopeless = { ...fixture!, window: { minVolts: 20, maxVolts: 24 } };
    const { target: _target, ...lamp } = hopeless;
    const changed = { ...run!, fixtures: [lamp, ...others] };
    const result = designSite(problem, { ...site, runs: [changed, ...site.runs.slice(1)] }, patient);
    expect(result).toEqual({
      kind: 'impossible',
      why: { siteId: 'site', reason: 'no-volts', runId: run!.id, fixtureIds: [lamp.id] },
    });
  });
});
