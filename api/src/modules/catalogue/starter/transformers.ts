import type { Terminal, TransformerItem } from '@lampwright/geometry/catalogue';
import { common, tap } from './electrical.js';

const US_TAPS = [12, 13, 14, 15];

/** Taps on the right of the commons, lowest first, as multi-tap units commonly have them. */
const usTaps = (winding: string, maxConductors: number, prefix = ''): Terminal[] =>
  US_TAPS.map((volts) => tap(`${prefix}${volts}V`, volts, winding, maxConductors));

const multiTap = (
  ratedVA: number,
  regulationPercent: number,
  commons: number,
  maxConductors: number,
): TransformerItem => ({
  category: 'transformer',
  name: `Multi-tap transformer, ${ratedVA} VA`,
  ratedVA,
  nominalLineVolts: 120,
  regulationPercent,
  ratedAt: 'open',
  windings: [{ id: 'W1', ratedVA }],
  terminals: [
    ...Array.from({ length: commons }, (_, i) => common(`C${i + 1}`, 'W1', maxConductors)),
    ...usTaps('W1', maxConductors),
  ],
  supply: 'ac',
});

/** A winding, a common and a set of taps for each third of the load: loads and sag are apart. */
const threeWindings: TransformerItem = {
  category: 'transformer',
  name: 'Multi-tap transformer, 900 VA, three windings',
  note: 'A winding per common: a run takes its tap and its common from the same one.',
  ratedVA: 900,
  nominalLineVolts: 120,
  regulationPercent: 3,
  ratedAt: 'open',
  windings: ['A', 'B', 'C'].map((id) => ({ id, ratedVA: 300 })),
  terminals: ['A', 'B', 'C'].flatMap((winding) => [
    common(winding, winding, 3),
    ...usTaps(winding, 3, winding),
  ]),
  supply: 'ac',
};

const singleTap = (ratedVA: number, nominalLineVolts: number): TransformerItem => ({
  category: 'transformer',
  name: `Garden transformer, ${ratedVA} VA, 12 V`,
  note: 'Its 12 V hold at full load; lightly loaded it gives more.',
  ratedVA,
  nominalLineVolts,
  regulationPercent: 6,
  ratedAt: 'load',
  windings: [{ id: 'W1', ratedVA }],
  terminals: [common('C1', 'W1', 2, ratedVA / 12), tap('12V', 12, 'W1', 2)],
  supply: 'ac',
});

export const transformers: readonly TransformerItem[] = [
  multiTap(150, 5, 1, 3),
  multiTap(300, 4, 2, 3),
  multiTap(600, 3, 3, 4),
  threeWindings,
  singleTap(60, 230),
  {
    category: 'transformer',
    name: 'Garden transformer, 150 VA, 12 / 14 V',
    ratedVA: 150,
    nominalLineVolts: 230,
    regulationPercent: 5,
    ratedAt: 'load',
    windings: [{ id: 'W1', ratedVA: 150 }],
    terminals: [common('C1', 'W1', 3, 12.5), tap('12V', 12, 'W1', 3), tap('14V', 14, 'W1', 3)],
    supply: 'ac',
  },
  {
    category: 'transformer',
    name: 'DC supply, 100 VA, 12 V',
    note: 'Direct current: polarity matters at every fixture.',
    ratedVA: 100,
    nominalLineVolts: 230,
    regulationPercent: 0,
    ratedAt: 'load',
    windings: [{ id: 'W1', ratedVA: 100 }],
    terminals: [common('C1', 'W1', 2, 8.3), tap('12V', 12, 'W1', 2)],
    supply: 'dc',
  },
];
