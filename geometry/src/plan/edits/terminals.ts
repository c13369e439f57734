import type { FixtureItem, LampItem, Terminal, TransformerItem } from '../../catalogue/index.js';
import { type IdSource, itemOf, labelOf, newId, nextNumber, recordOf, recordsOf } from '../build.js';
import type { FixtureRecord, PlanDocument, RunRecord } from '../records.js';
import { Draft } from './draft.js';
import { type EditResult, made, missing, type Refused, refuse } from './result.js';

type Tap = Extract<Terminal, { type: 'tap' }>;
type Common = Extract<Terminal, { type: 'common' }>;

/** Runs start at the lowest tap that gives at least this; more is for long runs only (common practice). */
const USUAL_TAP_VOLTS = 12;

export function tapsOf(item: TransformerItem): Tap[] {
  return item.terminals.filter((t): t is Tap => t.type === 'tap');
}

export function commonsOf(item: TransformerItem): Common[] {
  return item.terminals.filter((t): t is Common => t.type === 'common');
}

/** What gives light in a fixture: its lamp, or itself when the light is built in. Undefined while it has no lamp. */
export function lightOf(
  doc: PlanDocument,
  fixture: FixtureRecord,
): LampItem | Extract<FixtureItem, { light: 'integrated' }> | undefined {
  const item = itemOf(doc, fixture.itemId, 'fixture');
  if (item?.light === 'integrated') return item;
  return itemOf(doc, fixture.lampId, 'lamp');
}

/** Volt-amperes that a fixture is named for, all its quantity together; 0 when it has no light yet. */
export function nominalVA(doc: PlanDocument, fixture: FixtureRecord): number {
  const load = lightOf(doc, fixture)?.load;
  switch (load?.kind) {
    case undefined:
    case 'off':
      return 0;
    case 'driver':
      return (load.watts / (load.powerFactor ?? 1)) * fixture.quantity;
    case 'filament':
    case 'resistive':
      return load.watts * fixture.quantity;
    case 'current':
      return load.amps * USUAL_TAP_VOLTS * fixture.quantity;
  }
}

/** Amperes on each common of a transformer, roughly: named VA over the tap's volts, without any drop. */
export function roughCommonAmps(
  doc: PlanDocument,
  transformerId: string,
  item: TransformerItem,
): Map<string, { amps: number; runs: number }> {
  const runs = new Map<string, RunRecord>();
  for (const run of recordsOf(doc, 'run')) if (run.transformerId === transformerId) runs.set(run.id, run);
  const runOfNode = new Map<string, string>();
  for (const cable of recordsOf(doc, 'cable'))
    if (cable.runId !== null && runs.has(cable.runId)) {
      runOfNode.set(cable.fromId, cable.runId);
      runOfNode.set(cable.toId, cable.runId);
    }
  const load = new Map(commonsOf(item).map((common) => [common.id, { amps: 0, runs: 0 }]));
  for (const run of runs.values()) {
    const entry = load.get(run.commonId);
    if (entry) entry.runs += 1;
  }
  for (const fixture of recordsOf(doc, 'fixture')) {
    const run = runs.get(runOfNode.get(fixture.id) ?? '');
    const entry = run && load.get(run.commonId);
    if (!run || !entry) continue;
    const volts = tapsOf(item).find((tap) => tap.id === run.tapId)?.volts ?? USUAL_TAP_VOLTS;
    entry.amps += nominalVA(doc, fixture) / volts;
  }
  return load;
}

/** The common of a winding with the most amperes to spare; among equals the one with fewest runs. */
export function roomiestCommon(
  doc: PlanDocument,
  transformerId: string,
  item: TransformerItem,
  tap: Tap,
): Common | undefined {
  const load = roughCommonAmps(doc, transformerId, item);
  const windingVA = item.windings.find((w) => w.id === tap.winding)?.ratedVA ?? item.ratedVA;
  let best: { common: Common; full: boolean; room: number; runs: number } | undefined;
  for (const common of commonsOf(item)) {
    if (common.winding !== tap.winding) continue;
    const { amps, runs } = load.get(common.id) ?? { amps: 0, runs: 0 };
    const candidate = {
      common,
      full: runs >= common.maxConductors,
      room: (common.limitAmps ?? windingVA / tap.volts) - amps,
      runs,
    };
    if (!best || better(candidate, best)) best = candidate;
  }
  return best?.common;
}

interface Candidate {
  readonly full: boolean;
  readonly room: number;
  readonly runs: number;
}

function better(a: Candidate, b: Candidate): boolean {
  if (a.full !== b.full) return b.full;
  if (a.room !== b.room) return a.room > b.room;
  return a.runs < b.runs;
}

/** A new run at a transformer: the lowest usual tap that has a common, and the common with most room. */
export function startRun(draft: Draft, transformerId: string): RunRecord | Refused {
  const transformer = draft.of(transformerId, 'transformer');
  if (!transformer) return missing('transformer');
  const item = itemOf(draft.plan, transformer.itemId, 'transformer');
  if (!item)
    return refuse(
      'wrong-item',
      `${labelOf(transformer, draft.plan)} has no item to take its terminals from.`,
    );
  const commonWindings = new Set(commonsOf(item).map((common) => common.winding));
  const taps = tapsOf(item).filter((tap) => commonWindings.has(tap.winding));
  const usual = taps.filter((tap) => tap.volts >= USUAL_TAP_VOLTS);
  const tap = usual.length > 0 ? usual.reduce((a, b) => (b.volts < a.volts ? b : a)) : taps[0];
  const common = tap && roomiestCommon(draft.plan, transformerId, item, tap);
  if (!tap || !common)
    return refuse(
      'no-terminals',
      `${labelOf(transformer, draft.plan)} has no tap with a common on the same winding.`,
    );
  return draft.put({
    kind: 'run',
    id: draft.ids(),
    number: nextNumber(draft.plan, 'run'),
    name: '',
    transformerId,
    tapId: tap.id,
    commonId: common.id,
    schedule: null,
  });
}

/**
 * Lands a run on another tap, another common, or both. Changing only the tap to one of another winding takes
 * the roomiest common there along, and says so; a common of another winding alone is refused.
 */
export function setRunTerminals(
  doc: PlanDocument,
  runId: string,
  terminals: { tapId?: string; commonId?: string },
  ids: IdSource = newId,
): EditResult {
  const run = recordOf(doc, runId, 'run');
  if (!run) return missing('run');
  const transformer = recordOf(doc, run.transformerId, 'transformer');
  const item = transformer && itemOf(doc, transformer.itemId, 'transformer');
  if (!item) return missing('transformer of this run');
  const tap = tapsOf(item).find((t) => t.id === (terminals.tapId ?? run.tapId));
  const common = commonsOf(item).find((t) => t.id === (terminals.commonId ?? run.commonId));
  if (!tap || !common)
    return refuse(
      'unknown-terminal',
      `${labelOf(transformer, doc)} has no ${tap ? `common ${terminals.commonId ?? run.commonId}` : `tap ${terminals.tapId ?? run.tapId}`}.`,
    );
  const draft = new Draft(doc, ids);
  if (tap.winding === common.winding) {
    draft.put({ ...run, tapId: tap.id, commonId: common.id });
    return made(draft, [runId]);
  }
  const moved =
    terminals.commonId === undefined ? roomiestCommon(doc, run.transformerId, item, tap) : undefined;
  if (!moved)
    return refuse(
      'different-windings',
      `Tap ${tap.id} and common ${common.id} are on different windings; a run needs both on one.`,
    );
  draft.put({ ...run, tapId: tap.id, commonId: moved.id });
  return made(draft, [runId], [`The run moved to common ${moved.id}, on the winding of tap ${tap.id}.`]);
}
