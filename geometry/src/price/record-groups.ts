import {
  type CableRecord,
  isNode,
  type PlanDocument,
  recordOf,
  recordsOf,
  sourceTransformerId,
} from '../plan/index.js';
import type { JobPricing } from './job-pricing.js';

/** Everything that feeds: transformers, wherever their feeds come onto a sheet. */
const SOURCE = ' source';
/** Stands for "in the base" among the groups found beneath a cable. */
const BASE = ' base';

interface Edge {
  readonly cable: CableRecord;
  readonly a: string;
  readonly b: string;
}

/**
 * Which group each fixture, cable and junction of a plan is part of; null is the base, which is always in.
 * A fixture is where it was put. A cable is part of a group when nothing but lights of that group hangs on
 * it, so that it goes with them; cable that several groups need is shared, and so are home runs (from the
 * transformer to the first fixture or hub): both are in the base. A junction goes when all its cable goes.
 * Costs a walk over the wiring: its time grows with the number of cables.
 */
export function recordGroups(
  doc: PlanDocument,
  pricing: Pick<JobPricing, 'groups' | 'members'>,
): Map<string, string | null> {
  const known = new Set(pricing.groups.map(({ id }) => id));
  const result = new Map<string, string | null>();
  for (const fixture of recordsOf(doc, 'fixture')) {
    const group = Object.hasOwn(pricing.members, fixture.id) ? pricing.members[fixture.id] : undefined;
    result.set(fixture.id, group !== undefined && known.has(group) ? group : null);
  }
  const edges = edgesOf(doc);
  const groupOfCable = groupByBlock(edges, (node) =>
    recordOf(doc, node, 'fixture') ? (result.get(node) ?? BASE) : null,
  );
  for (const id of homeRuns(doc, edges)) groupOfCable.set(id, null);
  for (const { cable } of edges) result.set(cable.id, groupOfCable.get(cable.id) ?? null);
  const cablesOf = new Map<string, CableRecord[]>();
  for (const { cable, a, b } of edges)
    for (const node of [a, b]) cablesOf.set(node, [...(cablesOf.get(node) ?? []), cable]);
  for (const junction of recordsOf(doc, 'junction')) {
    const groups = new Set((cablesOf.get(junction.id) ?? []).map(({ id }) => result.get(id) ?? null));
    const [only = null] = groups;
    result.set(junction.id, groups.size === 1 ? only : null);
  }
  return result;
}

function edgesOf(doc: PlanDocument): Edge[] {
  const edges: Edge[] = [];
  for (const cable of recordsOf(doc, 'cable')) {
    const from = doc.get(cable.fromId);
    const to = doc.get(cable.toId);
    if (!isNode(from) || !isNode(to)) continue;
    const node = (record: typeof from) => (sourceTransformerId(record) === null ? record.id : SOURCE);
    edges.push({ cable, a: node(from), b: node(to) });
  }
  return edges;
}

/** Cables from a source to the first fixture or hub, through splices. */
function homeRuns(doc: PlanDocument, edges: readonly Edge[]): Set<string> {
  const at = neighbours(edges);
  const found = new Set<string>();
  const waiting = [SOURCE];
  while (waiting.length > 0) {
    for (const { edge, other } of at.get(waiting.pop() ?? '') ?? []) {
      if (found.has(edge.cable.id)) continue;
      found.add(edge.cable.id);
      if (recordOf(doc, other, 'junction')?.style === 'splice') waiting.push(other);
    }
  }
  return found;
}

type Neighbours = Map<string, { readonly edge: Edge; readonly other: string }[]>;

function neighbours(edges: readonly Edge[]): Neighbours {
  const at: Neighbours = new Map();
  const add = (node: string, edge: Edge, other: string) => {
    const list = at.get(node);
    if (list) list.push({ edge, other });
    else at.set(node, [{ edge, other }]);
  };
  for (const edge of edges) {
    add(edge.a, edge, edge.b);
    if (edge.a !== edge.b) add(edge.b, edge, edge.a);
  }
  return at;
}

/**
 * Follows the cable outwards from the sources. A stretch of cable that only hangs on at one point (a single
 * cable, or all of a loop: a block of the graph, after Hopcroft and Tarjan, 1973) is part of a group when all
 * that is beyond that point is of the group.
 * @returns the group by cable; cable that no source reaches is left out
 */
function groupByBlock(
  edges: readonly Edge[],
  groupAt: (node: string) => string | null,
): Map<string, string | null> {
  const at = neighbours(edges);
  const result = new Map<string, string | null>();
  const order = new Map<string, number>();
  const low = new Map<string, number>();
  /** Groups at a node and beyond it. */
  const beyond = new Map<string, Set<string>>();
  const open: Edge[] = [];
  const seen = new Set<string>();
  interface Visit {
    readonly node: string;
    readonly via: Edge | null;
    readonly parent: string | null;
    next: number;
    /** How many edges were open before the one that led here. */
    readonly mark: number;
  }
  const enter = (node: string, via: Edge | null, parent: string | null, mark: number): Visit => {
    order.set(node, order.size);
    low.set(node, order.get(node) ?? 0);
    const group = groupAt(node);
    beyond.set(node, new Set(group === null ? [] : [group]));
    return { node, via, parent, next: 0, mark };
  };
  if (!at.has(SOURCE)) return result;
  const stack: Visit[] = [enter(SOURCE, null, null, 0)];
  for (let visit = stack.at(-1); visit; visit = stack.at(-1)) {
    const step = at.get(visit.node)?.[visit.next];
    if (step) {
      visit.next += 1;
      if (seen.has(step.edge.cable.id)) continue;
      seen.add(step.edge.cable.id);
      const mark = open.length;
      open.push(step.edge);
      const before = order.get(step.other);
      if (before === undefined) stack.push(enter(step.other, step.edge, visit.node, mark));
      else low.set(visit.node, Math.min(low.get(visit.node) ?? 0, before));
      continue;
    }
    stack.pop();
    if (visit.parent === null) continue;
    const { node, parent, mark } = visit;
    low.set(parent, Math.min(low.get(parent) ?? 0, low.get(node) ?? 0));
    const groups = beyond.get(node) ?? new Set();
    // Nothing beyond reaches back past the parent: what is open since then is a block that hangs on it.
    if ((low.get(node) ?? 0) >= (order.get(parent) ?? 0)) {
      const [only] = groups;
      const group = groups.size === 1 && only !== undefined && only !== BASE ? only : null;
      for (const edge of open.splice(mark)) result.set(edge.cable.id, group);
    }
    const above = beyond.get(parent);
    for (const group of groups) above?.add(group);
  }
  return result;
}
