import type { ItemPrice } from '@lampwright/geometry/price';

/** What the demo company pays, in cents of a dollar: invented, like its suppliers. */
const SUPPLIER = 'Marlow Bend Lighting Supply';
const YARD = 'Weirside Builders’ Yard';

type Priced = readonly [name: string, price: ItemPrice];

const price = (costMinor: number, orderNumber: string, edit: Partial<ItemPrice> = {}): ItemPrice => ({
  costMinor,
  priceMinor: null,
  per: 1,
  unit: 'each',
  increment: 1,
  taxable: true,
  supplier: SUPPLIER,
  orderNumber,
  ...edit,
});

/** By the piece. */
const each = (name: string, costMinor: number, orderNumber: string): Priced => [
  name,
  price(costMinor, orderNumber),
];
/** Bought by the spool, used to the foot. */
const spool = (name: string, feet: number, costMinor: number, orderNumber: string): Priced => [
  name,
  price(costMinor, orderNumber, { per: feet, unit: 'foot', increment: 1 }),
];
const drum = (name: string, meters: number, costMinor: number, orderNumber: string): Priced => [
  name,
  price(costMinor, orderNumber, { per: meters, unit: 'meter', increment: 1 }),
];
/** Bought by the bag, used one by one. */
const bag = (name: string, count: number, costMinor: number, orderNumber: string): Priced => [
  name,
  price(costMinor, orderNumber, { per: count }),
];
/** In sticks of ten feet. */
const stick = (name: string, costMinor: number, orderNumber: string): Priced => [
  name,
  price(costMinor, orderNumber, { per: 10, unit: 'foot', increment: 10, supplier: YARD }),
];
const fromYard = (name: string, costMinor: number, orderNumber: string): Priced => [
  name,
  price(costMinor, orderNumber, { supplier: YARD }),
];

/** A price for each item that a catalogue begins with, by its name. */
export const demoItemPrices: ReadonlyMap<string, ItemPrice> = new Map([
  each('Brass path light, 3 W', 6850, 'F-1103'),
  each('Low spread light, 2 W', 5400, 'F-1102'),
  each('Copper up-light, 4 W, 36°', 6200, 'F-2204'),
  each('Brass up-light, 7 W, 24°', 7900, 'F-2207'),
  each('Tree down-light, 5 W, 60°', 9600, 'F-2305'),
  each('Flood light, 12 W, 60°', 9150, 'F-2412'),
  each('Wall wash, 6 W, 110°', 6700, 'F-2506'),
  each('Step light, 1.5 W', 4350, 'F-3101'),
  each('Under-cap linear light, 3 W, 12 in', 4900, 'F-3203'),
  each('In-grade light, 5 W, 30°', 11_800, 'F-3305'),
  each('Bollard, 8 W', 13_900, 'F-3408'),
  each('Pond light, 6 W, 36°', 10_400, 'F-3506'),
  each('Copper path light, G4 lamp', 4600, 'F-4101'),
  each('Bullet up-light, GU5.3 lamp', 3950, 'F-4201'),
  each('Eave down-light, GU5.3 lamp', 4750, 'F-4301'),
  each('Wall wash, G4 lamp', 4100, 'F-4501'),
  each('In-grade well light, GU5.3 lamp', 6300, 'F-4601'),
  each('Pond light, GU5.3 lamp', 6900, 'F-4701'),
  each('LED lamp G4, 2 W', 780, 'L-0402'),
  each('LED lamp G4, 3 W', 890, 'L-0403'),
  each('LED lamp GU5.3, 4 W, 36°', 1150, 'L-5304'),
  each('LED lamp GU5.3, 5 W, 60°', 1240, 'L-5305'),
  each('LED lamp GU5.3, 7 W, 24°', 1390, 'L-5307'),
  each('Smart LED lamp GU5.3, 4 W, 36°', 2350, 'L-9304'),
  each('Smart LED lamp G4, 2 W', 1980, 'L-9402'),
  each('Halogen lamp G4, 10 W', 240, 'L-8410'),
  each('Halogen lamp G4, 20 W', 260, 'L-8420'),
  each('Halogen lamp GU5.3, 20 W, 36°', 410, 'L-8520'),
  each('Halogen lamp GU5.3, 35 W, 36°', 430, 'L-8535'),
  each('Halogen lamp GU5.3, 50 W, 60°', 450, 'L-8550'),
  spool('8 AWG landscape cable, 2-core', 250, 41_500, 'C-0825'),
  spool('10 AWG landscape cable, 2-core', 250, 27_800, 'C-1025'),
  spool('12 AWG landscape cable, 2-core', 500, 36_900, 'C-1250'),
  spool('14 AWG landscape cable, 2-core', 500, 25_400, 'C-1450'),
  spool('16 AWG landscape cable, 2-core', 500, 17_200, 'C-1650'),
  spool('18 AWG landscape cable, 2-core', 500, 12_600, 'C-1850'),
  drum('2 × 1.5 mm² garden cable', 100, 7900, 'C-9015'),
  drum('2 × 2.5 mm² garden cable', 100, 12_300, 'C-9025'),
  drum('2 × 4 mm² garden cable', 100, 18_900, 'C-9040'),
  drum('2 × 6 mm² garden cable', 100, 27_200, 'C-9060'),
  each('Multi-tap transformer, 150 VA', 17_900, 'T-0150'),
  each('Multi-tap transformer, 300 VA', 26_400, 'T-0300'),
  each('Multi-tap transformer, 600 VA', 41_200, 'T-0600'),
  each('Multi-tap transformer, 900 VA, three windings', 58_700, 'T-0900'),
  each('Garden transformer, 60 VA, 12 V', 6900, 'T-7060'),
  each('Garden transformer, 150 VA, 12 / 14 V', 11_900, 'T-7150'),
  each('DC supply, 100 VA, 12 V', 9800, 'T-7100'),
  each('Buried junction hub, 4-way', 2850, 'H-0004'),
  each('Buried junction hub, 8-way', 4400, 'H-0008'),
  bag('Gel-filled connector, small', 25, 2150, 'J-0325'),
  bag('Gel-filled connector, medium', 25, 2700, 'J-0425'),
  bag('Gel-filled connector, large', 25, 3400, 'J-0625'),
  each('Plug-in timer', 2900, 'K-0100'),
  each('Sunset timer', 5600, 'K-0200'),
  each('Photocell, socket-mounted', 1900, 'K-0300'),
  each('Outdoor smart plug', 3300, 'K-0400'),
  each('Ground stake, 10 in', 320, 'M-0110'),
  each('Ground stake, 18 in, for soft ground', 540, 'M-0118'),
  each('Tree mount with standoff screws', 1450, 'M-0200'),
  each('Surface mount, brass', 1180, 'M-0300'),
  fromYard('Transformer wall mount', 1650, 'B-2210'),
  stick('Conduit, 20 mm (¾ in)', 480, 'B-3075'),
  stick('Conduit, 25 mm (1 in)', 690, 'B-3100'),
  fromYard('Cable marker tape', 1250, 'B-4001'),
]);
