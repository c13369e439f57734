import { type IdSource, isNode, itemOf, labelOf, newId, recordsOf, sourceTransformerId } from '../build.js';
import type { CableRecord, PlanDocument, PlanPoint, RunRecord } from '../records.js';
import { Draft } from './draft.js';
import { ensureItem, type ItemChoice } from './items.js';
import { assignRuns, feedingRuns, networkAt } from './network.js';
import { cablePoints, cutAt } from './polyline.js';
import { type EditResult, made, missing, type NeedsConfirmation, type Refused, refuse } from './result.js';
import { putSplice, splitInDraft } from './split.js';
import { startRun } from './terminals.js';

/** One click of drawing cable: on a thing that cable ends at, on a cable (makes a splice), or on nothing. */
export type CableStop =
  | { readonly on: 'record'; readonly id: string }
  | { readonly on: 'cable'; readonly id: string; readonly at: PlanPoint }
  | { readonly on: 'sheet'; readonly at: PlanPoint };

export interface CableDrawing {
  readonly sheetId: string;
  /**
   * At least two. Records and cables end one cable and begin the next, so that clicking from fixture to
   * fixture draws a daisy chain; places on the sheet are bends, or a capped end where they come first or last.
   */
  readonly stops: readonly CableStop[];
  readonly cable: ItemChoice;
  /** Lands cable that leaves a transformer on this run of it; without, a new run begins there. */
  readonly runId?: string;
  /** The person confirmed marked-to-marked for every loop and join that this drawing closes. */
  readonly markedToMarked?: boolean;
}

/**
 * Draws cable along the stops. Cable that leaves a transformer or feed starts a run (lowest usual tap,
 * roomiest common); cable that meets a fed network joins its run. A loop or a join of two fed ends needs
 * marked-to-marked confirmed; joins across taps, windings or transformers are refused. Selects the cables.
 */
export function drawCable(doc: PlanDocument, drawing: CableDrawing, ids: IdSource = newId): EditResult {
  const draft = new Draft(doc, ids);
  if (!draft.of(drawing.sheetId, 'sheet')) return missing('sheet');
  const itemId = ensureItem(draft, drawing.cable);
  if (!itemOf(draft.plan, itemId, 'cable')) return refuse('wrong-item', 'That item is no cable.');
  const legs = layOut(draft, drawing);
  if ('kind' in legs) return legs;
  if (legs.length === 0)
    return refuse('too-few-points', 'A cable needs two ends: click where it starts and where it goes.');
  const drawn: CableRecord[] = [];
  const notes: string[] = [];
  let question: NeedsConfirmation | undefined;
  for (const leg of legs) {
    const joined = join(draft, leg, drawing, notes);
    if ('kind' in joined) return joined;
    if (joined.closes !== null && !drawing.markedToMarked)
      question ??= { kind: 'confirm', needs: 'marked-to-marked', message: joined.closes };
    drawn.push(putCable(draft, leg, itemId, joined.runId, joined.closes !== null));
  }
  if (question) return question;
  assignRuns(draft);
  return made(
    draft,
    drawn.map((cable) => cable.id),
    notes,
  );
}

interface Leg {
  readonly sheetId: string;
  readonly fromId: string;
  readonly toId: string;
  readonly via: PlanPoint[];
}

/** Turns stops into legs between nodes, cutting cables and capping ends on the way. */
function layOut(draft: Draft, drawing: CableDrawing): Leg[] | Refused {
  const { stops, sheetId } = drawing;
  const legs: Leg[] = [];
  let fromId: string | null = null;
  let via: PlanPoint[] = [];
  const last = stops.length - 1;
  if (last < 1) return [];
  for (const [i, stop] of stops.entries()) {
    if (stop.on === 'sheet' && i > 0 && i < last) {
      via.push(stop.at);
      continue;
    }
    const node = nodeAt(draft, sheetId, stop);
    if (typeof node !== 'string') return node;
    if (fromId !== null) {
      if (fromId === node && via.length === 0) continue;
      if (fromId === node)
        return refuse('cable-to-itself', `A cable from ${nameOf(draft, node)} back to itself feeds nothing.`);
      legs.push({ sheetId, fromId, toId: node, via });
    }
    fromId = node;
    via = [];
  }
  return legs;
}

function nodeAt(draft: Draft, sheetId: string, stop: CableStop): string | Refused {
  switch (stop.on) {
    case 'record': {
      const record = draft.get(stop.id);
      if (!isNode(record)) return missing('end of this cable');
      if (record.sheetId !== sheetId)
        return refuse(
          'wrong-kind',
          `${labelOf(record, draft.plan)} is on another sheet; feed that sheet instead.`,
        );
      return record.id;
    }
    case 'cable': {
      const cable = draft.of(stop.id, 'cable') ?? undefined;
      const split = cable && splitInDraft(draft, nearestPart(draft, cable, stop.at), stop.at);
      return split ? split.nodeId : missing('cable to splice into');
    }
    case 'sheet':
      return putSplice(draft, sheetId, stop.at).id;
  }
}

/** A cable that this drawing has cut already is two: the one drawn nearer to the click is meant. */
function nearestPart(draft: Draft, cable: CableRecord, near: PlanPoint): CableRecord {
  if (draft.before.get(cable.id) === cable) return cable;
  let best = { cable, distance: Number.POSITIVE_INFINITY };
  for (const part of recordsOf(draft.plan, 'cable')) {
    if (part.id !== cable.id && draft.before.has(part.id)) continue;
    const points = cablePoints(draft.plan, part);
    if (!points) continue;
    const { at } = cutAt(points, near);
    const distance = Math.hypot(at.x - near.x, at.y - near.y);
    if (distance < best.distance) best = { cable: part, distance };
  }
  return best.cable;
}

interface Joined {
  /** The run that the new cable belongs to. */
  readonly runId: string | null;
  /** Why marked-to-marked matters here, or null. */
  readonly closes: string | null;
}

function join(draft: Draft, leg: Leg, drawing: CableDrawing, notes: string[]): Joined | Refused {
  const from = sourceTransformerId(draft.get(leg.fromId));
  const to = sourceTransformerId(draft.get(leg.toId));
  if (from !== null && to !== null)
    return refuse(
      'cable-between-feeds',
      'A cable straight from one feed to another would short or do nothing.',
    );
  if (from !== null) return joinSource(draft, from, leg.toId, drawing);
  if (to !== null) return joinSource(draft, to, leg.fromId, drawing);
  return joinNodes(draft, leg, notes);
}

/** Cable between a transformer and a fixture or junction. */
function joinSource(
  draft: Draft,
  transformerId: string,
  nodeId: string,
  drawing: CableDrawing,
): Joined | Refused {
  const run = feedingRuns(draft.plan, networkAt(draft.plan, nodeId))[0];
  if (run && run.transformerId !== transformerId) return otherTransformer();
  if (run)
    return {
      runId: run.id,
      closes: `This closes a loop back to the transformer: ${labelOf(run, draft.plan)} is then fed from both ends. Join marked to marked and check with a meter before closing, or the tap is shorted.`,
    };
  if (drawing.runId !== undefined) {
    const chosen = draft.of(drawing.runId, 'run');
    if (!chosen) return missing('run to land on');
    if (chosen.transformerId !== transformerId) return otherTransformer();
    return { runId: chosen.id, closes: null };
  }
  const started = startRun(draft, transformerId);
  return started.kind === 'refused' ? started : { runId: started.id, closes: null };
}

/** Cable between two things that are no transformers. */
function joinNodes(draft: Draft, leg: Leg, notes: string[]): Joined | Refused {
  const here = networkAt(draft.plan, leg.fromId);
  const a = feedingRuns(draft.plan, here)[0];
  if (here.nodes.includes(leg.toId))
    return {
      runId: a?.id ?? null,
      closes:
        'This closes a loop. Join marked to marked and check with a meter before closing, or the tap is shorted.',
    };
  const b = feedingRuns(draft.plan, networkAt(draft.plan, leg.toId))[0];
  if (!a || !b) return { runId: (a ?? b)?.id ?? null, closes: null };
  const refused = a.id === b.id ? undefined : whyNotJoin(draft, a, b);
  if (refused) return refused;
  if (a.id !== b.id) merge(draft, a, b, notes);
  return {
    runId: a.id,
    closes: `This joins two fed ends (${labelOf(a, draft.plan)}${a.id === b.id ? '' : ` and ${labelOf(b, draft.plan)}`}). Join marked to marked and check with a meter before closing, or the tap is shorted.`,
  };
}

function whyNotJoin(draft: Draft, a: RunRecord, b: RunRecord): Refused | undefined {
  if (a.transformerId !== b.transformerId) return otherTransformer();
  if (a.tapId !== b.tapId)
    return refuse(
      'joins-taps',
      `${labelOf(a, draft.plan)} is on tap ${a.tapId} and ${labelOf(b, draft.plan)} on tap ${b.tapId}: joining them would short the volts between the taps.`,
    );
  if (windingOfCommon(draft, a) !== windingOfCommon(draft, b))
    return refuse(
      'joins-windings',
      `${labelOf(a, draft.plan)} and ${labelOf(b, draft.plan)} are on commons of different windings and must not be joined.`,
    );
  return undefined;
}

function windingOfCommon(draft: Draft, run: RunRecord): string | undefined {
  const transformer = draft.of(run.transformerId, 'transformer');
  const item = transformer && itemOf(draft.plan, transformer.itemId, 'transformer');
  return item?.terminals.find((t) => t.type === 'common' && t.id === run.commonId)?.winding;
}

function otherTransformer(): Refused {
  return refuse(
    'joins-transformers',
    'Runs of different transformers are never joined: one would feed back through the other.',
  );
}

/** Two joined runs are one network with two fed ends: the first run keeps it all, on its own common. */
function merge(draft: Draft, a: RunRecord, b: RunRecord, notes: string[]): void {
  for (const cable of [...recordsOf(draft.plan, 'cable')])
    if (cable.runId === b.id) draft.put({ ...cable, runId: a.id });
  const joined = `${labelOf(b, draft.plan)} became part of ${labelOf(a, draft.plan)}`;
  draft.remove(b.id);
  notes.push(
    a.commonId === b.commonId ? `${joined}.` : `${joined}; both ends now land on common ${a.commonId}.`,
  );
}

function putCable(
  draft: Draft,
  leg: Leg,
  itemId: string,
  runId: string | null,
  marked: boolean,
): CableRecord {
  return draft.put({
    kind: 'cable',
    id: draft.ids(),
    sheetId: leg.sheetId,
    runId,
    fromId: leg.fromId,
    toId: leg.toId,
    via: leg.via,
    itemId,
    measuredMeters: null,
    slackFromMeters: null,
    slackToMeters: null,
    riseMeters: 0,
    extraOhms: 0,
    markedToMarked: marked,
  });
}

function nameOf(draft: Draft, id: string): string {
  const record = draft.get(id);
  return record ? labelOf(record, draft.plan) : 'it';
}
