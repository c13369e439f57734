import { type PriceBook, usualPriceBook } from '@lampwright/geometry/price';

export const DEMO_TAX_ID = 'sales-tax';
/** The control that the demo company usually fits. */
export const DEMO_CONTROL = 'Sunset timer';

/**
 * What the demo company's work costs, in cents of a dollar: invented. `itemId` finds a catalogue item by its
 * name; one that the company has no more is left open.
 */
export function demoPriceBook(itemId: (name: string) => string | null): PriceBook {
  const usual = usualPriceBook('us');
  return {
    ...usual,
    rates: {
      ...usual.rates,
      perFixture: {
        path: 4800,
        up: 4800,
        down: 6400,
        flood: 5200,
        'wall-wash': 5200,
        step: 7800,
        'in-grade': 8800,
        bollard: 9800,
        linear: 6800,
        underwater: 11_500,
      },
      perTrenched: 240,
      perBored: 1650,
      perTransformer: 18_500,
      perTreeMount: 6500,
      perAimingVisit: 14_500,
      aimingVisits: 1,
    },
    overheadPercent: 12,
    materials: { by: 'markup', percent: 45 },
    labour: { by: 'markup', percent: 35 },
    taxes: [
      {
        id: DEMO_TAX_ID,
        name: 'Sales tax',
        jurisdiction: 'Marlow Bend',
        percent: 6,
        onMaterials: true,
        onLabour: false,
      },
    ],
    defaultTaxId: DEMO_TAX_ID,
    stages: [
      { id: 'deposit', name: 'Deposit', due: 'approval', percent: 30 },
      { id: 'start', name: 'Start of work', due: 'start', percent: 40 },
      { id: 'final', name: 'Balance', due: 'finish', percent: 30 },
    ],
    depositCap: { percent: 33, amountMinor: null },
    parts: {
      'ground-stake': itemId('Ground stake, 10 in'),
      'tree-mount': itemId('Tree mount with standoff screws'),
      'surface-mount': itemId('Surface mount, brass'),
      'transformer-mount': itemId('Transformer wall mount'),
      conduit: itemId('Conduit, 20 mm (¾ in)'),
    },
    controlItemId: itemId(DEMO_CONTROL),
  };
}
