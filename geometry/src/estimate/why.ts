import type { CableAnswer, EstimateAnswer, EstimateRequest, EstimateRun } from './contract/index.js';

/** A length of cable on the way to a fixture, in the way the current takes it. */
export interface DropSegment {
  readonly cableId: string;
  readonly fromVolts: number;
  readonly toVolts: number;
  readonly dropVolts: number;
  /** Through it, for this fixture and all others beyond. */
  readonly amps: number;
}

/** Where a fixture's volts went: `openVolts` less sag, segments and lead is what it has. */
export interface VoltsWhy {
  readonly fixtureId: string;
  readonly runId: string;
  /** Of the tap without load, at the line's volts. */
  readonly openVolts: number;
  /** Lost in the transformer's winding under all its load. */
  readonly sagVolts: number;
  readonly segments: readonly DropSegment[];
  /** Lost in the fixture's own lead. */
  readonly leadVolts: number;
  readonly volts: number;
}

/**
 * Follows the volts from the tap to a fixture. In a loop or mesh there are several ways, and each loses the same
 * (Kirchhoff): the one is told that carries the most current. Null for a fixture that is not fed or not asked for.
 */
export function whyOf(request: EstimateRequest, answer: EstimateAnswer, fixtureId: string): VoltsWhy | null {
  const run = request.runs.find(({ fixtures }) => fixtures.some(({ id }) => id === fixtureId));
  const reading = answer.fixtures.find(({ id }) => id === fixtureId);
  const terminal = run && answer.runs.find(({ id }) => id === run.id)?.terminalVolts;
  if (!run || !reading || reading.state === 'unwired' || terminal === undefined) return null;
  const segments = wayTo(run, answer, run.fixtures.find(({ id }) => id === fixtureId)!.at);
  if (!segments) return null;
  const atNode = segments.at(-1)?.toVolts ?? terminal;
  const openVolts = openVoltsOf(request, run);
  return {
    fixtureId,
    runId: run.id,
    openVolts,
    sagVolts: openVolts - terminal,
    segments,
    leadVolts: atNode - reading.volts,
    volts: reading.volts,
  };
}

/** Upstream from the node: always by the cable that brings the most current; where none flows, by the fewest cables. */
function wayTo(run: EstimateRun, answer: EstimateAnswer, node: string): DropSegment[] | null {
  const readings = new Map(answer.cables.map((cable) => [cable.id, cable]));
  const segments: DropSegment[] = [];
  const seen = new Set<string>([node]);
  for (let at = node; at !== run.source; ) {
    const into = run.cables
      .flatMap((cable) => {
        const reading = readings.get(cable.id);
        if (!reading) return [];
        if (cable.to === at && reading.amps > 0) return [{ next: cable.from, segment: forwards(reading) }];
        if (cable.from === at && reading.amps < 0) return [{ next: cable.to, segment: backwards(reading) }];
        return [];
      })
      .filter(({ next }) => !seen.has(next))
      .sort((a, b) => b.segment.amps - a.segment.amps)[0];
    if (!into) {
      const still = stillWay(run, readings, at);
      return still && [...still, ...segments];
    }
    segments.unshift(into.segment);
    seen.add(into.next);
    at = into.next;
  }
  return segments;
}

/** The shortest way from the source to a node that no current reaches. */
function stillWay(
  run: EstimateRun,
  readings: ReadonlyMap<string, CableAnswer>,
  node: string,
): DropSegment[] | null {
  const ways = new Map<string, DropSegment[]>([[run.source, []]]);
  const queue = [run.source];
  for (let at = queue.shift(); at !== undefined; at = queue.shift()) {
    if (at === node) return ways.get(at)!;
    for (const cable of run.cables) {
      const reading = readings.get(cable.id);
      const next = cable.from === at ? cable.to : cable.to === at ? cable.from : null;
      if (!reading || next === null || ways.has(next)) continue;
      ways.set(next, [...ways.get(at)!, cable.from === at ? forwards(reading) : backwards(reading)]);
      queue.push(next);
    }
  }
  return null;
}

const forwards = ({ id, fromVolts, toVolts, dropVolts, amps }: CableAnswer): DropSegment => ({
  cableId: id,
  fromVolts,
  toVolts,
  dropVolts,
  amps,
});
const backwards = ({ id, fromVolts, toVolts, dropVolts, amps }: CableAnswer): DropSegment => ({
  cableId: id,
  fromVolts: toVolts,
  toVolts: fromVolts,
  dropVolts: -dropVolts,
  amps: -amps,
});

function openVoltsOf(request: EstimateRequest, run: EstimateRun): number {
  const transformer = request.transformers.find(({ id }) => id === run.transformerId);
  const tap = transformer?.taps.find(({ id }) => id === run.tapId);
  if (!transformer || !tap) throw new Error(`Run ${run.id} is on no known tap.`);
  const { lineVolts = 120, nominalLineVolts = 120, regulationPercent = 0, ratedAt = 'open' } = transformer;
  const atLine = (tap.volts * lineVolts) / nominalLineVolts;
  return ratedAt === 'load' ? atLine * (1 + regulationPercent / 100) : atLine;
}
