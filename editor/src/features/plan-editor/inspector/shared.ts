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
