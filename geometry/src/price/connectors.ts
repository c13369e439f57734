import type { CatalogueItem, Conductor, ConnectorItem } from '../catalogue/index.js';
import { type CableRecord, type FixtureRecord, itemOf, type PlanDocument, recordsOf } from '../plan/index.js';

/** A place where conductors are joined: at a fixture (its lead included), or a buried splice. */
export interface Splice {
  readonly nodeId: string;
  /** Conductors that meet in one connector. */
  readonly conductors: number;
  /** Cross-sections of the thinnest and the thickest of them. */
  readonly thinnestMm2: number;
  readonly thickestMm2: number;
  /** Cables that end there. */
  readonly cables: readonly CableRecord[];
}

/** Two-wire cable is joined twice at each splice: once for each of its conductors. */
export const CONNECTORS_PER_SPLICE = 2;

/** Cross-section by gauge: 0.127 mm × 92^((36 − n) ⁄ 39) in diameter (ASTM B258). */
function mm2OfAwg(awg: number): number {
  return (Math.PI / 4) * (0.127 * 92 ** ((36 - awg) / 39)) ** 2;
}

/** Ohms per kilometre of a square millimetre of annealed copper at 20 °C (IEC 60028). */
const COPPER_OHMS = 17.241;

export function mm2Of(conductor: Conductor): number {
  if ('awg' in conductor) return mm2OfAwg(conductor.awg);
  if ('mm2' in conductor) return conductor.mm2;
  return COPPER_OHMS / conductor.ohmsPerKm;
}

/** Every splice of the plan. Hubs have terminals of their own, and a fixture without cable has none. */
export function splicesOf(doc: PlanDocument): Splice[] {
  const cablesAt = new Map<string, CableRecord[]>();
  for (const cable of recordsOf(doc, 'cable'))
    for (const end of [cable.fromId, cable.toId]) {
      const list = cablesAt.get(end);
      if (list) list.push(cable);
      else cablesAt.set(end, [cable]);
    }
  const splices: Splice[] = [];
  for (const [nodeId, cables] of cablesAt) {
    const node = doc.get(nodeId);
    if (node?.kind === 'fixture') splices.push(spliceOf(doc, nodeId, cables, leadsOf(doc, node)));
    else if (node?.kind === 'junction' && node.style === 'splice')
      splices.push(spliceOf(doc, nodeId, cables, []));
  }
  return splices;
}

function leadsOf(doc: PlanDocument, fixture: FixtureRecord): number[] {
  const lead = fixture.lead ?? itemOf(doc, fixture.itemId, 'fixture')?.lead;
  return lead ? Array.from({ length: fixture.quantity }, () => mm2Of(lead.conductor)) : [];
}

function spliceOf(
  doc: PlanDocument,
  nodeId: string,
  cables: readonly CableRecord[],
  leads: readonly number[],
): Splice {
  const areas = [...leads];
  for (const cable of cables) {
    const item = itemOf(doc, cable.itemId, 'cable');
    if (item) areas.push(mm2Of(item.conductor));
  }
  return {
    nodeId,
    conductors: cables.length + leads.length,
    thinnestMm2: Math.min(...areas),
    thickestMm2: Math.max(...areas),
    cables,
  };
}

/** Rounding of tables must not rule a connector out: gauges lie a quarter apart. */
const TOLERANCE = 1.03;

/** The smallest connector that takes the splice: by how many conductors it holds, then by its thickest. */
export function connectorFor(
  splice: Splice,
  catalogue: ReadonlyMap<string, CatalogueItem>,
): { readonly id: string; readonly item: ConnectorItem } | null {
  let best: { id: string; item: ConnectorItem } | null = null;
  // A cable that ends blind is capped with the least that a connector takes.
  const conductors = Math.max(splice.conductors, 2);
  for (const [id, item] of catalogue) {
    if (item.category !== 'connector' || !item.directBurial) continue;
    const fits =
      conductors >= item.minConductors &&
      conductors <= item.maxConductors &&
      splice.thickestMm2 <= mm2OfAwg(item.largestAwg) * TOLERANCE &&
      splice.thinnestMm2 * TOLERANCE >= mm2OfAwg(item.smallestAwg);
    if (!fits) continue;
    const smaller =
      best === null ||
      item.maxConductors < best.item.maxConductors ||
      (item.maxConductors === best.item.maxConductors && item.largestAwg > best.item.largestAwg);
    if (smaller) best = { id, item };
  }
  return best;
}
