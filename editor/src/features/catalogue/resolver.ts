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

/** Checks a form against the catalogue's own schema; faults by the form's field. */
export function check(draft: Draft, category: CatalogueCategory): Checked {
  const parsed = catalogueItemSchema.safeParse(itemOf(draft, category), { error: sentenceFor });
  if (parsed.success) return { ok: true, item: parsed.data };
  const faults = new Map<string, string>();
  for (const issue of parsed.error.issues) {
    const field = fieldOf(issue.path.join('.'), category);
    if (!faults.has(field)) faults.set(field, issue.message);
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
