import { toNestErrors } from '@hookform/resolvers';
import {
  type CatalogueCategory,
  type CatalogueItem,
  catalogueItemSchema,
} from '@lampwright/geometry/catalogue';
import type { FieldError, Resolver } from 'react-hook-form';
import { sentenceFor } from '../../lib/zod-sentences';
import { type Draft, fieldOf } from './draft';
import { itemOf } from './item-of';

export type Checked =
  | { readonly ok: true; readonly item: CatalogueItem }
  | { readonly ok: false; readonly faults: ReadonlyMap<string, string> };

/** For a number that is missing or unreadable; the schema's own words speak of what programs send. */
function numberFault(draft: Draft, field: string): string | null {
  const value = field
    .split('.')
    .reduce<unknown>(
      (at, key) => (typeof at === 'object' && at !== null ? Reflect.get(at, key) : undefined),
      draft,
    );
  if (value === null) return 'Please fill in a number.';
  return Number.isNaN(value) ? 'Please write a number, such as 12 or 12.5.' : null;
}

/** Checks a form against the catalogue's own schema; faults by the form's field. */
export function check(draft: Draft, category: CatalogueCategory): Checked {
  const parsed = catalogueItemSchema.safeParse(itemOf(draft, category), { error: sentenceFor });
  if (parsed.success) return { ok: true, item: parsed.data };
  const faults = new Map<string, string>();
  for (const issue of parsed.error.issues) {
    const field = fieldOf(issue.path.join('.'), category);
    if (!faults.has(field)) faults.set(field, numberFault(draft, field) ?? issue.message);
  }
  return { ok: false, faults };
}

export const resolverFor =
  (category: CatalogueCategory): Resolver<Draft, unknown, CatalogueItem> =>
  (draft, _context, options) => {
    const checked = check(draft, category);
    if (checked.ok) return { values: checked.item, errors: {} };
    const flat: Record<string, FieldError> = {};
    for (const [field, message] of checked.faults) flat[field] = { type: 'catalogue', message };
    return { values: {}, errors: toNestErrors(flat, options) };
  };
