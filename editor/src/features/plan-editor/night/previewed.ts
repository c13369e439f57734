import { apply, moveRecords, type PlanDocument, recordOf } from '@lampwright/geometry/plan';
import { withProposed } from '../placing/place-lights';
import type { Preview } from '../tools/tool';

/** The plan as it will be if the hand lets go now; the plan itself where that changes no light. */
export function previewed(doc: PlanDocument, preview: Preview | null): PlanDocument {
  switch (preview?.kind) {
    case 'move': {
      const result = moveRecords(doc, preview.ids, preview.dx, preview.dy);
      return result.kind === 'change' ? apply(doc, result.change) : doc;
    }
    case 'aim': {
      const next = new Map(doc);
      for (const [id, aim] of preview.aims) {
        const fixture = recordOf(doc, id, 'fixture');
        if (fixture !== undefined) next.set(id, { ...fixture, aim });
      }
      return next;
    }
    case 'proposed':
      return withProposed(doc, preview);
    default:
      return doc;
  }
}
