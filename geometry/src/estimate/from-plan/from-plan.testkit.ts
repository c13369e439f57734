import {
  apply,
  drawCable,
  type EditResult,
  type PlanDocument,
  placeFixture,
  placeTransformer,
  recordOf,
} from '../../plan/index.js';
import {
  cable12,
  choice,
  countedIds,
  halogenLamp,
  must,
  pathLight,
  startPlan,
  transformer300,
  upLight,
} from '../../plan/plan.testkit.js';

/** A transformer at 0, 0, and two fixtures at 4 m and 7 m, chained, on a sheet of 100 px to the metre. */
export function chain() {
  const ids = countedIds();
  let doc: PlanDocument = startPlan();
  const make = (result: EditResult): string[] => {
    doc = apply(doc, must(result));
    return result.kind === 'change' ? result.selected : [];
  };
  const sheetId = 'sheet1';
  const [t = ''] = make(
    placeTransformer(doc, { sheetId, at: { x: 0, y: 0 }, transformer: choice(transformer300) }, ids),
  );
  const [f1 = ''] = make(
    placeFixture(
      doc,
      { sheetId, at: { x: 400, y: 0 }, fixture: choice(pathLight), lamp: null, quantity: 2 },
      ids,
    ),
  );
  const [f2 = ''] = make(
    placeFixture(
      doc,
      { sheetId, at: { x: 700, y: 0 }, fixture: choice(upLight), lamp: choice(halogenLamp) },
      ids,
    ),
  );
  const stops = [t, f1, f2].map((id) => ({ on: 'record' as const, id }));
  const [k1 = '', k2 = ''] = make(drawCable(doc, { sheetId, stops, cable: choice(cable12) }, ids));
  const runId = recordOf(doc, k1, 'cable')?.runId ?? '';
  return { doc: () => doc, make, ids, t, f1, f2, k1, k2, runId };
}
