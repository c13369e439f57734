import type { FixtureKind } from '@lampwright/geometry/catalogue';
import { itemOf, labelOf, type PlanDocument, recordOf, recordsOf } from '@lampwright/geometry/plan';
import { scheduleOf } from '@lampwright/geometry/price';

/** A fixture of the plan as it is put into a group. */
export interface PlanFixture {
  readonly id: string;
  readonly tag: string;
  readonly name: string;
  readonly kind: FixtureKind | null;
  readonly quantity: number;
  /** The run that feeds it; null while none does. */
  readonly run: { readonly id: string; readonly label: string } | null;
}

/** Every fixture with the run whose cable ends at it, in the order of the schedule. */
export function fixturesOf(doc: PlanDocument): PlanFixture[] {
  const runs = new Map<string, string>();
  for (const cable of recordsOf(doc, 'cable'))
    if (cable.runId !== null)
      for (const end of [cable.fromId, cable.toId]) if (!runs.has(end)) runs.set(end, cable.runId);
  return scheduleOf(doc).map(({ recordId, tag, fixture, kind, quantity }) => {
    const run = recordOf(doc, runs.get(recordId) ?? null, 'run');
    return {
      id: recordId,
      tag,
      name: fixture,
      kind,
      quantity,
      run: run ? { id: run.id, label: `Run ${run.number}${run.name ? `, ${run.name}` : ''}` } : null,
    };
  });
}

export interface PlanTransformer {
  readonly id: string;
  readonly label: string;
  readonly item: string;
}

export function transformersOf(doc: PlanDocument): PlanTransformer[] {
  return [...recordsOf(doc, 'transformer')]
    .sort((a, b) => a.number - b.number)
    .map((record) => ({
      id: record.id,
      label: labelOf(record, doc),
      item: itemOf(doc, record.itemId, 'transformer')?.name ?? '',
    }));
}
