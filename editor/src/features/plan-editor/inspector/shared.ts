import type { PlanRecord, RecordKind, RecordOf } from '@lampwright/geometry/plan';
import { isKind } from '@lampwright/geometry/plan';

/** The value that all share; undefined where they differ. */
export function common<T, V>(list: readonly T[], of: (x: T) => V): V | undefined {
  const first = list[0];
  if (first === undefined) return undefined;
  const value = of(first);
  return list.every((x) => of(x) === value) ? value : undefined;
}

export function ofKind<K extends RecordKind>(records: readonly PlanRecord[], kind: K): RecordOf<K>[] {
  return records.filter((r): r is RecordOf<K> => isKind(r, kind));
}

export const idsOf = (records: readonly { readonly id: string }[]): string[] => records.map((r) => r.id);

/** Nothing that is marked on a plan is higher. */
const HIGHEST_METERS = 100;

/** Why a height can't be taken, or null. */
export function tooHigh(meters: number): string | null {
  return meters > HIGHEST_METERS ? `A height of at most ${HIGHEST_METERS} m.` : null;
}
