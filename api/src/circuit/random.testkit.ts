import type { Conductor, EstimateRequest, Load } from '@lampwright/geometry/estimate';

/** A small seeded generator of uniform numbers in [0, 1) (mulberry32), so that every run of a test is the same. */
export function seeded(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (state + 0x6d2b79f5) >>> 0;
    let t = state;
    t = Math.imul(t ^ (t >>> 15), t | 1);
    t ^= t + Math.imul(t ^ (t >>> 7), t | 61);
    return ((t ^ (t >>> 14)) >>> 0) / 2 ** 32;
  };
}

export const SHAPES = ['chain', 'tee', 'hub', 'tree', 'loop', 'mesh', 'parallel'] as const;
export type Shape = (typeof SHAPES)[number];
export const LOAD_MIXES = ['linear', 'driver', 'filament', 'current', 'mixed'] as const;
export type LoadMix = (typeof LOAD_MIXES)[number];

export interface RandomOptions {
  readonly shape: Shape;
  readonly mix: LoadMix;
  /** Nodes per run besides the source. */
  readonly nodes: number;
  readonly runs: number;
  readonly sag: boolean;
  /** Metres of a typical cable: more makes deeper drops. */
  readonly reach: number;
}

type Run = EstimateRequest['runs'][number];

/** Which pairs of nodes 0 … nodes are joined, 0 being the source. */
function joints(shape: Shape, nodes: number, random: () => number): [number, number][] {
  const below = (n: number) => Math.floor(random() * n);
  const pairs: [number, number][] = [];
  const width = Math.max(2, Math.round(Math.sqrt(nodes + 1)));
  for (let i = 1; i <= nodes; i++) {
    switch (shape) {
      case 'chain':
      case 'parallel':
      case 'loop':
        pairs.push([i - 1, i]);
        break;
      case 'tee':
        pairs.push([i % 3 === 0 ? i - 1 : Math.max(0, i - 2), i]);
        break;
      case 'hub':
        pairs.push([i === 1 ? 0 : 1, i]);
        break;
      case 'tree':
        pairs.push([below(i), i]);
        break;
      case 'mesh':
        if (i % width !== 0) pairs.push([i - 1, i]);
        if (i >= width) pairs.push([i - width, i]);
        break;
    }
  }
  if (shape === 'loop') pairs.push([nodes, 0], [below(nodes), nodes]);
  if (shape === 'parallel') for (const [a, b] of [...pairs]) if (random() < 0.4) pairs.push([b, a]);
  return pairs.filter(([a, b]) => a !== b);
}

function randomConductor(random: () => number): Conductor {
  const pick = <T>(list: readonly T[]) => list[Math.floor(random() * list.length)]!;
  const kind = random();
  if (kind < 0.5) return { awg: pick([8, 10, 12, 14, 16, 18] as const) };
  if (kind < 0.8) return { mm2: pick([1.5, 2.5, 4, 6, 10, 16] as const) };
  return { ohmsPerKm: 1 + 20 * random() };
}

function randomLoad(mix: LoadMix, random: () => number): Load {
  const watts = 1 + 9 * random();
  const kinds = { linear: 0, driver: 1, filament: 2, current: 3, mixed: Math.floor(random() * 5) };
  switch (kinds[mix]) {
    case 0:
      return { kind: 'resistive', watts, ratedVolts: 12 };
    case 1:
      return { kind: 'driver', watts, powerFactor: 0.6 + 0.4 * random(), minVolts: 8 + 2 * random() };
    case 2:
      return { kind: 'filament', watts: 2 * watts, ratedVolts: 12 };
    case 3:
      return { kind: 'current', amps: watts / 12 };
    default:
      return { kind: 'off' };
  }
}

/** A request with runs of one shape, some fixtures at the source, with leads, several alike, off or unreached. */
export function randomRequest(seed: number, options: RandomOptions): EstimateRequest {
  const random = seeded(seed);
  const runs = Array.from({ length: options.runs }, (_, r) => randomRun(r, options, random));
  const regulationPercent = options.sag ? 1 + 9 * random() : 0;
  return {
    conductorTemperatureC: -10 + 60 * random(),
    transformers: [
      {
        id: 'T',
        ratedVA: 600,
        lineVolts: 110 + 20 * random(),
        regulationPercent,
        ratedAt: random() < 0.5 ? 'open' : 'load',
        windings: [
          { id: 'w1', ratedVA: 300 },
          { id: 'w2', ratedVA: 300 },
        ],
        taps: [
          { id: 'a', volts: 12 },
          { id: 'b', volts: 14, winding: 'w1' },
          { id: 'c', volts: 13, winding: 'w2' },
        ],
        commons: [
          { id: 'C1', limitAmps: 25 },
          { id: 'C2', winding: 'w2' },
        ],
      },
    ],
    runs,
  };
}

function randomRun(r: number, options: RandomOptions, random: () => number): Run {
  const tapId = ['a', 'b', 'c'][Math.floor(random() * 3)]!;
  const name = (i: number) => (i === 0 ? 's' : `n${i}`);
  const pairs = joints(options.shape, options.nodes, random);
  const cables = pairs.map(([a, b], i) => ({
    id: `r${r}k${i}`,
    from: name(a),
    to: name(b),
    // Some joints have no length at all, some cables were measured from the far end.
    lengthMeters: random() < 0.05 ? 0 : 2 * options.reach * random(),
    conductor: randomConductor(random),
    ...(random() < 0.2 && { extraOhms: 0.02 * random() }),
  }));
  const fixtures: Run['fixtures'] = [];
  for (let i = 0; i <= options.nodes; i++) {
    // Some nodes stay bare: splices and dead ends.
    if (random() < 0.2) continue;
    fixtures.push({
      id: `r${r}f${i}`,
      at: random() < 0.03 ? `nowhere${i}` : name(i),
      ...(random() < 0.2 && { quantity: 1 + Math.floor(3 * random()) }),
      load: randomLoad(options.mix, random),
      ...(random() < 0.6 && { lead: { conductor: { awg: 18 }, lengthMeters: 3 * random() } }),
      window: { minVolts: 9, maxVolts: 15 },
    });
  }
  if (fixtures.length + cables.length === 0) fixtures.push(dummyFixture(r));
  return {
    id: `r${r}`,
    transformerId: 'T',
    tapId,
    commonId: tapId === 'c' ? 'C2' : 'C1',
    source: 's',
    cables,
    fixtures,
  };
}

function dummyFixture(r: number): Run['fixtures'][number] {
  return { id: `r${r}f`, at: 's', load: { kind: 'off' }, window: { minVolts: 9, maxVolts: 15 } };
}
