import { describe, expect, it } from 'vitest';
import type { CatalogueItem } from '../catalogue/index.js';
import {
  apply,
  deleteRecords,
  drawCable,
  type EditResult,
  type PlanDocument,
  placeArea,
  placeFixture,
  placeTransformer,
  recordsOf,
  setFields,
} from '../plan/index.js';
import {
  cable12,
  countedIds,
  halogenLamp,
  must,
  pathLight,
  randomEdit,
  seeded,
  startPlan,
  transformer300,
  upLight,
} from '../plan/plan.testkit.js';
import {
  emptyPricing,
  type ItemPrice,
  itemPriceSchema,
  type JobPricing,
  jobPricingSchema,
  type PriceBook,
  priceBookSchema,
  type QuoteInput,
  quoteOf,
  quoteSchema,
  usualPriceBook,
  withoutCosts,
} from './index.js';

const connector = (name: string, maxConductors: number, largestAwg: number): CatalogueItem => ({
  category: 'connector',
  name,
  minConductors: 2,
  maxConductors,
  largestAwg,
  smallestAwg: 18,
  directBurial: true,
});

/** Catalogue entries by id; the plan's items name them as their source. */
const entries: Record<string, CatalogueItem> = {
  path: pathLight,
  up: upLight,
  lamp: halogenLamp,
  cable: cable12,
  box: transformer300,
  small: connector('Small connector', 3, 12),
  large: connector('Large connector', 6, 8),
  stake: { category: 'part', name: 'Ground stake', use: 'ground-stake' },
  wall: { category: 'part', name: 'Wall mount', use: 'transformer-mount' },
  pipe: { category: 'part', name: 'Conduit', use: 'conduit' },
  timer: { category: 'control', name: 'Timer', kind: 'timer', ratedVA: 500, inrushAmps: null },
};
const use = (sourceId: string) => ({ sourceId, item: entries[sourceId] as CatalogueItem });

const each = (costMinor: number | null, priceMinor: number | null = null): ItemPrice => ({
  costMinor,
  priceMinor,
  per: 1,
  unit: 'each',
  increment: 1,
  taxable: true,
  supplier: '',
  orderNumber: '',
});
const prices: Record<string, ItemPrice> = {
  path: each(40_00),
  up: each(55_00),
  lamp: each(5_00, 9_00),
  // A spool of 250 ft for $150.
  cable: { ...each(150_00), per: 250, unit: 'foot', increment: 250 },
  box: each(200_00),
  small: { ...each(20_00), per: 25, increment: 1 },
  large: each(2_00),
  stake: each(3_00),
  wall: each(12_00),
  pipe: { ...each(8_00), per: 10, unit: 'foot', increment: 10 },
  timer: each(30_00),
};

const usual = usualPriceBook('us');
const book: PriceBook = {
  ...usual,
  rates: {
    ...usual.rates,
    perFixture: { ...usual.rates.perFixture, path: 20_00, up: 25_00 },
    perTrenched: 1_50,
    perBored: 12_00,
    perTransformer: 90_00,
    perAimingVisit: 120_00,
  },
  overheadPercent: 10,
  materials: { by: 'markup', percent: 50 },
  labour: { by: 'margin', percent: 40 },
  taxes: [
    {
      id: 't',
      name: 'Sales tax',
      jurisdiction: 'Marlow Bend',
      percent: 6,
      onMaterials: true,
      onLabour: false,
    },
  ],
  defaultTaxId: 't',
};

const input = (changes: Partial<QuoteInput> = {}, pricing: Partial<JobPricing> = {}): QuoteInput => ({
  catalogue: new Map(Object.entries(entries)),
  prices: new Map(Object.entries(prices)),
  book,
  pricing: { ...emptyPricing, controls: {}, ...pricing },
  currency: 'USD',
  system: 'imperial',
  ...changes,
});

const sheetId = 'sheet1';

/** T at 0, and lights at 4 m, 7 m and 10 m in a chain; paving lies over the cable from 5 m to 6 m. */
function chain() {
  const ids = countedIds();
  let doc: PlanDocument = startPlan();
  const make = (edit: EditResult): string[] => {
    doc = apply(doc, must(edit));
    return edit.kind === 'change' ? edit.selected : [];
  };
  const place = (x: number, what: 'path' | 'up') =>
    make(
      placeFixture(
        doc,
        { sheetId, at: { x, y: 0 }, fixture: use(what), lamp: what === 'up' ? use('lamp') : null },
        ids,
      ),
    )[0] ?? '';
  const [t = ''] = make(placeTransformer(doc, { sheetId, at: { x: 0, y: 0 }, transformer: use('box') }, ids));
  const p1 = place(400, 'path');
  const p2 = place(700, 'path');
  const u1 = place(1000, 'up');
  const stops = [t, p1, p2, u1].map((id) => ({ on: 'record' as const, id }));
  make(drawCable(doc, { sheetId, stops, cable: use('cable') }, ids));
  const points = [
    { x: 500, y: -50 },
    { x: 600, y: -50 },
    { x: 600, y: 50 },
    { x: 500, y: 50 },
  ];
  make(placeArea(doc, { sheetId, use: 'paved', points }, ids));
  return { doc: () => doc, make, ids, t, p1, p2, u1 };
}

const line = (quote: ReturnType<typeof quoteOf>, key: string) => quote.lines.find((l) => l.key === key);

describe('the price of a plan', () => {
  it('counts what the plan shows, says where it comes from, and prices each line once', () => {
    const { doc, t, p1, p2, u1 } = chain();
    const quote = quoteOf(doc(), input());
    expect(() => quoteSchema.parse(quote)).not.toThrow();
    const told = quote.lines.map((l) => [l.key, l.quantity, l.unit, l.costMinor, l.priceMinor, l.source]);
    // Cable: 10 m drawn; slack 3 × 0.6096 + 2 × 0.6096 + 0.9144 (at the transformer) = 3.9624 m; 10 % waste:
    // 15.36 m are 50.4 ft, so 51 ft; a spool has 250. Prices: cost × 1.1 × 1.5, labour cost × 1.1 ÷ 0.6.
    expect(told).toEqual([
      ['fixtures:path@base', 2, 'each', 80_00, 132_00, 'P1, P2'],
      ['fixtures:up@base', 1, 'each', 55_00, 90_75, 'U1'],
      ['lamps:lamp@base', 1, 'each', 5_00, 9_00, 'U1'],
      ['cable:cable@base', 51, 'foot', 30_60, 50_49, '33 ft drawn, 13 ft slack and rise, 10 % waste'],
      ['rest:cable@base', 199, 'foot', 119_40, 197_01, 'Bought by 250 ft: 250 in all'],
      ['connectors:small@base', 6, 'each', 4_80, 7_92, '2 at each of 3 splices of 2 to 3 conductors'],
      ['mounting:stake@base', 3, 'each', 9_00, 14_85, 'P1, P2, U1'],
      ['mounting:wall@base', 1, 'each', 12_00, 19_80, 'T1'],
      // 1 m is 3.28 ft; 5 % waste makes it 3.44, so 4 ft, bought by 10.
      ['conduit:pipe@base', 4, 'foot', 3_20, 5_28, '3 ft drawn, 5 % waste'],
      ['rest:pipe@base', 6, 'foot', 4_80, 7_92, 'Bought by 10 ft: 10 in all'],
      ['transformers:box@base', 1, 'each', 200_00, 330_00, 'T1'],
      ['labour:fixture-path@base', 2, 'each', 40_00, 73_33, 'P1, P2'],
      ['labour:fixture-up@base', 1, 'each', 25_00, 45_83, 'U1'],
      ['labour:trench@base', 30, 'foot', 45_00, 82_50, '30 ft of cable outside of paving'],
      ['labour:bore@base', 4, 'foot', 48_00, 88_00, '3 ft under paving'],
      ['labour:transformer@base', 1, 'each', 90_00, 165_00, 'T1'],
      ['labour:aiming@base', 1, 'visit', 120_00, 220_00, 'By the price book'],
    ]);
    expect(line(quote, 'fixtures:path@base')?.recordIds).toEqual([p1, p2]);
    expect(line(quote, 'mounting:stake@base')?.recordIds).toEqual([p1, p2, u1]);
    expect(line(quote, 'transformers:box@base')?.recordIds).toEqual([t]);
    expect(quote.lines.filter((l) => l.taxable).every((l) => l.kind === 'material')).toBe(true);
    expect(quote.warnings.map(({ code }) => code)).toEqual(['no-control']);
    const { costMinor = 0, overheadMinor = 0, profitMinor } = quote.margin ?? {};
    expect(costMinor).toBe(quote.lines.reduce((n, l) => n + (l.costMinor ?? 0), 0));
    expect(profitMinor).toBe((quote.combinations[0]?.subtotalMinor ?? 0) - costMinor - overheadMinor);
  });

  it('gives each group what is its own, and the base what is shared', () => {
    const { doc, p1, p2, u1 } = chain();
    const group = (id: string, on: boolean) => ({ id, name: id, description: '', on });
    const pricing = {
      groups: [group('walk', true), group('tree', false)],
      members: { [p1]: 'walk', [p2]: 'walk', [u1]: 'tree' },
    };
    const quote = quoteOf(doc(), input({}, pricing));
    expect(quote.combinations.map(({ groups }) => groups)).toEqual([
      ['walk'],
      [],
      ['tree'],
      ['walk', 'tree'],
    ]);
    const keys = (id: string | null) =>
      quote.lines.filter((l) => l.groupId === id).map((l) => l.key.split('@')[0]);
    expect(keys('tree')).toEqual([
      'fixtures:up',
      'lamps:lamp',
      'cable:cable',
      'connectors:small',
      'mounting:stake',
      'labour:fixture-up',
      'labour:trench',
    ]);
    // Home run, the cable that both need, the splices that it passes, box, spool and conduit.
    expect(keys(null)).toEqual([
      'cable:cable',
      'rest:cable',
      'connectors:small',
      'mounting:wall',
      'conduit:pipe',
      'rest:pipe',
      'transformers:box',
      'labour:trench',
      'labour:bore',
      'labour:transformer',
      'labour:aiming',
    ]);
    const byGroup = new Map(quote.groups.map((g) => [g.id, g.priceMinor]));
    for (const { groups, subtotalMinor } of quote.combinations)
      expect(subtotalMinor).toBe(
        (byGroup.get(null) ?? 0) + groups.reduce((n, id) => n + (byGroup.get(id) ?? 0), 0),
      );
    expect(quote.groups.map(({ fixtures }) => fixtures)).toEqual([0, 2, 1]);
  });

  it('keeps what people wrote by hand through edits of the plan, and tells when its line is gone', () => {
    const { doc, make, ids, p2, u1 } = chain();
    const pricing: Partial<JobPricing> = {
      overrides: {
        'fixtures:path@base': { quantity: 3, priceMinor: null, note: 'One to spare' },
        'lamps:lamp@base': { quantity: null, priceMinor: 5_00, note: '' },
      },
      manualLines: [
        {
          id: 'm1',
          groupId: null,
          kind: 'labour',
          name: 'Permit',
          quantity: 1.5,
          unit: 'visit',
          costMinor: 10_00,
          priceMinor: null,
          taxable: false,
        },
      ],
    };
    const first = quoteOf(doc(), input({}, pricing));
    expect(line(first, 'fixtures:path@base')).toMatchObject({
      quantity: 3,
      priceMinor: 198_00,
      origin: 'overridden',
      planned: { quantity: 2, priceMinor: 132_00 },
      note: 'One to spare',
    });
    expect(line(first, 'lamps:lamp@base')).toMatchObject({ quantity: 1, priceMinor: 5_00 });
    // 15.00 × 1.1 ÷ 0.6
    expect(line(first, 'manual:m1')).toMatchObject({ costMinor: 15_00, priceMinor: 27_50, origin: 'manual' });
    make(deleteRecords(doc(), [p2, u1], ids));
    const second = quoteOf(doc(), input({}, pricing));
    expect(line(second, 'fixtures:path@base')).toMatchObject({
      quantity: 3,
      planned: { quantity: 1, priceMinor: 66_00 },
    });
    expect(line(second, 'manual:m1')).toMatchObject({ priceMinor: 27_50 });
    expect(second.warnings).toContainEqual(
      expect.objectContaining({ code: 'override-without-line', lineKey: 'lamps:lamp@base' }),
    );
  });

  it('says what has no price, no part and no connector, and never takes it for free in silence', () => {
    const { doc, u1 } = chain();
    const catalogue = new Map(Object.entries(entries).filter(([id]) => id !== 'small' && id !== 'stake'));
    catalogue.set('large', connector('Thin only', 6, 16));
    const known = new Map(Object.entries(prices));
    known.delete('up');
    known.set('cable', { ...each(1), unit: 'each' });
    const quote = quoteOf(doc(), input({ catalogue, prices: known }));
    expect(line(quote, 'fixtures:up@base')).toMatchObject({ priceMinor: null, costMinor: null });
    expect(quote.margin).toBeNull();
    const told = quote.warnings.map(({ code, message }) => `${code}: ${message}`);
    expect(told).toContain('no-price: Bronze up light has no price yet.');
    expect(told).toContain(
      'no-price: Two-wire cable, 12 AWG is priced by the piece, but counted here by the foot.',
    );
    expect(told).toContain('no-part: The catalogue has no ground stake, so none is on the bill.');
    expect(
      quote.warnings.filter(({ code }) => code === 'no-connector').map((w) => w.recordIds),
    ).toContainEqual([u1]);
  });

  it('counts longer leads as cable, tree mounts as work, and shows nothing of costs to those who may not see them', () => {
    const { doc, make, ids, u1 } = chain();
    make(setFields(doc(), [u1], 'fixture', { lead: { conductor: { awg: 12 }, lengthMeters: 3.048 } }, ids));
    const quote = quoteOf(doc(), input());
    // 10 ft of another gauge than the lead that comes with it, 10 % waste.
    expect(line(quote, 'lead:cable@base')).toMatchObject({ quantity: 11, unit: 'foot' });
    const bare = withoutCosts(quote);
    expect(bare.margin).toBeNull();
    expect(bare.lines.every(({ costMinor }) => costMinor === null)).toBe(true);
    expect(bare.combinations).toEqual(quote.combinations);
  });

  it('asks for a tax unless the work is exempt', () => {
    const { doc } = chain();
    const codes = (changes: Partial<QuoteInput>, pricing: Partial<JobPricing>) =>
      quoteOf(doc(), input(changes, pricing)).warnings.map(({ code }) => code);
    expect(codes({ book: { ...book, defaultTaxId: null } }, {})).toContain('no-tax');
    expect(codes({ book: { ...book, defaultTaxId: null } }, { taxExempt: true })).not.toContain('no-tax');
    const exempt = quoteOf(doc(), input({}, { taxExempt: true })).combinations[0];
    expect(exempt?.taxMinor).toBe(0);
  });

  const seed = Date.now() % 1_000_000_007;
  it(`adds up, group by group, for random plans (seed ${seed})`, () => {
    const random = seeded(seed);
    for (let n = 0; n < 25; n++) {
      const ids = countedIds(`n${n}-`);
      let doc: PlanDocument = startPlan();
      for (let edit = 0; edit < 50; edit++) {
        const change = randomEdit(doc, random, ids);
        if (change) doc = apply(doc, change);
      }
      const groups = ['a', 'b', 'c'].map((id, i) => ({ id, name: id, description: '', on: i !== 1 }));
      const members = Object.fromEntries(
        [...recordsOf(doc, 'fixture')].map(({ id }) => [id, groups[Math.floor(random() * 3)]?.id ?? 'a']),
      );
      const quote = quoteOf(
        doc,
        input({}, { groups, members, discount: { kind: 'percent', percent: 7.5, name: '' } }),
      );
      expect(() => quoteSchema.parse(quote)).not.toThrow();
      expect(new Set(quote.lines.map(({ key }) => key)).size).toBe(quote.lines.length);
      for (const t of quote.combinations) {
        const taken = quote.lines.filter((l) => l.groupId === null || t.groups.includes(l.groupId));
        expect(t.subtotalMinor).toBe(taken.reduce((sum, l) => sum + (l.priceMinor ?? 0), 0));
        expect(t.totalMinor).toBe(t.subtotalMinor - t.discountMinor + t.taxMinor);
      }
    }
  });
});

describe('what people may enter', () => {
  it('begins valid, for every region', () => {
    for (const region of ['us', 'eu', 'uk'] as const)
      expect(() => priceBookSchema.parse(usualPriceBook(region))).not.toThrow();
    expect(jobPricingSchema.parse(emptyPricing)).toEqual(emptyPricing);
  });

  it('refuses seven groups, members of no group, twice the same id, and odd fractions', () => {
    const group = (id: string) => ({ id, name: id, description: '', on: true });
    const wrong: Partial<JobPricing>[] = [
      { groups: ['a', 'b', 'c', 'd', 'e', 'f', 'g'].map(group) },
      { groups: [group('a'), group('a')] },
      { members: { f1: 'nowhere' } },
      { discount: { kind: 'percent', percent: 101, name: '' } },
      { discount: { kind: 'percent', percent: 1.23456, name: '' } },
    ];
    for (const pricing of wrong)
      expect(
        jobPricingSchema.safeParse({ ...emptyPricing, ...pricing }).success,
        JSON.stringify(pricing),
      ).toBe(false);
    expect(itemPriceSchema.safeParse({ ...each(1), per: 0 }).success).toBe(false);
    expect(itemPriceSchema.safeParse({ ...each(1), costMinor: 1.5 }).success).toBe(false);
  });
});
