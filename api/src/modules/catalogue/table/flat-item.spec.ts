import type { CatalogueItem } from '@lampwright/geometry/catalogue';
import { describe, expect, it } from 'vitest';
import { starterCatalogue } from '../starter/index.js';
import { type FlatItem, fieldNames, guessMapping, tableFields } from './fields.js';
import { flatOfItem, itemOfFlat } from './flat-item.js';
import { flatOfPrice, priceOfFlat } from './flat-price.js';

const faultsOf = (flat: FlatItem) => {
  const read = itemOfFlat(flat, 'imperial');
  return read.ok ? [] : read.faults.map(({ field, detail }) => `${field}: ${detail}`);
};

describe('catalogue items in a table', () => {
  it('read back as what was written, every one of the starter catalogue', () => {
    for (const item of starterCatalogue) {
      const read = itemOfFlat(flatOfItem(item), 'imperial');
      expect(read.ok ? read.item : read.faults, item.name).toEqual(item);
    }
  });

  it('read what suppliers write: units, gauges, feet and plurals', () => {
    const read = itemOfFlat(
      {
        category: 'Fixtures',
        name: 'Step light',
        kind: 'Step',
        watts: '1.5 W',
        lumens: '1,070 lm',
        leadConductor: '#18',
        leadLength: '3 ft',
        height: '6"',
      },
      'imperial',
    );
    expect(read).toMatchObject({
      ok: true,
      item: {
        kind: 'step',
        light: 'integrated',
        lumens: 1070,
        load: { kind: 'driver', watts: 1.5 },
        lead: { conductor: { awg: 18 }, lengthMeters: expect.closeTo(0.9144, 12) },
        mountingHeightMeters: expect.closeTo(0.1524, 12),
      },
    });
  });

  it('hold what is known of the light: its peak, the shield in per cent, and whether it switches itself', () => {
    const smart: CatalogueItem = {
      ...starterCatalogue.find((item) => item.category === 'lamp')!,
      peakCandela: 950,
      smart: true,
    } as CatalogueItem;
    const shielded: CatalogueItem = {
      ...starterCatalogue.find((item) => item.category === 'fixture')!,
      shieldFactor: 0.29,
    } as CatalogueItem;
    expect(flatOfItem(smart)).toMatchObject({ peak: '950', smart: 'yes' });
    expect(flatOfItem(shielded)).toMatchObject({ shield: '29' });
    for (const item of [smart, shielded])
      expect(itemOfFlat(flatOfItem(item), 'metric')).toEqual({ ok: true, item });
    const row = { category: 'fixture', name: 'X', kind: 'path', watts: '3' };
    expect(itemOfFlat({ ...row, peak: '1,200 cd', shield: '85 %', smart: 'no' }, 'metric')).toMatchObject({
      item: { peakCandela: 1200, shieldFactor: 0.85, smart: false },
    });
    expect(faultsOf({ ...row, peak: '0' })).toEqual(['peak: Must be more than 0.']);
    expect(faultsOf({ ...row, shield: '120' })).toEqual([
      'shield: At most 100 %: no more light than there is.',
    ]);
    expect(faultsOf({ ...row, smart: 'perhaps' })).toEqual(['smart: “perhaps” is neither yes nor no.']);
  });

  it('tell every fault of a row at its field', () => {
    expect(faultsOf({ category: 'gadget', name: '' })).toEqual([
      'category: “gadget” is none of fixture, lamp, cable, transformer, hub, connector, control, part.',
      'name: The name is missing.',
    ]);
    expect(
      faultsOf({
        category: 'fixture',
        name: 'X',
        kind: 'path',
        watts: 'many',
        beam: '36 deg',
        wetListed: 'maybe',
      }),
    ).toEqual(['wetListed: “maybe” is neither yes nor no.', 'watts: “many” is no number.']);
    expect(faultsOf({ category: 'cable', name: 'X', conductor: '13' })[0]).toMatch(
      /^conductor: “13” is no conductor/,
    );
    expect(
      faultsOf({
        category: 'transformer',
        name: 'X',
        ratedVA: '300',
        lineVolts: '120',
        terminals: 'tap A 12 V W9; common C',
      }),
    ).toEqual(['terminals: There is no winding W9.']);
    expect(
      faultsOf({ category: 'lamp', name: 'X', base: 'G4', watts: '3', minVolts: '15', maxVolts: '9' })[0],
    ).toMatch(/^maxVolts:/);
    expect(faultsOf({ category: 'fixture', name: 'X', kind: 'path', watts: '0' })[0]).toMatch(/^watts:/);
  });

  it('are refused in sentences, whatever the schema finds', () => {
    const hub = { category: 'hub', name: 'Hub', ways: '4' };
    expect(faultsOf({ ...hub, name: 'x'.repeat(121) })).toEqual(['name: At most 120 characters, please.']);
    for (const [ways, detail] of [
      ['0', 'Must be at least 2.'],
      ['2.5', 'Must be a whole number.'],
      ['100000', 'Must be at most'],
    ] as const)
      expect(faultsOf({ ...hub, ways })[0]).toContain(`ways: ${detail}`);
    const price = { cost: '5', per: '0', supplier: 'y'.repeat(121) };
    const read = priceOfFlat(price, { currency: 'USD', locale: 'en-US' }, { unit: 'each' });
    expect(read.ok ? [] : read.faults.map(({ field, detail }) => `${field}: ${detail}`)).toEqual([
      'per: Must be at least 0.001.',
      'supplier: At most 120 characters, please.',
    ]);
  });

  it('read prices in the manner of the company', () => {
    const us = { currency: 'USD', locale: 'en-US' };
    const each = { unit: 'each' } as const;
    const price = {
      costMinor: 1_234_50,
      priceMinor: null,
      per: 250,
      unit: 'foot',
      increment: 1,
      taxable: false,
      supplier: 'S',
      orderNumber: '007',
    } as const;
    expect(priceOfFlat(flatOfPrice(price, us), us, each)).toEqual({ ok: true, price });
    expect(priceOfFlat({ cost: '1.234,50 €' }, { currency: 'EUR', locale: 'de-DE' }, each)).toMatchObject({
      price: { costMinor: 123450 },
    });
    expect(priceOfFlat({}, us, each)).toEqual({ ok: true, price: null });
    const wrong = priceOfFlat({ cost: 'call us', per: '0', unit: 'barrel' }, us, each);
    expect(wrong.ok ? [] : wrong.faults.map(({ field }) => field)).toEqual(['cost', 'unit']);
    const none = priceOfFlat({ cost: '1', per: '0' }, us, each);
    expect(none.ok ? [] : none.faults.map(({ field }) => field)).toEqual(['per']);
  });

  it('guess their columns from own and other heads, each column once', () => {
    const own = fieldNames.map((name) => tableFields[name].header);
    expect(Object.values(guessMapping(own))).toEqual(own.map((_, i) => i));
    const mapping = guessMapping(['SKU', 'Description', 'Net Price', 'UOM', 'Colour']);
    expect(mapping).toMatchObject({ orderNumber: 0, name: 1, cost: 2, unit: 3, id: null, category: null });
    const heads = fieldNames.flatMap((name) => [
      tableFields[name].header.toLowerCase(),
      ...tableFields[name].also,
    ]);
    expect(heads.filter((head, i) => heads.indexOf(head) !== i)).toEqual([]);
  });
});
