import { normalizeEstimateRequest } from '@lampwright/geometry/estimate';
import { conductorAmpacity, NoConvergence, solveEstimate } from '../circuit/index.js';
import { randomRequest, SHAPES, seeded } from '../circuit/random.testkit.js';
import { limitsOf } from './bench-run.js';
import type {
  CableChoice,
  DesignProblem,
  DesignRun,
  DesignSite,
  SearchControl,
  TransformerModel,
} from './problem.js';

export const patient: SearchControl = { stopped: () => false, progress: () => {} };

const cables: readonly CableChoice[] = [
  { id: '14', conductor: { awg: 14 } },
  { id: '12', conductor: { awg: 12 } },
  { id: '10', conductor: { awg: 10 } },
];

/** A small site with random runs, loads, models and limits, some of them too tight for anything to work. */
export function randomProblem(seed: number): DesignProblem {
  const random = seeded(seed * 7919 + 1);
  const count = 1 + Math.floor(3 * random());
  const runs = Array.from({ length: count }, (_, r) => randomRun(seed, r, random));
  const models = [randomModel('small', 60 + 90 * random(), 9000, random)];
  if (random() < 0.8) models.push(randomModel('large', 200 + 200 * random(), 16_000, random));
  return {
    conductorTemperatureC: 25,
    targetPercent: 80,
    cables,
    sites: [{ id: 'site', models, runs }],
  };
}

function randomRun(seed: number, r: number, random: () => number): DesignRun {
  const shape = SHAPES[Math.floor(random() * SHAPES.length)]!;
  const mix = (['driver', 'driver', 'filament', 'mixed'] as const)[Math.floor(random() * 4)]!;
  const { runs } = randomRequest(seed * 31 + r, {
    shape,
    mix,
    nodes: 2 + Math.floor(4 * random()),
    runs: 1,
    sag: false,
    reach: 2 + 14 * random(),
  });
  const run = runs[0]!;
  const aimed = random() < 0.5;
  const lengthMeters = run.cables.reduce((sum, cable) => sum + cable.lengthMeters, 0);
  return {
    id: `run${r}`,
    source: run.source,
    cables: run.cables.map(({ id, from, to, lengthMeters: length, extraOhms }) => ({
      id: `${r}${id}`,
      from,
      to,
      lengthMeters: length,
      ...(extraOhms !== undefined && { extraOhms }),
    })),
    // What no cable reaches can't be lit by any choice.
    fixtures: run.fixtures
      .filter(({ at }) => !at.startsWith('nowhere'))
      .map((fixture) => ({
        ...fixture,
        id: `${r}${fixture.id}`,
        window: { minVolts: 10, maxVolts: 15 },
        ...(aimed && { target: { minVolts: 10.5, maxVolts: 12.5 + random() } }),
      })),
    costMinor: [90, 140, 230].map((perMeter) => Math.round(perMeter * lengthMeters)),
  };
}

function randomModel(
  id: string,
  ratedVA: number,
  priceMinor: number,
  random: () => number,
): TransformerModel {
  const two = random() < 0.4;
  const winding = (w: number) => (two ? { winding: `w${w}` } : {});
  const taps = [12, 13, 14, 15]
    .filter(() => random() < 0.7)
    .map((volts, i) => ({ id: `${volts}`, volts, ...winding(1 + (i % 2)) }));
  if (taps.length === 0) taps.push({ id: '12', volts: 12, ...winding(1) });
  const commons = [1, 2].map((w) => ({ id: `C${w}`, limitAmps: 5 + 20 * random(), ...winding(w) }));
  return {
    id,
    priceMinor,
    transformer: {
      ratedVA,
      regulationPercent: 8 * random(),
      ratedAt: random() < 0.5 ? 'open' : 'load',
      ...(two && {
        windings: [
          { id: 'w1', ratedVA: ratedVA / 2 },
          { id: 'w2', ratedVA: ratedVA / 2 },
        ],
      }),
      taps,
      commons,
    },
    maxConductors: new Map(
      [...taps, ...commons].map(({ id: terminal }) => [terminal, 1 + Math.floor(3 * random())]),
    ),
  };
}

/** Cost of the cheapest choice that keeps every limit, by trying each one; null where none does. */
export function cheapestByTrying(problem: DesignProblem, site: DesignSite): number | null {
  let best: number | null = null;
  for (const model of site.models) {
    const choices = site.runs.map(() =>
      problem.cables.flatMap((_, cable) => model.transformer.taps.map((tap) => ({ cable, tap }))),
    );
    for (const picks of product(choices)) {
      const costMinor = picks.reduce(
        (sum, { cable }, i) => sum + site.runs[i]!.costMinor[cable]!,
        model.priceMinor,
      );
      if (best !== null && costMinor >= best) continue;
      if (works(problem, site, model, picks)) best = costMinor;
    }
  }
  return best;
}

type Pick = { readonly cable: number; readonly tap: TransformerModel['transformer']['taps'][number] };

function works(
  problem: DesignProblem,
  site: DesignSite,
  model: TransformerModel,
  picks: readonly Pick[],
): boolean {
  const { transformer } = model;
  const first = transformer.windings?.[0]?.id ?? 'w1';
  const windingOf = (terminal: { winding?: string }) => terminal.winding ?? first;
  const commonsFor = picks.map(({ tap }) =>
    transformer.commons.filter((c) => windingOf(c) === windingOf(tap)),
  );
  if (commonsFor.some((list) => list.length === 0)) return false;
  const request = normalizeEstimateRequest({
    conductorTemperatureC: problem.conductorTemperatureC,
    transformers: [{ ...transformer, id: 'T' }],
    runs: site.runs.map((run, i) => ({
      id: run.id,
      transformerId: 'T',
      tapId: picks[i]!.tap.id,
      commonId: commonsFor[i]![0]!.id,
      source: run.source,
      cables: run.cables.map((cable) => ({
        ...cable,
        conductor: problem.cables[picks[i]!.cable]!.conductor,
      })),
      fixtures: [...run.fixtures],
    })),
  });
  try {
    const answer = solveEstimate(request);
    const volts = new Map(answer.fixtures.map((fixture) => [fixture.id, fixture.volts]));
    const amps = new Map(answer.cables.map((cable) => [cable.id, Math.abs(cable.amps)]));
    const room = problem.targetPercent / 100;
    for (const [i, run] of site.runs.entries()) {
      for (const fixture of run.fixtures) {
        const limits = limitsOf(fixture);
        const got = volts.get(fixture.id)!;
        if (limits && (got < limits.minVolts || got > limits.maxVolts)) return false;
      }
      const most = conductorAmpacity(problem.cables[picks[i]!.cable]!.conductor)!;
      if (run.cables.some(({ id }) => amps.get(id)! > most)) return false;
    }
    const total = answer.runs.reduce((sum, run) => sum + run.voltAmps, 0);
    if (total > transformer.ratedVA * room) return false;
    for (const winding of transformer.windings ?? []) {
      const load = answer.runs.reduce(
        (sum, run, i) => (windingOf(picks[i]!.tap) === winding.id ? sum + run.voltAmps : sum),
        0,
      );
      if (load > winding.ratedVA * room) return false;
    }
    for (const tap of transformer.taps) {
      const landed = picks.filter((pick) => pick.tap.id === tap.id).length;
      if (landed > (model.maxConductors.get(tap.id) ?? Number.POSITIVE_INFINITY)) return false;
    }
    for (const landed of product(commonsFor)) {
      const holds = transformer.commons.every((common) => {
        const here = answer.runs.filter((_, i) => landed[i]!.id === common.id);
        return (
          here.length <= (model.maxConductors.get(common.id) ?? Number.POSITIVE_INFINITY) &&
          here.reduce((sum, run) => sum + run.amps, 0) <= (common.limitAmps ?? Number.POSITIVE_INFINITY)
        );
      });
      if (holds) return true;
    }
    return false;
  } catch (error) {
    if (error instanceof NoConvergence) return false;
    throw error;
  }
}

function* product<T>(lists: readonly (readonly T[])[], at = 0, chosen: T[] = []): Generator<T[]> {
  if (at === lists.length) {
    yield [...chosen];
    return;
  }
  for (const one of lists[at]!) {
    chosen[at] = one;
    yield* product(lists, at + 1, chosen);
  }
}
