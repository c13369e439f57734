import { type ItemPrice, itemPriceSchema, moneyInput, parseMoney } from '@lampwright/geometry/price';
import { type CellFault, Cells } from './cells.js';
import type { FieldName, FlatItem } from './fields.js';
import { cellSentence } from './sentences.js';

export interface MoneyManner {
  readonly currency: string;
  readonly locale: string;
}

/** A price as texts by field. */
export function flatOfPrice(price: ItemPrice, { currency, locale }: MoneyManner): FlatItem {
  const money = (amount: number | null) => (amount === null ? '' : moneyInput(amount, currency, locale));
  return {
    cost: money(price.costMinor),
    price: money(price.priceMinor),
    per: String(price.per),
    unit: price.unit,
    increment: String(price.increment),
    taxable: price.taxable ? 'yes' : 'no',
    supplier: price.supplier,
    orderNumber: price.orderNumber,
  };
}

export type PriceRead =
  | { readonly ok: true; readonly price: ItemPrice | null }
  | { readonly ok: false; readonly faults: readonly CellFault[] };

const unitWords: Readonly<Record<string, ItemPrice['unit']>> = {
  each: 'each',
  ea: 'each',
  piece: 'each',
  pc: 'each',
  pcs: 'each',
  foot: 'foot',
  feet: 'foot',
  ft: 'foot',
  meter: 'meter',
  metre: 'meter',
  meters: 'meter',
  metres: 'meter',
  m: 'meter',
};

/** Reads a price; null where the row says nothing of money. */
export function priceOfFlat(
  flat: FlatItem,
  { currency, locale }: MoneyManner,
  otherwise: Pick<ItemPrice, 'unit'>,
): PriceRead {
  const cells = new Cells(flat, 'metric');
  const money = (field: FieldName): number | null | undefined => {
    const text = cells.text(field);
    if (text === null) return null;
    return (
      parseMoney(text, currency, locale) ??
      cells.fault(field, `“${text.slice(0, 40)}” is no amount of money.`)
    );
  };
  const costMinor = money('cost');
  const priceMinor = money('price');
  const unitText = cells.text('unit')?.toLowerCase();
  const unit = unitText === undefined ? otherwise.unit : unitWords[unitText];
  if (unit === undefined) cells.fault('unit', `“${unitText?.slice(0, 40)}” is none of each, foot, meter.`);
  const price = {
    costMinor,
    priceMinor,
    per: cells.number('per') ?? 1,
    unit,
    increment: cells.number('increment') ?? 1,
    taxable: cells.boolean('taxable', true),
    supplier: cells.text('supplier') ?? '',
    orderNumber: cells.text('orderNumber') ?? '',
  };
  if (cells.faults.length > 0) return { ok: false, faults: cells.faults };
  const silent =
    costMinor === null && priceMinor === null && price.supplier === '' && price.orderNumber === '';
  if (silent) return { ok: true, price: null };
  const parsed = itemPriceSchema.safeParse(price, { error: cellSentence });
  if (parsed.success) return { ok: true, price: parsed.data };
  return {
    ok: false,
    faults: parsed.error.issues.map(({ path, message }) => ({
      field: fieldOfKey[String(path[0])] ?? 'cost',
      detail: message,
    })),
  };
}

const fieldOfKey: Readonly<Record<string, FieldName>> = {
  costMinor: 'cost',
  priceMinor: 'price',
  per: 'per',
  increment: 'increment',
  supplier: 'supplier',
  orderNumber: 'orderNumber',
};
