import type { Quote } from '@lampwright/geometry/price';
import { expect, it } from 'vitest';
import { combinationsOf } from './build-document.js';

const totals = (groups: string[]) => ({
  groups,
  subtotalMinor: 0,
  discountMinor: 0,
  taxableMinor: 0,
  taxMinor: 0,
  totalMinor: 0,
  stages: [],
});

it('says of a set of groups why it can’t be taken: no light in it, or a fault in its wiring', () => {
  const group = (id: string | null, fixtures: number) => ({
    id,
    name: '',
    description: '',
    on: true,
    fixtures,
    priceMinor: 0,
  });
  const quote = {
    groups: [group(null, 0), group('path', 3), group('tree', 2)],
    combinations: [['path', 'tree'], [], ['path'], ['tree']].map(totals),
  } as unknown as Quote;
  const checks = [
    { groups: ['path', 'tree'], offerable: true, faults: [] },
    { groups: [], offerable: false, faults: ['There is no light in it.'] },
    { groups: ['path'], offerable: false, faults: ['P3 gets 13.1 V.'] },
  ];
  const told = combinationsOf({ quote, checks });
  expect(told.map(({ offerable }) => offerable)).toEqual([true, false, false, false]);
  expect(told[0]?.reason).toBe('');
  expect(told[1]?.reason).toContain('no light');
  expect(told[2]?.reason).toContain('wiring');
  // One that nobody has judged is not offered either.
  expect(told[3]?.reason).toContain('wiring');
});
