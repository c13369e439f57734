import { type Change, PlanFormError, readChange } from '@lampwright/geometry/plan';
import { AppError, badInput, type FieldFault } from '../../http/app-error.js';
import { jsonPointer } from '../../http/pointer.js';

const MOST_FAULTS_LISTED = 200;

/**
 * The changes of a request in today's form.
 * @throws AppError 400 naming every fault by its pointer, or saying that the plan's form is newer
 */
export function readChanges(inputs: readonly unknown[]): Change[] {
  const faults: FieldFault[] = [];
  const changes = inputs.flatMap((input, i) => {
    const at = (path: readonly PropertyKey[]) => jsonPointer(['changes', i, ...path]);
    try {
      const change = readChange(input);
      const path = unstorable(change, []);
      if (path) faults.push({ pointer: at(path), detail: 'This text holds a character that can’t be kept.' });
      return [change];
    } catch (error) {
      if (!(error instanceof PlanFormError)) throw error;
      if (error.code !== 'plan-change-invalid') throw new AppError(400, error.code, error.message);
      for (const issue of error.issues) faults.push({ pointer: at(issue.path), detail: issue.message });
      return [];
    }
  });
  const ids = new Set<string>();
  changes.forEach(({ id }, i) => {
    if (ids.has(id))
      faults.push({ pointer: jsonPointer(['changes', i, 'id']), detail: `Change ${id} is here twice.` });
    ids.add(id);
  });
  if (faults.length > 0) throw badInput(faults.slice(0, MOST_FAULTS_LISTED));
  return changes;
}

/** A lone surrogate, or U+0000. */
const UNSTORABLE = /\p{Surrogate}|\0/u;

/** Where a text holds what the database's JSON can't: U+0000, or half of a surrogate pair. */
function unstorable(value: unknown, path: readonly PropertyKey[]): readonly PropertyKey[] | null {
  if (typeof value === 'string') return UNSTORABLE.test(value) ? path : null;
  if (typeof value !== 'object' || value === null) return null;
  for (const [key, inner] of Object.entries(value)) {
    const found = unstorable(inner, [...path, key]);
    if (found) return found;
  }
  return null;
}
