import { sameData } from '@lampwright/geometry/plan';
import {
  type Group,
  type JobPricing,
  type LineOverride,
  MAX_GROUPS,
  type ManualLine,
} from '@lampwright/geometry/price';

/** One thing that two people changed differently since both last saw the same. */
export type ClashPart =
  | { readonly part: 'group'; readonly id: string }
  | { readonly part: 'manual-line'; readonly id: string }
  | { readonly part: 'override'; readonly id: string }
  | { readonly part: 'member'; readonly id: string }
  | { readonly part: 'control'; readonly id: string }
  | { readonly part: 'tax' | 'tax-exempt' | 'discount' | 'visits' | 'stages'; readonly id: '' };

export const clashKey = ({ part, id }: ClashPart): string => `${part} ${id}`;

export type Side = 'mine' | 'theirs';

export interface Rebased {
  readonly pricing: JobPricing;
  /** Where both changed the same; `pricing` has the side that `choose` said. */
  readonly clashes: readonly ClashPart[];
  /** Sentences about what could not be kept because of what it stood on. */
  readonly notes: readonly string[];
}

interface Merged<T> {
  readonly value: T;
  readonly clashed: boolean;
}

const isFields = (value: unknown): value is Record<string, unknown> =>
  typeof value === 'object' && value !== null && !Array.isArray(value);

/** What both sides make of one value. Only plain fields are taken apart: a list is one value. */
function merge<T>(base: T, mine: T, theirs: T, side: Side, deep: boolean): Merged<T> {
  if (sameData(mine, base)) return { value: theirs, clashed: false };
  if (sameData(theirs, base) || sameData(mine, theirs)) return { value: mine, clashed: false };
  if (!deep || !isFields(base) || !isFields(mine) || !isFields(theirs))
    return { value: side === 'mine' ? mine : theirs, clashed: true };
  let clashed = false;
  const value: Record<string, unknown> = {};
  for (const key of new Set([...Object.keys(mine), ...Object.keys(theirs)])) {
    const field = merge(base[key], mine[key], theirs[key], side, false);
    clashed ||= field.clashed;
    value[key] = field.value;
  }
  return { value: value as T, clashed };
}

/**
 * My changes since `base`, made again on top of theirs: whatever only one side changed is kept, an override's
 * quantity beside another's price too. Costs time in the number of entries of the three.
 * @param choose which side a thing takes that both changed
 */
export function rebase(
  base: JobPricing,
  mine: JobPricing,
  theirs: JobPricing,
  choose: (part: ClashPart) => Side = () => 'theirs',
): Rebased {
  const clashes: ClashPart[] = [];
  const notes: string[] = [];

  function one<T>(part: ClashPart, b: T, m: T, t: T, deep = false): T {
    const merged = merge(b, m, t, choose(part), deep);
    if (merged.clashed) clashes.push(part);
    return merged.value;
  }

  function byKey<T>(
    part: (id: string) => ClashPart,
    b: Readonly<Record<string, T>>,
    m: Readonly<Record<string, T>>,
    t: Readonly<Record<string, T>>,
  ): Record<string, T> {
    const at = (o: Readonly<Record<string, T>>, id: string) => (Object.hasOwn(o, id) ? o[id] : undefined);
    const result: Record<string, T> = {};
    // Theirs first: what I added comes after, in my order.
    for (const id of new Set([...Object.keys(t), ...Object.keys(m)])) {
      const value = one(part(id), at(b, id), at(m, id), at(t, id), true);
      if (value !== undefined) result[id] = value;
    }
    return result;
  }

  const byId = <T extends { readonly id: string }>(list: readonly T[]): Record<string, T> =>
    Object.fromEntries(list.map((entry) => [entry.id, entry]));

  const groups: Group[] = Object.values(
    byKey<Group>((id) => ({ part: 'group', id }), byId(base.groups), byId(mine.groups), byId(theirs.groups)),
  );
  const manualLines: ManualLine[] = Object.values(
    byKey<ManualLine>(
      (id) => ({ part: 'manual-line', id }),
      byId(base.manualLines),
      byId(mine.manualLines),
      byId(theirs.manualLines),
    ),
  );
  const members = byKey<string>((id) => ({ part: 'member', id }), base.members, mine.members, theirs.members);

  for (const group of groups.splice(MAX_GROUPS))
    notes.push(
      `“${group.name}” could not be added: there are ${MAX_GROUPS} groups already, which is the most.`,
    );
  const known = new Set(groups.map(({ id }) => id));
  const homeless = Object.keys(members).filter((id) => !known.has(members[id] ?? ''));
  for (const id of homeless) delete members[id];
  // Whoever removed a group knew of the lights that were in it then; those put in since are told.
  const lost = homeless.filter((id) => !sameData(mine.members[id], theirs.members[id])).length;
  if (lost > 0)
    notes.push(
      lost === 1
        ? 'One light is in the base again: its group was removed.'
        : `${lost} lights are in the base again: their group was removed.`,
    );

  return {
    pricing: {
      groups,
      members,
      taxId: one({ part: 'tax', id: '' }, base.taxId, mine.taxId, theirs.taxId),
      taxExempt: one({ part: 'tax-exempt', id: '' }, base.taxExempt, mine.taxExempt, theirs.taxExempt),
      discount: one({ part: 'discount', id: '' }, base.discount, mine.discount, theirs.discount),
      manualLines: manualLines.map((line) =>
        line.groupId !== null && !known.has(line.groupId) ? { ...line, groupId: null } : line,
      ),
      overrides: byKey<LineOverride>(
        (id) => ({ part: 'override', id }),
        base.overrides,
        mine.overrides,
        theirs.overrides,
      ),
      controls: byKey<string | null>(
        (id) => ({ part: 'control', id }),
        base.controls,
        mine.controls,
        theirs.controls,
      ),
      aimingVisits: one(
        { part: 'visits', id: '' },
        base.aimingVisits,
        mine.aimingVisits,
        theirs.aimingVisits,
      ),
      stages: one({ part: 'stages', id: '' }, base.stages, mine.stages, theirs.stages),
    },
    clashes,
    notes,
  };
}
