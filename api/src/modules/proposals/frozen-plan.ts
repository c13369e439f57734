import { type PlanDocument, type PlanRecord, planOf, readRecord } from '@lampwright/geometry/plan';
import type { RevisionDocument } from './revision-document.js';

type FrozenPlan = Pick<RevisionDocument, 'plan'>;

/** Documents from before there was a second form do not say which one theirs is. */
const FIRST_FORM = 1;

/**
 * The plan as it was frozen, in today's form.
 * @throws PlanFormError for a record that can't be read
 */
export const frozenPlan = ({ plan }: FrozenPlan): PlanDocument =>
  planOf(plan.records.map((record) => readRecord(plan.schema ?? FIRST_FORM, record)));

/**
 * One record of it; null where there is none.
 * @throws PlanFormError where it can't be read
 */
export function frozenRecord({ plan }: FrozenPlan, id: string): PlanRecord | null {
  const record = plan.records.find((one) => one.id === id);
  return record ? readRecord(plan.schema ?? FIRST_FORM, record) : null;
}
