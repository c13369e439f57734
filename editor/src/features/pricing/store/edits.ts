import {
  type Group,
  type JobPricing,
  type LineOverride,
  MAX_GROUPS,
  type ManualLine,
} from '@lampwright/geometry/price';

/** Edits of a job's pricing: each takes the pricing as it is and gives it as it becomes. */
export type Edit = (pricing: JobPricing) => JobPricing;

export const addGroup =
  (group: Group): Edit =>
  (pricing) =>
    pricing.groups.length >= MAX_GROUPS ? pricing : { ...pricing, groups: [...pricing.groups, group] };

export const changeGroup =
  (id: string, change: Partial<Omit<Group, 'id'>>): Edit =>
  (pricing) => ({
    ...pricing,
    groups: pricing.groups.map((group) => (group.id === id ? { ...group, ...change } : group)),
  });

/** What was in the group is in the base afterwards. */
export const removeGroup =
  (id: string): Edit =>
  (pricing) => ({
    ...pricing,
    groups: pricing.groups.filter((group) => group.id !== id),
    members: Object.fromEntries(Object.entries(pricing.members).filter(([, group]) => group !== id)),
    manualLines: pricing.manualLines.map((line) => (line.groupId === id ? { ...line, groupId: null } : line)),
  });

/** Puts fixtures into a group; null: into the base. */
export const assign =
  (fixtureIds: Iterable<string>, groupId: string | null): Edit =>
  (pricing) => {
    const members = { ...pricing.members };
    for (const id of fixtureIds) {
      if (groupId === null) delete members[id];
      else members[id] = groupId;
    }
    return { ...pricing, members };
  };

/** Says something other than the plan about a line; null: what the plan says again. */
export const override =
  (lineKey: string, value: LineOverride | null): Edit =>
  (pricing) => {
    const overrides = { ...pricing.overrides };
    if (value === null) delete overrides[lineKey];
    else overrides[lineKey] = value;
    return { ...pricing, overrides };
  };

/** Adds a line, or puts it in the place of the one with its id. */
export const putManualLine =
  (line: ManualLine): Edit =>
  (pricing) => ({
    ...pricing,
    manualLines: pricing.manualLines.some(({ id }) => id === line.id)
      ? pricing.manualLines.map((other) => (other.id === line.id ? line : other))
      : [...pricing.manualLines, line],
  });

export const removeManualLine =
  (id: string): Edit =>
  (pricing) => ({ ...pricing, manualLines: pricing.manualLines.filter((line) => line.id !== id) });

export const setControl =
  (transformerId: string, itemId: string | null | undefined): Edit =>
  (pricing) => {
    const controls = { ...pricing.controls };
    if (itemId === undefined) delete controls[transformerId];
    else controls[transformerId] = itemId;
    return { ...pricing, controls };
  };

export const setTerms =
  (change: Partial<Pick<JobPricing, 'taxId' | 'taxExempt' | 'discount' | 'aimingVisits' | 'stages'>>): Edit =>
  (pricing) => ({ ...pricing, ...change });
