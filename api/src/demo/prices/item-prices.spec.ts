import { itemPriceSchema, lengthUnitOf } from '@lampwright/geometry/price';
import { describe, expect, it } from 'vitest';
import { starterCatalogue } from '../../modules/catalogue/starter/index.js';
import { demoItemPrices } from './item-prices.js';

describe('the demo prices of items', () => {
  it('are one for each item of the starter catalogue, and for nothing else', () => {
    const names = starterCatalogue.map(({ name }) => name);
    expect([...demoItemPrices.keys()].sort()).toEqual([...names].sort());
    for (const [name, price] of demoItemPrices)
      expect(itemPriceSchema.safeParse(price).error?.issues ?? [], name).toEqual([]);
  });

  it('are by the foot for what a US bill counts in feet', () => {
    for (const item of starterCatalogue) {
      const metric = item.category === 'cable' && 'mm2' in item.conductor;
      const long = item.category === 'cable' || (item.category === 'part' && item.use === 'conduit');
      const unit = demoItemPrices.get(item.name)?.unit;
      expect(unit, item.name).toBe(long ? (metric ? 'meter' : lengthUnitOf('imperial')) : 'each');
    }
  });
});
