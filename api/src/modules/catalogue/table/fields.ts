/** The columns that a table of catalogue items can have: their names in files, and what others call them. */
interface TableField {
  /** As the column is headed when the catalogue is written to a file. */
  readonly header: string;
  /** Other heads that are taken for it, in lower case. */
  readonly also: readonly string[];
  /** Of prices, which not everybody may see or change. */
  readonly money?: true;
}

const field = (header: string, also: readonly string[] = []): TableField => ({ header, also });
const money = (header: string, also: readonly string[] = []): TableField => ({ header, also, money: true });

export const tableFields = {
  id: field('Entry', ['id', 'entry id', 'catalogue id']),
  category: field('Category', ['type', 'item type', 'group']),
  name: field('Name', ['description', 'item', 'item name', 'product', 'title']),
  note: field('Note', ['notes', 'remarks', 'comment']),
  kind: field('Kind', ['fixture kind', 'control kind']),
  light: field('Light', ['light source']),
  base: field('Base', ['lamp base', 'socket']),
  maxWatts: field('Most watts of a lamp (W)', ['max watts', 'max wattage', 'maximum watts']),
  technology: field('Technology', ['lamp technology', 'source type']),
  loadKind: field('Load', ['load kind', 'load type']),
  watts: field('Watts (W)', ['watts', 'wattage', 'power', 'power (w)']),
  powerFactor: field('Power factor', ['pf']),
  driverVolts: field('Least volts of the driver (V)', ['min driver volts']),
  ratedVolts: field('Rated volts (V)', ['rated volts', 'rated voltage']),
  amps: field('Amps (A)', ['amps', 'current', 'current (a)']),
  minVolts: field('Rated from (V)', ['min volts', 'minimum volts', 'min voltage']),
  maxVolts: field('Rated to (V)', ['max volts', 'maximum volts', 'max voltage']),
  aimMin: field('Aim from (V)'),
  aimMax: field('Aim to (V)'),
  lumens: field('Lumens (lm)', ['lumens', 'lm', 'output', 'light output']),
  beam: field('Beam (°)', ['beam', 'beam angle', 'beam spread', 'beam degrees']),
  cct: field('Colour temperature (K)', ['cct', 'colour temperature', 'color temperature', 'kelvin']),
  peak: field('Peak (cd)', [
    'peak',
    'peak candela',
    'candela',
    'max candela',
    'center beam candlepower',
    'cbcp',
  ]),
  smart: field('Smart', ['smart lamp', 'switched by itself']),
  life: field('Life (h)', ['life', 'lamp life', 'life hours', 'rated life']),
  leadConductor: field('Lead', ['lead gauge', 'lead conductor']),
  leadLength: field('Lead length', ['length of lead']),
  height: field('Mounting height', ['height']),
  shield: field('Shield (%)', ['shield', 'shielding', 'held back (%)']),
  wetListed: field('Listed for water', ['wet listed', 'underwater']),
  conductor: field('Conductor', ['gauge', 'awg', 'cross-section', 'size', 'wire size']),
  ampacity: field('Ampacity (A)', ['ampacity', 'max amps']),
  directBurial: field('For burial', ['direct burial', 'burial']),
  ratedVA: field('Rated VA', ['va', 'rating', 'rated va (va)']),
  lineVolts: field('Line volts (V)', ['line volts', 'primary volts', 'input volts']),
  regulation: field('Regulation (%)', ['regulation']),
  ratedAt: field('Volts stated at', ['rated at']),
  supply: field('Supply', ['ac or dc', 'output type']),
  windings: field('Windings'),
  terminals: field('Terminals', ['taps']),
  ways: field('Ways', ['outlets', 'ports']),
  minConductors: field('Fewest conductors', ['min conductors']),
  maxConductors: field('Most conductors', ['max conductors']),
  largestAwg: field('Thickest gauge (AWG)', ['largest awg', 'max gauge']),
  smallestAwg: field('Thinnest gauge (AWG)', ['smallest awg', 'min gauge']),
  inrush: field('Inrush (A)', ['inrush', 'inrush amps']),
  use: field('Use', ['used for']),
  cost: money('Cost', ['our cost', 'net', 'net price', 'unit cost', 'dealer price', 'cost price', 'price']),
  price: money('Selling price', ['sell', 'sell price', 'list price', 'retail', 'retail price', 'msrp']),
  per: money('For how many', ['per', 'pack', 'pack size', 'quantity', 'qty']),
  unit: money('Unit', ['uom', 'sold by', 'unit of measure']),
  increment: money('Bought by', ['increment', 'multiple', 'order multiple']),
  taxable: money('Taxed', ['taxable', 'tax']),
  supplier: money('Supplier', ['vendor', 'manufacturer', 'distributor']),
  orderNumber: money('Order number', [
    'sku',
    'part number',
    'part no',
    'item number',
    'item no',
    'code',
    'article',
  ]),
} as const satisfies Record<string, TableField>;

export type FieldName = keyof typeof tableFields;
export const fieldNames = Object.keys(tableFields) as FieldName[];
export const isMoneyField = (name: FieldName): boolean => 'money' in tableFields[name];

/** A row by field, as text; what a row does not say is not there. */
export type FlatItem = Partial<Record<FieldName, string>>;

/** Which column of a file holds which field; null: none. */
export type Mapping = Readonly<Record<string, number | null>>;

const plain = (head: string): string =>
  head
    .trim()
    .toLowerCase()
    .replace(/\s+/g, ' ')
    .replace(/[.:*]+$/, '');

/** The mapping that the heads of the columns suggest: own heads first, each column once. */
export function guessMapping(columns: readonly string[]): Record<FieldName, number | null> {
  const heads = columns.map(plain);
  const taken = new Set<number>();
  const mapping = Object.fromEntries(fieldNames.map((name) => [name, null])) as Record<
    FieldName,
    number | null
  >;
  const take = (name: FieldName, column: number) => {
    if (column < 0 || taken.has(column) || mapping[name] !== null) return;
    taken.add(column);
    mapping[name] = column;
  };
  for (const name of fieldNames) take(name, heads.indexOf(plain(tableFields[name].header)));
  for (const name of fieldNames) for (const other of tableFields[name].also) take(name, heads.indexOf(other));
  return mapping;
}
