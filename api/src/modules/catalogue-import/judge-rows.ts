import type { CatalogueItem } from '@lampwright/geometry/catalogue';
import { sameData } from '@lampwright/geometry/plan';
import type { ItemPrice } from '@lampwright/geometry/price';
import type { UnitSystem } from '@lampwright/geometry/units';
import {
  type FieldName,
  type FlatItem,
  fieldNames,
  isMoneyField,
  tableFields,
} from '../catalogue/table/fields.js';
import { flatOfItem, itemOfFlat } from '../catalogue/table/flat-item.js';
import { flatOfPrice, type MoneyManner, priceOfFlat } from '../catalogue/table/flat-price.js';
import type { Import, ImportRow } from './catalogue-import.dto.js';

export interface PresentItem {
  readonly id: string;
  readonly item: CatalogueItem;
  readonly price: ItemPrice | null;
}

/** What taking a row comes to. */
export interface JudgedRow {
  readonly told: ImportRow;
  /** Null where nothing is to be done. */
  readonly act: {
    readonly itemId: string | null;
    readonly item: CatalogueItem;
    readonly price: ItemPrice | null;
  } | null;
}

export interface ImportManner extends MoneyManner {
  readonly system: UnitSystem;
  /** Columns of money count. */
  readonly prices: boolean;
}

/** Judges every row against the catalogue as it is: what it would add, change or fail at. */
export function judgeRows(input: Import, present: readonly PresentItem[], manner: ImportManner): JudgedRow[] {
  const find = finder(present);
  const leftOut = new Set(input.leftOut);
  const metBefore = new Map<string, number>();
  return input.rows.map((cells, row): JudgedRow => {
    const flat = flatOfRow(cells, input, manner.prices);
    const plain = { row, name: flat.name ?? '', itemId: null, changes: [], faults: [] };
    if (leftOut.has(row)) return { told: { ...plain, action: 'left-out' }, act: null };
    const fails = (
      faults: readonly { field: FieldName | null; detail: string }[],
      itemId: string | null,
    ) => ({
      told: {
        ...plain,
        itemId,
        action: 'fault' as const,
        faults: faults.map(({ field, detail }) => ({
          column: field === null ? null : (input.mapping[field] ?? null),
          detail: field === null ? detail : `${tableFields[field].header}: ${detail}`,
        })),
      },
      act: null,
    });
    const found = find(flat);
    if (found === 'several')
      return fails(
        [{ field: 'name', detail: 'Several items have this name; say the category or the entry.' }],
        null,
      );
    if (found === null && flat.id)
      return fails([{ field: 'id', detail: 'The catalogue has no such entry.' }], null);
    const name = found ? `${found.item.category} ${found.item.name}` : `${flat.category} ${flat.name}`;
    const key = found?.id ?? name.toLowerCase();
    const before = metBefore.get(key);
    if (before !== undefined)
      return fails([{ field: null, detail: `Row ${before + 1} is about the same item.` }], found?.id ?? null);
    metBefore.set(key, row);
    return judge(flat, found, fails, plain, manner);
  });
}

function judge(
  flat: FlatItem,
  found: PresentItem | null,
  fails: (faults: readonly { field: FieldName | null; detail: string }[], itemId: string | null) => JudgedRow,
  plain: Pick<ImportRow, 'row' | 'name' | 'changes' | 'faults'>,
  manner: ImportManner,
): JudgedRow {
  const was: FlatItem = found
    ? { ...flatOfItem(found.item), ...(found.price ? flatOfPrice(found.price, manner) : {}) }
    : {};
  // Another category makes it another item: what it was says nothing about it.
  const merged = { ...was, ...flat };
  const read = itemOfFlat(merged, manner.system);
  const unit = merged.category === 'cable' ? (manner.system === 'imperial' ? 'foot' : 'meter') : 'each';
  const money = manner.prices
    ? priceOfFlat(merged, manner, { unit })
    : { ok: true as const, price: found?.price ?? null };
  const faults = [...(read.ok ? [] : read.faults), ...(money.ok ? [] : money.faults)];
  if (!read.ok || !money.ok) return fails(faults, found?.id ?? null);
  const price = manner.prices && !sameData(money.price, found?.price ?? null) ? money.price : null;
  const now: FlatItem = {
    ...flatOfItem(read.item),
    ...(money.price ? flatOfPrice(money.price, manner) : {}),
  };
  const changes = fieldNames.flatMap((field) => {
    const [before, after] = [was[field] ?? '', now[field] ?? ''];
    const hidden = !manner.prices && isMoneyField(field);
    return before === after || hidden ? [] : [{ field: tableFields[field].header, was: before, now: after }];
  });
  const told = { ...plain, name: read.item.name, itemId: found?.id ?? null };
  if (found && price === null && sameData(read.item, found.item))
    return { told: { ...told, action: 'same' }, act: null };
  return {
    told: { ...told, action: found ? 'change' : 'add', changes: found ? changes : [] },
    act: { itemId: found?.id ?? null, item: read.item, price },
  };
}

/** The texts that a row says; empty cells say nothing. */
function flatOfRow(cells: readonly string[], { mapping, category }: Import, prices: boolean): FlatItem {
  const flat: FlatItem = {};
  for (const name of fieldNames) {
    const column = mapping[name];
    if (column === null || column === undefined || (!prices && isMoneyField(name))) continue;
    const text = cells[column]?.trim() ?? '';
    if (text !== '') flat[name] = text;
  }
  if (flat.category === undefined && category !== null) flat.category = category;
  return flat;
}

/** Finds the item that a row is about: by entry, by order number, by category and name, or by name alone. */
function finder(present: readonly PresentItem[]): (flat: FlatItem) => PresentItem | null | 'several' {
  const byId = new Map(present.map((entry) => [entry.id, entry]));
  const byOrder = grouped(present, ({ price }) => price?.orderNumber.toLowerCase() ?? '');
  const byName = grouped(present, ({ item }) => item.name.toLowerCase());
  return (flat) => {
    if (flat.id) return byId.get(flat.id) ?? null;
    const ordered = flat.orderNumber ? (byOrder.get(flat.orderNumber.toLowerCase()) ?? []) : [];
    if (ordered.length === 1) return ordered[0] ?? null;
    const named = (byName.get(flat.name?.toLowerCase() ?? '') ?? []).filter(
      ({ item }) => flat.category === undefined || sameCategory(item.category, flat.category),
    );
    return named.length > 1 ? 'several' : (named[0] ?? null);
  };
}

const sameCategory = (category: string, text: string): boolean =>
  [category, `${category}s`].includes(text.toLowerCase());

function grouped(
  present: readonly PresentItem[],
  keyOf: (entry: PresentItem) => string,
): Map<string, PresentItem[]> {
  const groups = new Map<string, PresentItem[]>();
  for (const entry of present) {
    const key = keyOf(entry);
    if (key !== '') groups.set(key, [...(groups.get(key) ?? []), entry]);
  }
  return groups;
}
