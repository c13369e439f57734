import { fixtureInitial } from '@lampwright/geometry/catalogue';
import { onSheet, type Proposal } from '@lampwright/geometry/light';
import {
  apply,
  type Change,
  compose,
  type EditResult,
  type IdSource,
  newId,
  type PlanDocument,
  placeFixture,
} from '@lampwright/geometry/plan';
import type { SolvedScale } from '@lampwright/geometry/sheet';
import { meters } from '@lampwright/geometry/units';
import { drawnAim } from '../tools/light-pose';
import type { LightsToPlace, ProposedPreview } from '../tools/proposed';

/** A proposal on its sheet, without those of its lights that the sheet doesn't show. */
export function lightsOn(sheetId: string, scale: SolvedScale, proposal: Proposal): LightsToPlace {
  const { fixture, lamp } = proposal;
  const sheetFromGround = ({ x, y }: { x: number; y: number }) =>
    scale.sheetFromGround({ x: meters(x), y: meters(y) });
  const lights = proposal.lights.flatMap((light) => onSheet(light, sheetFromGround) ?? []);
  return { sheetId, fixture, lamp, lights };
}

/** Places all of them in one change, and selects them. */
export function placeLights(
  doc: PlanDocument,
  { sheetId, fixture, lamp, lights }: LightsToPlace,
  ids: IdSource = newId,
): EditResult {
  let now = doc;
  let change: Change | null = null;
  const selected: string[] = [];
  for (const light of lights) {
    const result = placeFixture(now, { sheetId, fixture, lamp, ...light }, ids);
    if (result.kind !== 'change') return result;
    now = apply(now, result.change);
    change = change === null ? result.change : compose(change, result.change, change.id);
    selected.push(...result.selected);
  }
  if (change === null)
    return { kind: 'refused', code: 'missing-record', message: 'None of these lights is on this sheet.' };
  return { kind: 'change', change, selected, notes: [] };
}

/** Ids of what is not on the plan: the same for the same proposal. */
function proposedIds(): IdSource {
  let count = 0;
  return () => `proposed-${count++}`;
}

/** The plan with these lights on it, as if they were placed; the plan itself where they can't be. */
export function withProposed(doc: PlanDocument, lights: LightsToPlace): PlanDocument {
  const result = placeLights(doc, lights, proposedIds());
  return result.kind === 'change' ? apply(doc, result.change) : doc;
}

/** What is drawn of proposed lights: their marks, and where those point that are aimed at something. */
export function previewOf(
  doc: PlanDocument,
  scale: SolvedScale,
  proposal: Proposal,
  placing: LightsToPlace,
): ProposedPreview {
  const result = placeLights(doc, placing, proposedIds());
  const initial = fixtureInitial(proposal.fixture.item.kind);
  if (result.kind !== 'change') return { kind: 'proposed', ...placing, initial, aims: [] };
  const shown = apply(doc, result.change);
  const world = { doc: () => shown, sheetId: () => placing.sheetId, scale: () => scale };
  const aims = result.selected.flatMap((id, i) =>
    placing.lights[i]?.aim ? (drawnAim(world, id) ?? []) : [],
  );
  return { kind: 'proposed', ...placing, initial, aims };
}
