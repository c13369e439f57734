import type { CatalogueItem } from '../../catalogue/index.js';
import { findItemCopy } from '../build.js';
import { sameData } from '../equal.js';
import type { Draft } from './draft.js';

/** A catalogue item to be used on a plan: a copy that the plan has already, or the entry to copy. */
export type ItemChoice =
  | { readonly itemId: string }
  | { readonly sourceId: string | null; readonly item: CatalogueItem };

/** The id of the plan's own copy of the item; an equal copy of the same entry is used again. */
export function ensureItem(draft: Draft, choice: ItemChoice): string {
  if ('itemId' in choice) return choice.itemId;
  const { sourceId, item } = choice;
  const copy = findItemCopy(
    draft.plan,
    (record) => record.sourceId === sourceId && sameData(record.item, item),
  );
  return (copy ?? draft.put({ kind: 'item', id: draft.ids(), sourceId, item })).id;
}
