import {
  type CableRecord,
  type FixtureRecord,
  itemOf,
  labelOf,
  lightOf,
  type PlanDocument,
  type RunRecord,
  recordOf,
  recordsOf,
  settingsOf,
  sourceTransformerId,
  type TransformerRecord,
} from '../../plan/index.js';
import type {
  EstimateCable,
  EstimateFixture,
  EstimateRequest,
  EstimateRun,
  EstimateTransformer,
} from '../contract/index.js';
import { type CableLength, cableLengths } from './cable-lengths.js';
import type { PlanFault } from './fault.js';
import { capitalised } from './words.js';

/** What a plan asks of the estimate, and what of it can't be asked yet. */
export interface PlanEstimate {
  /** Null while there is nothing to ask. Ids are those of the plan's records. */
  readonly request: EstimateRequest | null;
  /** Fixtures that no run feeds: "not wired yet". */
  readonly unwired: string[];
  /** Cables without a length, and those beyond them, in the order of the plan. */
  readonly waiting: string[];
  /** Fixtures that can be reached only through cable that waits. */
  readonly waitingFixtures: string[];
  /** Why something is missing from the request. */
  readonly faults: PlanFault[];
}

/**
 * The estimate request of a plan: every run with its cable as far as lengths are known. Nodes are named by
 * the records that they are; a run's source by its transformer, wherever it comes onto a sheet, so that
 * feeds on several sheets add up. Cable without a length is left out with all that hangs on it alone.
 */
export function estimateRequestOf(
  doc: PlanDocument,
  lengths: ReadonlyMap<string, CableLength> = cableLengths(doc),
): PlanEstimate {
  const wiring = wiringOf(doc, lengths);
  const settings = settingsOf(doc);
  const faults: PlanFault[] = [];
  const waiting = new Set<string>();
  const reached = new Map<string, FixtureRecord[]>();
  const unwired: string[] = [];
  const waitingFixtures: string[] = [];
  for (const fixture of recordsOf(doc, 'fixture')) {
    const runs = wiring.filter((run) => run.nodes.has(fixture.id));
    const run = runs.find((r) => r.reached.has(fixture.id));
    if (run) {
      const list = reached.get(run.run.id);
      if (list) list.push(fixture);
      else reached.set(run.run.id, [fixture]);
    } else if (runs.length > 0) waitingFixtures.push(fixture.id);
    else unwired.push(fixture.id);
  }
  const runs: EstimateRun[] = [];
  const transformers = new Map<string, EstimateTransformer>();
  for (const { run, transformer, known, waits } of wiring) {
    const asked = transformerAsked(doc, transformer, settings.lineVolts);
    for (const cable of waits) waiting.add(cable.id);
    if (!asked || known.length === 0) continue;
    const fixtures = (reached.get(run.id) ?? []).flatMap((fixture) => fixtureAsked(doc, fixture) ?? []);
    transformers.set(transformer.id, asked);
    runs.push({
      id: run.id,
      transformerId: transformer.id,
      tapId: run.tapId,
      commonId: run.commonId,
      source: transformer.id,
      cables: known.flatMap((cable) => cableAsked(doc, cable, transformer.id, lengths) ?? []),
      fixtures,
    });
  }
  for (const wired of wiring) faults.push(...runWaits(doc, wired, lengths));
  for (const fixture of recordsOf(doc, 'fixture')) faults.push(...lightFaults(doc, fixture));
  const request: EstimateRequest = {
    conductorTemperatureC: settings.conductorTemperatureC,
    transformers: [...transformers.values()],
    runs,
  };
  return {
    request: runs.length > 0 ? request : null,
    unwired,
    waiting: [...recordsOf(doc, 'cable')].filter((cable) => waiting.has(cable.id)).map((cable) => cable.id),
    waitingFixtures,
    faults,
  };
}

interface RunWiring {
  readonly run: RunRecord;
  readonly transformer: TransformerRecord;
  readonly cables: CableRecord[];
  /** Cables with a length that current can reach through cables with a length. */
  readonly known: CableRecord[];
  readonly waits: CableRecord[];
  /** All that the run's cables end at. */
  readonly nodes: Set<string>;
  /** What is reached through known cable. */
  readonly reached: Set<string>;
}

/** The cable of every run, lowest number first, followed from its source as far as lengths are known. */
function wiringOf(doc: PlanDocument, lengths: ReadonlyMap<string, CableLength>): RunWiring[] {
  const cablesOfRun = new Map<string, CableRecord[]>();
  for (const cable of recordsOf(doc, 'cable')) {
    if (cable.runId === null) continue;
    const list = cablesOfRun.get(cable.runId);
    if (list) list.push(cable);
    else cablesOfRun.set(cable.runId, [cable]);
  }
  const wirings: RunWiring[] = [];
  const runs = [...recordsOf(doc, 'run')].sort((a, b) => a.number - b.number || (a.id < b.id ? -1 : 1));
  for (const run of runs) {
    const transformer = recordOf(doc, run.transformerId, 'transformer');
    const cables = cablesOfRun.get(run.id);
    if (!transformer || !cables) continue;
    const nodes = new Set(cables.flatMap((c) => [c.fromId, c.toId]).map((id) => nodeName(doc, id, run)));
    const reached = reach(doc, run, cables, lengths);
    const isKnown = (cable: CableRecord) =>
      reached.has(nodeName(doc, cable.fromId, run)) &&
      reached.has(nodeName(doc, cable.toId, run)) &&
      hasLength(lengths, cable);
    const known = cables.filter(isKnown);
    const waits = cables.filter((cable) => !isKnown(cable));
    wirings.push({ run, transformer, cables, known, waits, nodes, reached });
  }
  return wirings;
}

function reach(
  doc: PlanDocument,
  run: RunRecord,
  cables: readonly CableRecord[],
  lengths: ReadonlyMap<string, CableLength>,
): Set<string> {
  const next = new Map<string, string[]>();
  const link = (a: string, b: string) => {
    const list = next.get(a);
    if (list) list.push(b);
    else next.set(a, [b]);
  };
  for (const cable of cables) {
    if (!hasLength(lengths, cable)) continue;
    const from = nodeName(doc, cable.fromId, run);
    const to = nodeName(doc, cable.toId, run);
    link(from, to);
    link(to, from);
  }
  const reached = new Set([run.transformerId]);
  for (const node of reached) for (const other of next.get(node) ?? []) reached.add(other);
  return reached;
}

function hasLength(lengths: ReadonlyMap<string, CableLength>, cable: CableRecord): boolean {
  return (lengths.get(cable.id)?.totalMeters ?? null) !== null;
}

/** A feed of the run's transformer is its terminals; anything else is itself. */
function nodeName(doc: PlanDocument, id: string, run: RunRecord): string {
  return sourceTransformerId(doc.get(id)) === run.transformerId ? run.transformerId : id;
}

function transformerAsked(
  doc: PlanDocument,
  transformer: TransformerRecord,
  planLineVolts: number,
): EstimateTransformer | undefined {
  const item = itemOf(doc, transformer.itemId, 'transformer');
  if (!item) return undefined;
  const asked = {
    id: transformer.id,
    ratedVA: item.ratedVA,
    lineVolts: transformer.lineVolts ?? planLineVolts,
    nominalLineVolts: item.nominalLineVolts,
    regulationPercent: item.regulationPercent,
    ratedAt: item.ratedAt,
    windings: item.windings,
    taps: [] as EstimateTransformer['taps'],
    commons: [] as EstimateTransformer['commons'],
  };
  for (const terminal of item.terminals) {
    const { id, winding, limitAmps } = terminal;
    const limit = limitAmps === null ? {} : { limitAmps };
    if (terminal.type === 'tap') asked.taps.push({ id, volts: terminal.volts, winding, ...limit });
    else asked.commons.push({ id, winding, ...limit });
  }
  return asked;
}

function cableAsked(
  doc: PlanDocument,
  cable: CableRecord,
  transformerId: string,
  lengths: ReadonlyMap<string, CableLength>,
): EstimateCable | undefined {
  const item = itemOf(doc, cable.itemId, 'cable');
  const lengthMeters = lengths.get(cable.id)?.totalMeters ?? null;
  if (!item || lengthMeters === null) return undefined;
  const node = (id: string) => (sourceTransformerId(doc.get(id)) === transformerId ? transformerId : id);
  return {
    id: cable.id,
    from: node(cable.fromId),
    to: node(cable.toId),
    lengthMeters,
    conductor: item.conductor,
    extraOhms: cable.extraOhms,
    ...(item.ampacityAmps === null ? {} : { ampacityAmps: item.ampacityAmps }),
  };
}

/** Undefined while the fixture has no light: it draws nothing then, and says so. */
function fixtureAsked(doc: PlanDocument, fixture: FixtureRecord): EstimateFixture | undefined {
  const item = itemOf(doc, fixture.itemId, 'fixture');
  const light = lightOf(doc, fixture);
  if (!item || !light) return undefined;
  return {
    id: fixture.id,
    at: fixture.id,
    quantity: fixture.quantity,
    load: light.load,
    lead: fixture.lead ?? item.lead,
    window: light.window,
    ...(light.target === null ? {} : { target: light.target }),
  };
}

function runWaits(
  doc: PlanDocument,
  { run, cables, waits }: RunWiring,
  lengths: ReadonlyMap<string, CableLength>,
): PlanFault[] {
  if (waits.length === 0) return [];
  const label = capitalised(labelOf(run, doc));
  const what = waits.length === cables.length ? label : `Part of ${labelOf(run, doc)}`;
  const reasons = new Set(waits.map((cable) => lengths.get(cable.id)?.waitsFor));
  const remedy = reasons.has('scale')
    ? 'set the scale of the sheet, or type measured lengths'
    : 'it is drawn above the photo’s horizon; move it, or type its measured length';
  return [
    {
      code: 'waits-for-scale',
      severity: 'caution',
      recordId: run.id,
      otherId: null,
      message: `${what} has no length yet and is left out of the volts: ${remedy}.`,
    },
  ];
}

function lightFaults(doc: PlanDocument, fixture: FixtureRecord): PlanFault[] {
  const item = itemOf(doc, fixture.itemId, 'fixture');
  if (item?.light !== 'lamp') return [];
  const lamp = itemOf(doc, fixture.lampId, 'lamp');
  const label = capitalised(labelOf(fixture, doc));
  const about = { recordId: fixture.id, otherId: null };
  if (!lamp)
    return [
      { ...about, code: 'no-light', severity: 'caution', message: `${label} has no lamp yet; choose one.` },
    ];
  const faults: PlanFault[] = [];
  if (lamp.base !== item.base)
    faults.push({
      ...about,
      code: 'lamp-does-not-fit',
      severity: 'fault',
      message: `${label} takes ${item.base} lamps; ${lamp.name} has ${lamp.base}.`,
    });
  const watts = 'watts' in lamp.load ? lamp.load.watts : 0;
  if (item.maxWatts !== null && watts > item.maxWatts)
    faults.push({
      ...about,
      code: 'lamp-too-strong',
      severity: 'fault',
      message: `${label} takes at most ${item.maxWatts} W; its lamp draws ${watts} W and may overheat it.`,
    });
  return faults;
}
