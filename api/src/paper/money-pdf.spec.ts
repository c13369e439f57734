import { formatMoney } from '@lampwright/geometry/price';
import { describe, expect, it } from 'vitest';
import { type MoneyDocument, moneyDocumentSchema } from './money-document.js';
import { moneyPdf } from './money-pdf.js';
import { demoMoneyDocument, fontsOf, infoOf, pagesOf } from './paper.testkit.js';

const money = (minor: number) => formatMoney(minor, 'USD', 'en-US');
const textOf = (pdf: Buffer) => pagesOf(pdf).join(' ').replace(/\s+/g, ' ');

const said: readonly (readonly [MoneyDocument['kind'], readonly string[]])[] = [
  ['invoice', ['Invoice 318', 'To be paid']],
  ['receipt', ['Receipt 318', 'Received by card on May 6, 2026.']],
  ['refund', ['Refund 318', 'Returned by card on May 6, 2026.']],
];

describe.each(said)('a PDF of the kind %s', (kind, words) => {
  it('says what it is, for whom, and every sum', async () => {
    const document = demoMoneyDocument(kind);
    expect(moneyDocumentSchema.safeParse(document).error).toBeUndefined();
    const pdf = await moneyPdf(document);
    const text = textOf(pdf);
    for (const word of [
      ...words,
      'Fernhollow Outdoor Lighting',
      'Licence MB-LV 20817',
      'Odette Marsh',
      'Proposal 1042 · revision 2',
      'May 6, 2026',
      'Page 1 of 1',
      document.taxNote,
      document.terms,
      ...document.lines.flatMap(({ name, amountMinor }) => [name, money(amountMinor)]),
      money(document.totalMinor),
      money(document.paidMinor),
      money(document.outstandingMinor),
    ])
      expect(text).toContain(word);
    expect(infoOf(pdf).get('Title')).toBe(`${words[0]}`);
    expect(fontsOf(pdf)).toContain('WorkSans');
    expect((await moneyPdf(structuredClone(document))).equals(pdf)).toBe(true);
  }, 30_000);
});

describe('an invoice of many lines', () => {
  it('goes on to further pages with its heads', async () => {
    const document = demoMoneyDocument('invoice');
    const lines = Array.from({ length: 120 }, (_, i) => ({
      name: `Part ${i} ${'ß😀'.repeat(20)}`,
      amountMinor: 100 + i,
    }));
    const pages = pagesOf(await moneyPdf({ ...document, lines }));
    expect(pages.length).toBeGreaterThan(3);
    for (const [i, page] of pages.entries()) expect(page).toContain(`Page ${i + 1} of ${pages.length}`);
    for (const page of pages.filter((text) => text.includes('Part ')))
      expect(page).toMatch(/What for +Amount/);
    expect(lines.filter(({ amountMinor }) => !pages.join('').includes(money(amountMinor)))).toEqual([]);
  }, 30_000);
});
