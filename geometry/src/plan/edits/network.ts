import { recordsOf, sourceTransformerId } from '../build.js';
import type { CableRecord, PlanDocument, RunRecord } from '../records.js';
import type { Draft } from './draft.js';

/** Cable ends at a transformer or feed: where a network is fed. */
export interface Attachment {
  readonly cableId: string;
  readonly transformerId: string;
  readonly runId: string | null;
}

/**
 * Cable that hangs together. Transformers and feeds do not connect what leaves them: each cable there has
 * terminals of its own.
 */
export interface Network {
  /** Fixtures and junctions. */
  readonly nodes: string[];
  readonly cables: CableRecord[];
  readonly attachments: Attachment[];
}

/** Cables by each node that they end at, transformers and feeds included. */
export function cablesByNode(doc: PlanDocument): Map<string, CableRecord[]> {
  const byNode = new Map<string, CableRecord[]>();
  for (const cable of recordsOf(doc, 'cable'))
    for (const end of [cable.fromId, cable.toId]) {
      const list = byNode.get(end);
      if (list) list.push(cable);
      else byNode.set(end, [cable]);
    }
  return byNode;
}

/** The networks of a plan, in the order of their first cable. */
export function networks(doc: PlanDocument): Network[] {
  const byNode = cablesByNode(doc);
  const seen = new Set<string>();
  const found: Network[] = [];
  for (const cable of recordsOf(doc, 'cable'))
    if (!seen.has(cable.id)) found.push(collect(doc, byNode, cable, seen));
  return found;
}

/** The network that a fixture or junction is part of: itself alone when no cable reaches it. */
export function networkAt(doc: PlanDocument, nodeId: string): Network {
  const byNode = cablesByNode(doc);
  const first = byNode.get(nodeId)?.[0];
  if (!first) return { nodes: [nodeId], cables: [], attachments: [] };
  return collect(doc, byNode, first, new Set());
}

function collect(
  doc: PlanDocument,
  byNode: ReadonlyMap<string, CableRecord[]>,
  start: CableRecord,
  seen: Set<string>,
): Network {
  const network = {
    nodes: [] as string[],
    cables: [] as CableRecord[],
    attachments: [] as Attachment[],
  };
  const visited = new Set<string>();
  const stack = [start];
  seen.add(start.id);
  for (let cable = stack.pop(); cable !== undefined; cable = stack.pop()) {
    network.cables.push(cable);
    for (const end of [cable.fromId, cable.toId]) {
      const transformerId = sourceTransformerId(doc.get(end));
      if (transformerId !== null) {
        network.attachments.push({ cableId: cable.id, transformerId, runId: cable.runId });
        continue;
      }
      if (visited.has(end)) continue;
      visited.add(end);
      network.nodes.push(end);
      for (const next of byNode.get(end) ?? [])
        if (!seen.has(next.id)) {
          seen.add(next.id);
          stack.push(next);
        }
    }
  }
  return network;
}

/** The runs that feed a network: those of its attached cables that exist and start at that transformer. */
export function feedingRuns(doc: PlanDocument, network: Network): RunRecord[] {
  const runs = new Map<string, RunRecord>();
  for (const { runId, transformerId } of network.attachments) {
    const run = runId === null ? undefined : doc.get(runId);
    if (run?.kind === 'run' && run.transformerId === transformerId) runs.set(run.id, run);
  }
  return [...runs.values()].sort((a, b) => a.number - b.number || (a.id < b.id ? -1 : 1));
}

/**
 * Gives every cable the run that feeds its network, or none, and removes runs that have lost their last
 * cable in this operation. A network fed by several runs (two people joined them at the same time) keeps
 * each cable's run where it is one of them; the plan's faults tell about it.
 */
export function assignRuns(draft: Draft): void {
  const used = new Set<string>();
  for (const network of networks(draft.plan)) {
    const runs = feedingRuns(draft.plan, network);
    const ids = new Set(runs.map((run) => run.id));
    for (const cable of network.cables) {
      const keep = cable.runId !== null && ids.has(cable.runId);
      const runId = keep ? cable.runId : (runs[0]?.id ?? null);
      if (runId !== null) used.add(runId);
      if (runId !== cable.runId) draft.put({ ...cable, runId });
    }
  }
  const hadCable = new Set<string>();
  for (const cable of recordsOf(draft.before, 'cable')) if (cable.runId !== null) hadCable.add(cable.runId);
  for (const run of [...recordsOf(draft.plan, 'run')])
    if (!used.has(run.id) && hadCable.has(run.id)) draft.remove(run.id);
}
