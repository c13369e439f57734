import { inflateSync } from 'node:zlib';
import type { NightScene } from '@lampwright/geometry/light';
import { labelOf, type PlanDocument, planOf, recordsOf } from '@lampwright/geometry/plan';
import { formatMoney } from '@lampwright/geometry/price';
import sharp from 'sharp';
import { beforeAll, describe, expect, it } from 'vitest';
import { nightScenesOf } from '../modules/proposals/night.js';
import { type RevisionDocument, revisionDocumentSchema } from '../modules/proposals/revision-document.js';
import type { NightPicture } from './night-picture.js';
import {
  demoDocument,
  demoNight,
  demoPaper,
  documentOf,
  drawDemo,
  evidenceFor,
  fontsOf,
  harrowBank,
  hashOf,
  imagesOf,
  infoOf,
  pagesOf,
  sandpiperRow,
  toldOn,
  wordsOf,
} from './paper.testkit.js';
import { proposalPdf } from './proposal-pdf.js';

const flat = (text: string) => text.replace(/\s+/g, ' ');
const textOf = (pdf: Buffer) => flat(pagesOf(pdf).join(' '));
const money = (minor: number) => formatMoney(minor, 'USD', 'en-US');

const withoutPictures = (document: RevisionDocument) =>
  proposalPdf({ document, hash: hashOf(document), pictures: new Map(), nights: [], signature: null });

/** Every word lies between the margins of its page, the foot included. */
function expectWithinMargins(pdf: Buffer): void {
  for (const { text, page, xMin, xMax, yMin, yMax } of wordsOf(pdf)) {
    expect(xMin, text).toBeGreaterThan(44);
    expect(xMax, text).toBeLessThan(page.width - 44);
    expect(yMin, text).toBeGreaterThan(30);
    expect(yMax, text).toBeLessThan(page.height - 20);
  }
}

/** No word lies on another: boxes of words overlap by less than the leading. */
function expectApart(pdf: Buffer): void {
  const words = wordsOf(pdf);
  const byPage = new Map<number, typeof words>();
  for (const word of words) byPage.set(word.page.number, [...(byPage.get(word.page.number) ?? []), word]);
  for (const page of byPage.values()) {
    page.sort((a, b) => a.yMin - b.yMin);
    for (const [i, a] of page.entries())
      for (let j = i + 1; j < page.length && page[j]!.yMin < a.yMax - 2; j += 1) {
        const b = page[j]!;
        const across = Math.min(a.xMax, b.xMax) - Math.max(a.xMin, b.xMin);
        const down = Math.min(a.yMax, b.yMax) - Math.max(a.yMin, b.yMin);
        expect(across > 1 && down > 3, `“${a.text}” and “${b.text}” on page ${a.page.number}`).toBe(false);
      }
  }
}

describe.each([
  ['Harrow Bank', harrowBank],
  ['Sandpiper Row', sandpiperRow],
] as const)('the proposal of %s', (_name, demo) => {
  let pdf: Buffer;
  let pages: string[];
  let document: RevisionDocument;
  let night: NightPicture;
  beforeAll(async () => {
    document = demoDocument(demo);
    expect(revisionDocumentSchema.safeParse(document).error).toBeUndefined();
    night = await demoNight(demo, document);
    pdf = await proposalPdf(demoPaper(demo, { document, nights: [night] }));
    pages = pagesOf(pdf);
  }, 120_000);

  it('tells on every page what it is and which page of how many', () => {
    expect(infoOf(pdf).get('Pages')).toBe(String(pages.length));
    expect(pages.length).toBeGreaterThan(5);
    for (const [index, page] of pages.entries()) {
      expect(page).toContain(`Page ${index + 1} of ${pages.length}`);
      expect(flat(page)).toContain(
        `Proposal 1042 · revision 2 · May 4, 2026 · hash ${hashOf(document).slice(0, 12)}`,
      );
      expect(page).toContain('Fernhollow Outdoor Lighting');
    }
  });

  it('names itself', () => {
    const info = infoOf(pdf);
    expect(info.get('Title')).toBe(`Proposal 1042 · revision 2 – ${document.job.name}`);
    expect(info.get('Author')).toBe('Fernhollow Outdoor Lighting');
    expect(info.get('Page size')).toContain('letter');
    expect(pdf.toString('latin1')).toContain('/Lang');
    expect(pdf.toString('latin1')).toContain('/Outlines');
  });

  it('embeds Work Sans, and nothing else', () => {
    const fonts = fontsOf(pdf).trim().split('\n').slice(2);
    expect(fonts.length).toBe(3);
    for (const font of fonts) expect(font).toMatch(/WorkSans-(Regular|Medium|SemiBold).* yes yes yes/);
  });

  it('holds every sum', () => {
    const text = textOf(pdf);
    const [offered] = document.price.combinations;
    const sums = [
      ...document.price.groups.map(({ priceMinor }) => priceMinor),
      ...document.price.lines.flatMap(({ priceMinor }) => priceMinor ?? []),
      offered!.subtotalMinor,
      -offered!.discountMinor,
      offered!.taxableMinor,
      offered!.taxMinor,
      offered!.totalMinor,
      ...offered!.stages.map(({ amountMinor }) => amountMinor),
    ];
    for (const sum of sums) expect(text).toContain(money(sum));
    expect(text).toContain('Sales tax (Marlow Bend), 6.625% of');
    expect(pages[0]).toContain(money(offered!.totalMinor));
  });

  it('lists every tag with its item, and additions apart', () => {
    const schedule = pages.filter((page) => page.includes('Light\n') || page.includes('colour')).join('\n');
    const [before = '', after = ''] = flat(schedule).split('Offered as additions, not included');
    for (const { tag, name, groupId } of document.lights)
      expect(groupId === 'bed' ? after : before).toContain(`${tag} ${name}`);
    expect(flat(pages.join(' '))).toContain(`Addition: Along the bed`);
  });

  it('says no volts but in what was accepted, and nothing of costs', () => {
    const text = textOf(pdf).replace(/P5 is dim[^.]*\.[^.]*\.[^.]*\./, '');
    expect(text).not.toMatch(/\d V\b/);
    expect(text.toLowerCase()).not.toMatch(/margin|markup|overhead/);
  });

  it('shows the garden by night behind the cover, and says what it is worked out from', () => {
    const page = toldOn(pdf, 2);
    for (const said of [
      `At night: ${document.sheets[0]!.name}`,
      'Artist’s impression: worked out from',
      'estimated volts of each planned light',
      `foot-candles (${night.scene.whiteLux} lux)`,
      'Lit as offered: the lights that are always in and “The old tree”.',
      'Not shown, since not included: “Along the bed”.',
    ])
      expect(page).toContain(said);
    expect(page).toMatch(/(On|:) from sunset until 23:00\./);
    const [picture] = imagesOf(pdf).filter(({ page: number }) => number === 2);
    expect(picture?.dotsPerInch).toBeGreaterThan(150);
  });

  it('is the same for the same input', async () => {
    const nights = [{ scene: structuredClone(night.scene), picture: Buffer.from(night.picture) }];
    const again = await proposalPdf(demoPaper(demo, { document: structuredClone(document), nights }));
    expect(again.equals(pdf)).toBe(true);
  }, 60_000);

  it('stays light, keeps its margins and covers no word', () => {
    expect(pdf.length).toBeLessThan(1024 * 1024);
    expectWithinMargins(pdf);
    expectApart(pdf);
  });
});

describe('the drawing', () => {
  it('is to the scale that it states: between lights, and on its bar', async () => {
    const pdf = await withoutPictures(demoDocument(sandpiperRow));
    expect(flat(pagesOf(pdf)[1]!)).toContain('Scale 1″ = 20′ (1:240)');
    const words = wordsOf(pdf).filter(({ page }) => page.number === 2);
    const middle = (tag: string) => {
      const found = words.filter(({ text }) => text === tag);
      expect(found.length, tag).toBe(1);
      return (found[0]!.xMin + found[0]!.xMax) / 2;
    };
    // P4 and P5 stand 9 ft apart, east to west.
    expect(middle('P5') - middle('P4')).toBeCloseTo((9 * 12 * 72) / 240, 0);
    // The divisions of the bar are the only boxes 5 points high.
    const bar = contentOf(pdf).matchAll(/([\d.]+) [\d.]+ ([\d.]+) 5 re\b/g);
    const parts = [...bar].map(([, x, width]) => ({ x: Number(x), width: Number(width) }));
    const length = parts.reduce((sum, { width }) => sum + width, 0);
    const stated = words.find(({ text }, i) => text === 'ft' && /^\d+$/.test(words[i - 1]?.text ?? ''));
    expect(stated).toBeDefined();
    const barFeet = Number(words[words.indexOf(stated!) - 1]!.text);
    expect(length).toBeCloseTo((barFeet * 12 * 72) / 240, 1);
  }, 60_000);

  it('takes metric scales where the company works in metres, on A4', async () => {
    const document = { ...demoDocument(sandpiperRow), units: 'metric', region: 'eu' } as const;
    const pdf = await withoutPictures(document);
    expect(flat(pagesOf(pdf)[1]!)).toMatch(/Scale 1:2[05]0 /);
    expect(infoOf(pdf).get('Page size')).toContain('A4');
  }, 60_000);

  it('says so where a sheet has no scale, with and without its picture', async () => {
    const document = demoDocument(sandpiperRow);
    const records = document.plan.records.map((record) =>
      record.kind === 'sheet' ? { ...record, references: [], groundMetersPerPaperMeter: null } : record,
    );
    const unscaled = { ...document, plan: { ...document.plan, records } };
    for (const pdf of [
      await withoutPictures(unscaled),
      await proposalPdf(demoPaper(sandpiperRow, { document: unscaled })),
    ]) {
      const plan = flat(pagesOf(pdf)[1]!);
      expect(plan).toContain('Not to scale');
      expect(plan).not.toContain('1:240');
      expect(plan).toContain('U12');
    }
  }, 60_000);

  it('gives every sheet a page of its own', async () => {
    const document = demoDocument(harrowBank);
    const other = documentOf(renamed(drawDemo(sandpiperRow)), sandpiperRow);
    const both = {
      ...document,
      plan: {
        ...document.plan,
        records: [...document.plan.records, ...other.plan.records.filter(({ kind }) => kind !== 'settings')],
      },
      lights: [...document.lights, ...other.lights],
    };
    const pages = pagesOf(await withoutPictures(both)).map(flat);
    expect(
      pages.filter((page) => page.includes('Plan: ')).map((page) => /Plan: (\w+ \w+)/.exec(page)?.[1]),
    ).toEqual(['Rear garden', 'Plot plan']);
  }, 60_000);
});

describe('a signed proposal', () => {
  it('shows the evidence, and the sums of what was approved', async () => {
    const document = demoDocument(harrowBank);
    const signature = evidenceFor(document, ['tree', 'bed']);
    const pdf = await proposalPdf(demoPaper(harrowBank, { document, signature }));
    const text = textOf(pdf);
    for (const said of [
      signature.typedName,
      signature.agreedTo,
      signature.consentedTo,
      '2026-05-06 19:04:32 UTC',
      signature.address,
      signature.userAgent,
      signature.revisionHash,
      signature.pdfHash,
      'The old tree',
      'Total as approved',
      money(signature.totals.totalMinor),
    ])
      expect(text).toContain(said);
    expect(text).not.toContain('Name and signature');
    expect(text).not.toContain('Additions, not included');
    expect(signature.totals.totalMinor).not.toBe(document.price.combinations[0]?.totalMinor);
    expect(text).not.toContain(money(document.price.combinations[0]!.totalMinor));
  }, 60_000);

  it('is one of a change order when the document says what it changes', async () => {
    const document = demoDocument(harrowBank);
    const [offered] = document.price.combinations;
    const changes = { revision: 1, hash: 'a'.repeat(64), totalMinor: offered!.totalMinor + 12_345 };
    const [first] = pagesOf(await withoutPictures({ ...document, changes }));
    expect(flat(first!)).toContain(
      `Changes the approved revision 1, which came to ${money(changes.totalMinor)}: $123.45 less.`,
    );
  }, 60_000);
});

describe('the page of the night', () => {
  const document = demoDocument(harrowBank);
  const [lit] = nightScenesOf({ pictures: { sheet: 'kept.jpg' } }, document);
  const [zone] = lit!.zones;
  const clock = (on: string) =>
    ({ on: { kind: 'clock', at: on }, off: { kind: 'sunrise', minutesAfter: -30 } }) as const;
  /** A picture of that shape, and a scene with the lights in so many zones. */
  const night = async (zones: NightScene['zones'], edit: Partial<NightScene> = {}): Promise<NightPicture> => {
    const scene = {
      ...lit!,
      zones,
      sources: lit!.sources.map((source, i) => ({ ...source, zoneId: zones[i % zones.length]!.id })),
      ...edit,
    };
    const { widthPx: width, heightPx: height } = scene;
    const create = { width, height, channels: 3, background: '#101828' } as const;
    return { scene, picture: await sharp({ create }).jpeg().toBuffer() };
  };

  it('tells the hours zone by zone where they differ, and once where they don’t', async () => {
    const zones = [
      { ...zone!, id: 'a', name: 'Patio wall' },
      { ...zone!, id: 'b', name: 'Front walk', schedule: clock('19:30') },
      { ...zone!, id: 'c', name: 'Shed' },
    ];
    const pdf = await proposalPdf(demoPaper(harrowBank, { document, nights: [await night(zones)] }));
    expect(toldOn(pdf, 2)).toContain(
      'Patio wall and Shed: from sunset until 23:00. Front walk: from 19:30 until 30 minutes before sunrise. The picture shows them all on.',
    );
  }, 60_000);

  it('tells lux alone where the company works in metres', async () => {
    const metric = { ...document, units: 'metric', region: 'eu' } as const;
    const nights = [await night([zone!], { whiteLux: 62.25 })];
    const page = toldOn(await proposalPdf(demoPaper(harrowBank, { document: metric, nights })), 2);
    expect(page).toContain('under 62.3 lux');
    expect(page).not.toContain('foot-candles');
  }, 60_000);

  it('tells what was approved of a signed one', async () => {
    const signature = evidenceFor(document, ['tree', 'bed']);
    const nights = [await night([zone!])];
    const page = toldOn(await proposalPdf(demoPaper(harrowBank, { document, signature, nights })), 2);
    expect(page).toContain(
      'Lit as approved: the lights that are always in, “The old tree” and “Along the bed”.',
    );
    expect(page).not.toContain('Not shown');
  }, 60_000);

  it.each([
    ['wide', 4000, 500],
    ['high', 500, 4000],
    ['square', 900, 900],
  ])(
    'holds a %s picture and the words of many zones within its margins',
    async (_shape, widthPx, heightPx) => {
      const many = Array.from({ length: 60 }, (_, i) => ({
        ...zone!,
        id: `z${i}`,
        name: `Zone ${i} ${'along the drive '.repeat(6)}`,
        schedule: clock(`${String(i % 24).padStart(2, '0')}:15`),
      }));
      const sources = many.map(({ id }, i) => ({ ...lit!.sources[i % lit!.sources.length]!, zoneId: id }));
      const nights = [await night(many, { widthPx, heightPx, sources })];
      const pdf = await proposalPdf(demoPaper(harrowBank, { document, nights }));
      const text = textOf(pdf);
      for (const { id, groupId } of sources.map(({ groupId }, i) => ({ id: i, groupId })))
        if (groupId !== 'bed') expect(text).toContain(`Zone ${id} along`);
      expect(flat(pagesOf(pdf)[1]!)).toContain('At night: Rear garden');
      expectWithinMargins(pdf);
      expectApart(pdf);
    },
    60_000,
  );
});

describe('what nobody would write on purpose', () => {
  const evil = `👨‍👩‍👧‍👦 שלום \u202e\u0000\u0007 e\u0301 ${'W'.repeat(10_000)} \ud83d end`;

  it('flows and shows what the face has no sign for', async () => {
    const document = demoDocument(harrowBank);
    const nasty: RevisionDocument = {
      ...document,
      company: { ...document.company, name: evil.slice(0, 400), licence: evil.slice(0, 200) },
      client: { name: evil, email: evil.slice(0, 300), phone: evil.slice(0, 100), address: evil },
      job: { ...document.job, name: evil, property: evil.slice(0, 200) },
      lights: document.lights.map((light) => ({
        ...light,
        name: evil.slice(0, 500),
        tag: `${light.tag} ${evil.slice(0, 90)}`,
      })),
      words: { ...document.words, terms: `${evil}\n\n\n${evil}` },
      acceptedFaults: document.acceptedFaults.map((fault) => ({ ...fault, reason: evil })),
      price: {
        ...document.price,
        discountName: evil.slice(0, 100),
        lines: document.price.lines.map((line) => ({ ...line, name: evil.slice(0, 300) })),
        groups: document.price.groups.map((group) => ({ ...group, name: evil.slice(0, 120) })),
      },
    };
    const pdf = await withoutPictures(nasty);
    const pages = pagesOf(pdf);
    expect(pages.join('')).toContain('□□□□ □□□□');
    expect(pages.at(-1)).toContain(`Page ${pages.length} of ${pages.length}`);
    expectWithinMargins(pdf);
    expectApart(pdf);
    // The word is there in full, broken over lines: in the terms twice, and elsewhere.
    expect(pages.join('').split('W').length).toBeGreaterThan(40_000);
    // Letter and number stand on the plan in place of the long name.
    expect(wordsOf(pdf).some(({ text }) => text === 'P5')).toBe(true);
  }, 120_000);

  it('writes a currency that the face has no sign for by its code', async () => {
    const document = { ...demoDocument(harrowBank), currency: 'ILS', locale: 'he-IL' };
    const text = textOf(await withoutPictures(document));
    expect(text).toMatch(/ILS.\d,\d{3}\.\d\d/);
    expect(text).toContain('2026-05-04');
    expect(text).not.toContain('□');
  }, 60_000);

  it('has room for 500 fixtures and 300 lines', async () => {
    const plan = manyFixtures(500);
    const document = documentOf(plan, { name: 'A park', on: /^P[1-9]$/, off: /^P1\d$/ });
    const [line] = document.price.lines;
    const lines = Array.from({ length: 300 }, (_, i) => ({
      ...line!,
      key: `line ${i}`,
      groupId: null,
      name: `Line number ${i}`,
      quantity: 7,
      unit: 'each' as const,
      priceMinor: 1000 + i,
    }));
    const pdf = await withoutPictures({ ...document, price: { ...document.price, lines } });
    const text = textOf(pdf);
    const wanted = [
      ...[...recordsOf(plan, 'fixture')].map((fixture) => `${labelOf(fixture, plan)} Copper path light`),
      ...lines.map(({ name, priceMinor }) => `${name} 7 ${money(priceMinor)}`),
    ];
    expect(wanted.filter((words) => !text.includes(words))).toEqual([]);
    const pages = pagesOf(pdf);
    // The heads stand again on every page that the schedule goes on to.
    const schedule = pages.filter((page) => /P\d+ +Copper/.test(page));
    expect(schedule.length).toBeGreaterThan(8);
    for (const page of schedule) expect(page).toMatch(/Tag +Fixture +Quantity/);
    expectWithinMargins(pdf);
  }, 120_000);
});

/** The content of all streams that are not pictures or fonts. */
function contentOf(pdf: Buffer): string {
  const text = pdf.toString('latin1');
  return [...text.matchAll(/stream\n/g)]
    .map(({ index }) => {
      try {
        return inflateSync(pdf.subarray(index + 'stream\n'.length)).toString('latin1');
      } catch {
        return '';
      }
    })
    .join('\n');
}

/** The plan with other ids, so that it can stand beside another. */
function renamed(plan: PlanDocument): PlanDocument {
  const text = JSON.stringify([...plan.values()])
    .replaceAll('"demo-', '"other-')
    .replaceAll('"sheet"}', '"sheet-2"}')
    .replaceAll('"sheetId":"sheet"', '"sheetId":"sheet-2"')
    .replaceAll('"id":"sheet"', '"id":"sheet-2"');
  return planOf(JSON.parse(text));
}

function manyFixtures(count: number): PlanDocument {
  const plan = drawDemo(sandpiperRow);
  const [first] = [...recordsOf(plan, 'fixture')].filter((fixture) => labelOf(fixture, plan) === 'P1');
  const records = [...plan.values()].filter(({ kind }) => kind !== 'fixture' && kind !== 'cable');
  const fixtures = Array.from({ length: count }, (_, i) => ({
    ...first!,
    id: `many-${i}`,
    number: i + 1,
    at: { x: 300 + (i % 20) * 80, y: 400 + Math.floor(i / 20) * 100 },
  }));
  return planOf([...records, ...fixtures]);
}
