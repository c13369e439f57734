import { fixtureKinds } from '../catalogue/index.js';
import { type PriceBook, partUses } from './price-book.js';

/**
 * What a company of the region begins with: no rates, no markup, no tax, since only the company knows its
 * own. Waste, validity and payment stages are common practice, no source.
 */
export function usualPriceBook(region: 'us' | 'eu' | 'uk'): PriceBook {
  const none = <K extends string>(keys: readonly K[]) =>
    Object.fromEntries(keys.map((key) => [key, null])) as Record<K, null>;
  return {
    locale: region === 'us' ? 'en-US' : region === 'uk' ? 'en-GB' : 'en-IE',
    rates: {
      perFixture: Object.fromEntries(
        fixtureKinds.map((kind) => [kind, 0]),
      ) as PriceBook['rates']['perFixture'],
      lengthUnit: region === 'us' ? 'foot' : 'meter',
      perTrenched: 0,
      perBored: 0,
      perTransformer: 0,
      perTreeMount: 0,
      perAimingVisit: 0,
      aimingVisits: 1,
    },
    overheadPercent: 0,
    materials: { by: 'markup', percent: 0 },
    labour: { by: 'markup', percent: 0 },
    cableWastePercent: 10,
    conduitWastePercent: 5,
    taxes: [],
    defaultTaxId: null,
    stages: [
      { id: 'deposit', name: 'Deposit', due: 'approval', percent: 30 },
      { id: 'final', name: 'Balance', due: 'finish', percent: 70 },
    ],
    depositCap: { percent: null, amountMinor: null },
    designersSeeCosts: false,
    showLinePrices: true,
    parts: none(partUses),
    controlItemId: null,
    validDays: 30,
  };
}
