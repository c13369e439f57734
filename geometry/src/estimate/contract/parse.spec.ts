import { describe, expect, it } from 'vitest';
import { LISTED_FAULTS } from './fault.js';
import { normalizeEstimateRequest } from './normalize.js';
import { MAX_FIXTURES, parseEstimateRequest } from './parse.js';
import { fullRequest, leanRequest } from './request.testkit.js';

type Json = null | boolean | number | string | Json[] | { [key: string]: Json };

/** The full request with one place set to another value; undefined takes the key away. */
function altered(pointer: string, value: unknown): unknown {
  const request = structuredClone(fullRequest()) as unknown as Json;
  const parts = pointer.slice(1).split('/');
  const last = parts.pop()!;
  let at = request as { [key: string]: Json };
  for (const part of parts) at = at[part] as { [key: string]: Json };
  if (value === undefined) delete at[last];
  else at[last] = value as Json;
  return request;
}

function faultsOf(value: unknown) {
  const parsed = parseEstimateRequest(value);
  return parsed.ok ? [] : parsed.errors;
}
const pointersOf = (value: unknown) => faultsOf(value).map((fault) => fault.pointer);

const cable = '/runs/0/cables/0';
const fixture = '/runs/0/fixtures/0';
const transformer = '/transformers/0';

describe('parseEstimateRequest', () => {
  it('takes the full and the lean form', () => {
    expect(faultsOf(fullRequest())).toEqual([]);
    expect(faultsOf(leanRequest())).toEqual([]);
  });

  it('takes a request of nothing', () => {
    expect(faultsOf({ transformers: [], runs: [] })).toEqual([]);
  });

  const refused: [string, unknown][] = [
    // numbers out of range, and no numbers at all
    ['/conductorTemperatureC', -60.5],
    ['/conductorTemperatureC', 120.5],
    ['/conductorTemperatureC', '25'],
    [`${transformer}/ratedVA`, 0],
    [`${transformer}/ratedVA`, -1],
    [`${transformer}/ratedVA`, undefined],
    [`${transformer}/lineVolts`, 0],
    [`${transformer}/nominalLineVolts`, Number.NaN],
    [`${transformer}/regulationPercent`, -1],
    [`${transformer}/ratedAt`, 'half'],
    [`${transformer}/taps/0/volts`, 0],
    [`${transformer}/taps/0/volts`, 60.01],
    [`${transformer}/taps/0/volts`, Number.POSITIVE_INFINITY],
    [`${transformer}/taps/0/limitAmps`, 0],
    [`${transformer}/commons/0/limitAmps`, -25],
    [`${transformer}/windings/0/ratedVA`, 0],
    [`${cable}/lengthMeters`, -0.01],
    [`${cable}/lengthMeters`, 10_000.1],
    [`${cable}/lengthMeters`, Number.NaN],
    [`${cable}/lengthMeters`, null],
    [`${cable}/lengthMeters`, undefined],
    [`${cable}/extraOhms`, -1],
    [`${cable}/ampacityAmps`, 0],
    [`${cable}/conductor`, undefined],
    [`${cable}/conductor`, {}],
    [`${cable}/conductor`, 12],
    [`${cable}/conductor/awg`, 13],
    [`${fixture}/quantity`, 0],
    [`${fixture}/quantity`, 1001],
    [`${fixture}/quantity`, 1.5],
    [`${fixture}/load`, undefined],
    [`${fixture}/load`, []],
    [`${fixture}/load/kind`, 'laser'],
    [`${fixture}/load/kind`, undefined],
    [`${fixture}/load/watts`, 0],
    [`${fixture}/load/powerFactor`, 0],
    [`${fixture}/load/powerFactor`, 1.01],
    [`${fixture}/load/minVolts`, 0],
    [`${fixture}/lead/lengthMeters`, -1],
    [`${fixture}/lead/conductor/awg`, 20],
    [`${fixture}/window`, undefined],
    [`${fixture}/window/minVolts`, 0],
    [`${fixture}/window/maxVolts`, 61],
    [`${fixture}/window`, { minVolts: 15, maxVolts: 9 }],
    [`${fixture}/target/minVolts`, -1],
    [`${fixture}/target`, { minVolts: 13, maxVolts: 12 }],
    // unknown and missing keys
    ['/colour', 'red'],
    [`${transformer}/watts`, 300],
    [`${cable}/lenght`, 3],
    [`${cable}/conductor/gauge`, 12],
    [`${fixture}/load/ratedVolts`, 12],
    [`${fixture}/__proto__x`, 1],
    [`${fixture}/id`, undefined],
    [`${fixture}/id`, ''],
    [`${fixture}/at`, undefined],
    [`${cable}/from`, undefined],
    ['/runs', undefined],
    ['/runs', {}],
    ['/runs/0', null],
    ['/runs/0/source', 7],
    ['/runs/0/cables', undefined],
    ['/transformers', null],
    [`${transformer}/windings`, []],
    // names of things that are not there
    ['/runs/0/transformerId', 'X'],
    ['/runs/0/tapId', 'X'],
    ['/runs/0/commonId', 'X'],
    [`${transformer}/taps/0/winding`, 'X'],
    [`${transformer}/commons/0/winding`, 'X'],
  ];
  it.each(refused)('refuses %s = %j', (pointer, value) => {
    const pointers = pointersOf(altered(pointer, value));
    expect(pointers).toContain(pointer);
  });

  it('names only the fault that is there', () => {
    for (const [pointer, value] of refused.filter(([, v]) => typeof v === 'number')) {
      expect(pointersOf(altered(pointer, value))).toEqual([pointer]);
    }
  });

  it('takes the bounds themselves', () => {
    const taken: [string, unknown][] = [
      ['/conductorTemperatureC', -60],
      ['/conductorTemperatureC', 120],
      [`${transformer}/taps/0/volts`, 60],
      [`${cable}/lengthMeters`, 0],
      [`${cable}/lengthMeters`, 10_000],
      [`${fixture}/quantity`, 1000],
      [`${fixture}/load/powerFactor`, 1],
      [`${fixture}/window`, { minVolts: 60, maxVolts: 60 }],
      [`${cable}/conductor`, { mm2: 2.5 }],
      [`${cable}/conductor`, { ohmsPerKm: 7 }],
    ];
    for (const [pointer, value] of taken) expect(faultsOf(altered(pointer, value))).toEqual([]);
  });

  it('says sentences that quote what came', () => {
    expect(faultsOf(altered(`${cable}/lengthMeters`, -3))).toEqual([
      { pointer: `${cable}/lengthMeters`, detail: 'Length must be between 0 and 10,000 m; got -3.' },
    ]);
    expect(faultsOf(altered(`${cable}/conductor`, { awg: 13 }))[0]?.detail).toBe(
      'Gauge must be one of 8, 10, 12, 14, 16, 18; got 13.',
    );
    expect(faultsOf(altered(`${fixture}/load/watts`, undefined))[0]?.detail).toBe(
      'Watts is missing; it must be a number above 0 W.',
    );
    expect(faultsOf(altered(`${transformer}/taps/0/volts`, 'x'.repeat(1e6)))[0]?.detail.length).toBeLessThan(
      200,
    );
  });

  it('escapes keys in pointers as RFC 6901 says', () => {
    expect(pointersOf(altered('/runs/0/x', 1))).toEqual(['/runs/0/x']);
    const request = { ...fullRequest(), 'a/b~c': 1 };
    expect(pointersOf(request)).toEqual(['/a~1b~0c']);
  });

  it('names every unknown key of an object', () => {
    expect(pointersOf({ ...fullRequest(), a: 1, b: 2 })).toEqual(['/a', '/b']);
  });

  it('refuses repeated ids: run, cable and fixture in the request; the rest in their transformer', () => {
    const request = fullRequest();
    request.runs.push(structuredClone(request.runs[0]!));
    const second = structuredClone(request.transformers[0]!);
    request.transformers.push(second, { ...structuredClone(second), id: 'U' });
    request.transformers[2]!.taps.push({ id: '12V', volts: 12, winding: 'w1' });
    request.transformers[2]!.commons.push({ id: 'C1', winding: 'w1' });
    request.transformers[2]!.windings?.push({ id: 'w1', ratedVA: 3 });
    expect(pointersOf(request).sort()).toEqual([
      '/runs/1/cables/0/id',
      '/runs/1/fixtures/0/id',
      '/runs/1/id',
      '/transformers/1/id',
      '/transformers/2/commons/2/id',
      '/transformers/2/taps/2/id',
      '/transformers/2/windings/2/id',
    ]);
  });

  it('lets a cable and a fixture share an id', () => {
    expect(faultsOf(altered(`${cable}/id`, 'f1'))).toEqual([]);
  });

  it('refuses tap and common of different windings, named or by default', () => {
    expect(pointersOf(altered('/runs/0/commonId', 'C2'))).toEqual(['/runs/0/commonId']);
    const request = fullRequest();
    delete request.transformers[0]!.taps[0]!.winding;
    request.runs[0]!.commonId = 'C2';
    expect(pointersOf(request)).toEqual(['/runs/0/commonId']);
  });

  it('refuses a named winding where a transformer names none', () => {
    expect(pointersOf(altered(`${transformer}/windings`, undefined))).toEqual([
      '/transformers/0/taps/0/winding',
      '/transformers/0/taps/1/winding',
      '/transformers/0/commons/0/winding',
      '/transformers/0/commons/1/winding',
    ]);
  });

  it('refuses a cable from a node to itself and a run of nothing', () => {
    expect(pointersOf(altered(`${cable}/to`, 's'))).toEqual([`${cable}/to`]);
    const request = leanRequest();
    request.runs[0]!.fixtures = [];
    expect(pointersOf(request)).toEqual(['/runs/0']);
  });

  it('counts fixtures over all runs', () => {
    const request = leanRequest();
    const run = request.runs[0]!;
    const filled = (id: string, count: number) => ({
      ...run,
      id,
      fixtures: Array.from({ length: count }, (_, i) => ({ ...run.fixtures[0]!, id: `${id}-${i}` })),
    });
    request.runs = [filled('a', MAX_FIXTURES - 1), filled('b', 1)];
    expect(faultsOf(request)).toEqual([]);
    request.runs = [filled('a', MAX_FIXTURES - 1), filled('b', 2)];
    expect(pointersOf(request)).toEqual(['/runs/1/fixtures']);
  });

  it('names faults of shape and of reference together', () => {
    const request = altered(`${cable}/lengthMeters`, -3) as ReturnType<typeof fullRequest>;
    request.runs[0]!.tapId = 'X';
    expect(pointersOf(request)).toEqual([`${cable}/lengthMeters`, '/runs/0/tapId']);
  });

  it('lists some hundreds and counts the rest', () => {
    const run = fullRequest().runs[0]!;
    const bad = Array.from({ length: LISTED_FAULTS + 7 }, () => 0);
    const errors = faultsOf({ ...fullRequest(), runs: [{ ...run, cables: bad }] });
    expect(errors).toHaveLength(LISTED_FAULTS + 1);
    expect(errors.at(-1)).toEqual({
      pointer: '',
      detail: `There are 7 more faults than the ${LISTED_FAULTS} listed here.`,
    });
  });

  it('never throws on hostile values', () => {
    const deep = JSON.parse(`${'['.repeat(1e5)}${']'.repeat(1e5)}`);
    const hostile: unknown[] = [
      undefined,
      null,
      0,
      'x',
      [],
      deep,
      { runs: deep, transformers: deep },
      JSON.parse('{"__proto__": {"runs": []}, "constructor": 1, "toString": null}'),
      JSON.parse('{"transformers": [{"__proto__": 1, "id": "__proto__"}], "runs": [{"id": {"a": 1}}]}'),
      { ...fullRequest(), runs: Array.from({ length: 4e5 }, () => 0) },
      {
        transformers: [{ id: 'T', taps: 'x', commons: 7, windings: null }],
        runs: [{ transformerId: 'T', tapId: 'a' }],
      },
    ];
    for (const value of hostile) {
      const parsed = parseEstimateRequest(value);
      expect(parsed.ok).toBe(false);
    }
    expect(pointersOf(JSON.parse('{"transformers": [], "runs": [], "__proto__": 1}'))).toEqual([
      '/__proto__',
    ]);
  });

  it('does not take names from prototypes', () => {
    expect(pointersOf(altered('/runs/0/tapId', 'toString'))).toEqual(['/runs/0/tapId']);
    expect(pointersOf(altered('/runs/0/transformerId', '__proto__'))).toEqual(['/runs/0/transformerId']);
  });
});

describe('normalizeEstimateRequest', () => {
  it('fills in every default', () => {
    const { conductorTemperatureC, transformers, runs } = normalizeEstimateRequest(leanRequest());
    expect(conductorTemperatureC).toBe(25);
    expect(transformers[0]).toEqual({
      id: 'T',
      ratedVA: 300,
      lineVolts: 120,
      nominalLineVolts: 120,
      regulationPercent: 0,
      ratedAt: 'open',
      windings: [{ id: 'w1', ratedVA: 300 }],
      taps: [{ id: '12V', volts: 12, winding: 'w1' }],
      commons: [{ id: 'C1', winding: 'w1' }],
    });
    expect(runs[0]?.fixtures[0]).toMatchObject({ quantity: 1, load: { powerFactor: 1 } });
  });

  it('leaves given values alone', () => {
    const request = fullRequest();
    const normalized = normalizeEstimateRequest(request);
    expect(normalized.runs[0]?.fixtures[0]?.lead).toEqual({
      ...request.runs[0]!.fixtures[0]!.lead,
      extraOhms: 0,
    });
    expect(normalized.transformers[0]?.taps[1]?.winding).toBe('w2');
  });
});
