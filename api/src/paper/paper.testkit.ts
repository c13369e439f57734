import { execFileSync } from 'node:child_process';
import { createHash } from 'node:crypto';
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import type { CatalogueItem } from '@lampwright/geometry/catalogue';
import {
  defaultSettings,
  initialOf,
  itemOf,
  labelOf,
  PLAN_SCHEMA_VERSION,
  type PlanDocument,
  planOf,
  recordsOf,
} from '@lampwright/geometry/plan';
import {
  emptyPricing,
  type ItemPrice,
  type JobPricing,
  type PriceBook,
  quoteOf,
  scheduleOf,
  usualPriceBook,
} from '@lampwright/geometry/price';
import { PlanBuilder } from '../demo/plan-builder.js';
import { drawHarrowBank, HARROW_BANK_SHEET } from '../demo/plans/harrow-bank.js';
import { drawSandpiperRow, SANDPIPER_ROW_SHEET } from '../demo/plans/sandpiper-row.js';
import { starterCatalogue } from '../modules/catalogue/starter/index.js';
import { nightScenesOf } from '../modules/proposals/night.js';
import { nightPicture } from '../modules/proposals/night-pictures.js';
import type { RevisionDocument } from '../modules/proposals/revision-document.js';
import type { MoneyDocument } from './money-document.js';
import type { NightPicture } from './night-picture.js';
import type { ProposalPaper } from './proposal-pdf.js';
import type { SignatureEvidence } from './signature.js';

/** Proposals of the demo plans with invented prices, and reading of finished PDFs with poppler's programs. */

const file = (name: string) => fileURLToPath(new URL(`../demo/files/${name}`, import.meta.url));

const entryId = (index: number) => `00000000-0000-4000-8000-${String(index).padStart(12, '0')}`;
const entries = new Map(starterCatalogue.map((item, index) => [entryId(index + 1), item]));

const catalogue = (name: string) => {
  for (const [sourceId, item] of entries) if (item.name === name) return { sourceId, item };
  throw new Error(`The starter catalogue has no "${name}".`);
};

const perFoot = (item: CatalogueItem) =>
  item.category === 'cable' || (item.category === 'part' && item.use === 'conduit');

const prices = new Map<string, ItemPrice>(
  [...entries].map(([id, item], index) => [
    id,
    {
      costMinor: null,
      priceMinor: perFoot(item) ? 31_000 : 1999 + 317 * index,
      per: perFoot(item) ? 250 : 1,
      unit: perFoot(item) ? 'foot' : 'each',
      increment: perFoot(item) ? 10 : 1,
      taxable: true,
      supplier: '',
      orderNumber: '',
    },
  ]),
);

const usual = usualPriceBook('us');
const book: PriceBook = {
  ...usual,
  rates: {
    ...usual.rates,
    perFixture: Object.fromEntries(
      Object.keys(usual.rates.perFixture).map((kind) => [kind, 4200]),
    ) as PriceBook['rates']['perFixture'],
    perTrenched: 250,
    perBored: 900,
    perTransformer: 18_000,
    perTreeMount: 9000,
    perAimingVisit: 12_500,
  },
  overheadPercent: 12,
  labour: { by: 'markup', percent: 40 },
  taxes: [
    {
      id: 'sales',
      name: 'Sales tax',
      jurisdiction: 'Marlow Bend',
      percent: 6.625,
      onMaterials: true,
      onLabour: false,
    },
  ],
  defaultTaxId: 'sales',
  stages: [
    { id: 'deposit', name: 'Deposit', due: 'approval', percent: 30 },
    { id: 'progress', name: 'Materials on site', due: 'start', percent: 30 },
    { id: 'final', name: 'Balance', due: 'finish', percent: 40 },
  ],
};

const SHEET_ID = 'sheet';

export interface DemoPlan {
  readonly name: string;
  readonly sheet: typeof HARROW_BANK_SHEET | typeof SANDPIPER_ROW_SHEET;
  draw(plan: PlanBuilder): void;
  /** Labels by group that is taken, and by group that is only offered. */
  readonly on: RegExp;
  readonly off: RegExp;
}

export const harrowBank: DemoPlan = {
  name: 'Harrow Bank',
  sheet: HARROW_BANK_SHEET,
  draw: drawHarrowBank,
  on: /^U[78]$/,
  off: /^U[1-4]$/,
};
export const sandpiperRow: DemoPlan = {
  name: 'Sandpiper Row',
  sheet: SANDPIPER_ROW_SHEET,
  draw: drawSandpiperRow,
  on: /^P[1-5]$/,
  off: /^U[89]$|^U1\d$/,
};

export function drawDemo(demo: DemoPlan): PlanDocument {
  const start = planOf([
    defaultSettings('us'),
    {
      kind: 'sheet',
      id: SHEET_ID,
      name: demo.sheet.view === 'photo' ? 'Rear garden' : 'Plot plan',
      order: 0,
      ...demo.sheet,
      pixelsPerPaperMeter: demo.sheet.view === 'plan' ? 200 / 0.0254 : null,
      references: [],
      groundMetersPerPaperMeter: null,
      whiteLux: null,
    },
  ]);
  const builder = new PlanBuilder(start, SHEET_ID, catalogue, 'demo');
  demo.draw(builder);
  return builder.plan;
}

/** The proposal of a demo plan, as it would be frozen. */
export function demoDocument(demo: DemoPlan): RevisionDocument {
  return documentOf(drawDemo(demo), demo);
}

/** The proposal of any plan: groups by labels, lines with prices, and all the words. */
export function documentOf(
  plan: PlanDocument,
  { name, on, off }: Pick<DemoPlan, 'name' | 'on' | 'off'>,
): RevisionDocument {
  const members: Record<string, string> = {};
  for (const fixture of recordsOf(plan, 'fixture')) {
    const label = labelOf(fixture, plan);
    if (on.test(label)) members[fixture.id] = 'tree';
    if (off.test(label)) members[fixture.id] = 'bed';
  }
  const pricing: JobPricing = {
    ...emptyPricing,
    groups: [
      {
        id: 'tree',
        name: 'The old tree',
        description: 'Light up through the crown, warm and low.',
        on: true,
      },
      { id: 'bed', name: 'Along the bed', description: 'A soft row of light behind the shrubs.', on: false },
    ],
    members,
    discount: { kind: 'percent', percent: 5, name: 'Early booking' },
  };
  const quote = quoteOf(plan, {
    catalogue: entries,
    prices,
    book,
    pricing,
    currency: 'USD',
    system: 'imperial',
  });
  const schedule = new Map(scheduleOf(plan).map((row) => [row.recordId, row]));
  return {
    form: 1,
    number: 1042,
    revision: 2,
    changes: null,
    madeAt: '2026-05-04T16:20:11.000Z',
    validUntil: '2026-06-03',
    currency: 'USD',
    locale: 'en-US',
    region: 'us',
    units: 'imperial',
    company: {
      name: 'Fernhollow Outdoor Lighting',
      email: 'hello@fernhollow.example',
      phone: '555-0142',
      address: '12 Mill Lane, Marlow Bend',
      licence: 'MB-LV 20817',
    },
    client: {
      name: 'Odette Marsh',
      email: 'odette@example.com',
      phone: '555-0177',
      address: '4 Harrow Bank, Marlow Bend',
    },
    job: { id: '5b0b8f6e-7f3f-4a36-9d5b-1a0c8f1f7a10', name: `${name}, garden lighting`, property: name },
    plan: { version: 41, schema: PLAN_SCHEMA_VERSION, records: [...plan.values()] },
    sheets: [...recordsOf(plan, 'sheet')].map(({ id, name: sheetName, view, widthPx, heightPx }) => ({
      id,
      name: sheetName,
      view,
      widthPx,
      heightPx,
    })),
    lights: [...recordsOf(plan, 'fixture')].map((fixture) => {
      const row = schedule.get(fixture.id);
      return {
        recordId: fixture.id,
        sheetId: fixture.sheetId,
        ...fixture.at,
        tag: labelOf(fixture, plan),
        initial: initialOf(plan, fixture),
        kind: itemOf(plan, fixture.itemId, 'fixture')?.kind ?? '',
        name: itemOf(plan, fixture.itemId, 'fixture')?.name ?? '',
        lights: '',
        quantity: fixture.quantity,
        groupId: members[fixture.id] ?? null,
        technical: {
          volts: 11.4,
          watts: row?.watts ?? null,
          lumens: row?.lumens ?? null,
          beamDegrees: row?.beamDegrees ?? null,
          cctKelvin: row?.cctKelvin ?? null,
        },
      };
    }),
    evening: { place: { latitude: 40.1, longitude: -74.9 }, timeZone: 'America/New_York' },
    price: {
      groups: quote.groups,
      lines: quote.lines.map(({ key, groupId, section, kind, name: line, quantity, unit, priceMinor }) => ({
        key,
        groupId,
        section,
        kind,
        name: line,
        quantity,
        unit,
        priceMinor,
      })),
      discountName: quote.discountName,
      tax: quote.tax,
      stages: book.stages,
      combinations: quote.combinations.map((totals) => ({ ...totals, offerable: true, reason: '' })),
    },
    words,
    cautions: [
      'Line-voltage work belongs to a licensed electrician.',
      'Outdoor outlets are GFCI-protected and have an in-use cover.',
      'Hot lamps keep clear of mulch and leaves.',
    ],
    acceptedFaults: [
      {
        message: 'P5 is dim: 9.8 V, below the 10.5 V that its lamp is rated for.',
        reason: 'The client keeps the halogen lamps this year and knows the last ones are weaker.',
        by: 'Ines Calder',
        at: '2026-05-03T09:00:00.000Z',
      },
    ],
  };
}

const words: RevisionDocument['words'] = {
  scope:
    'We supply and install the lights of the schedule, with cable, splices, transformer and control.\n\nWe aim every light after dark together with you.',
  exclusions: 'Line-voltage work, a new outlet, repairs to irrigation that was not marked.',
  timeline: 'Work begins within three weeks of approval and takes two days, and one evening for aiming.',
  locate: 'We book the utility locate before we dig. Please mark private lines: irrigation, gas, pet fence.',
  warranty: 'Five years on fixtures and transformer, two years on lamps and our work.',
  terms: 'Payment by stages as listed.\n\nChanges after approval are agreed in writing as a change order.',
  cancellation: 'You may cancel within three business days of approval without giving a reason.',
};

export const hashOf = (document: RevisionDocument): string =>
  createHash('sha256').update(JSON.stringify(document)).digest('hex');

let plotPlan: Buffer | undefined;

/** The stored picture of a demo plan's sheet. */
export function demoPicture(demo: DemoPlan): Buffer {
  if (demo.sheet.view === 'photo') return readFileSync(file('yard-photo.jpg'));
  plotPlan ??= inFolder((folder) => {
    const drawn = join(folder, 'plan');
    execFileSync('pdftoppm', ['-r', '200', '-png', '-singlefile', file('plot-plan.pdf'), drawn]);
    return readFileSync(`${drawn}.png`);
  });
  return plotPlan;
}

/** The demo plan's sheet by night, with the groups as offered. */
export async function demoNight(demo: DemoPlan, document: RevisionDocument): Promise<NightPicture> {
  const [scene] = nightScenesOf({ pictures: { [SHEET_ID]: 'kept.jpg' } }, document);
  if (!scene) throw new Error(`${demo.name} has no scale.`);
  const taken = new Set(document.price.combinations[0]?.groups);
  return { scene, picture: await nightPicture(demoPicture(demo), scene, taken) };
}

/** What `proposalPdf` takes, of a demo plan with its picture. */
export function demoPaper(demo: DemoPlan, changes: Partial<ProposalPaper> = {}): ProposalPaper {
  const document = changes.document ?? demoDocument(demo);
  return {
    document,
    hash: hashOf(document),
    pictures: new Map([[SHEET_ID, demoPicture(demo)]]),
    nights: [],
    signature: null,
    ...changes,
  };
}

/** An approval of the combination with these groups. */
export function evidenceFor(document: RevisionDocument, groups: readonly string[]): SignatureEvidence {
  const combination = document.price.combinations.find(
    (one) => one.groups.length === groups.length && groups.every((id) => one.groups.includes(id)),
  );
  if (!combination) throw new Error(`There is no combination of ${groups.join(', ')}.`);
  const { offerable: _o, reason: _r, ...totals } = combination;
  return {
    typedName: 'Odette Marsh',
    agreedTo: 'I approve this proposal at the total shown, and agree to its terms.',
    consentedTo: 'I agree to sign and to receive records electronically.',
    approvedAt: '2026-05-06T19:04:32.000Z',
    address: '203.0.113.24',
    userAgent: 'Mozilla/5.0 (a phone of a test)',
    revisionHash: hashOf(document),
    pdfHash: 'c0ffee'.padEnd(64, '0'),
    groups: [...groups],
    totals,
  };
}

/** An invoice, receipt or refund of the deposit of a demo proposal. */
export function demoMoneyDocument(kind: MoneyDocument['kind']): MoneyDocument {
  const { company, client, job, currency, locale, region, number, revision } = demoDocument(harrowBank);
  return {
    form: 1,
    kind,
    number: 318,
    date: '2026-05-06',
    currency,
    locale,
    region,
    company,
    client,
    jobName: job.name,
    proposal: { number, revision },
    lines: [
      { name: 'Deposit, 30% of the total', amountMinor: 261_526 },
      { name: 'Change order 1', amountMinor: 41_250 },
    ],
    taxNote: 'Of this, $134.80 is sales tax (Marlow Bend).',
    totalMinor: 302_776,
    paidMinor: kind === 'invoice' ? 0 : 302_776,
    outstandingMinor: kind === 'invoice' ? 871_754 : 568_978,
    received: kind === 'invoice' ? null : { method: 'card', on: '2026-05-06' },
    terms: 'Please quote the number of this document with any question.',
  };
}

function inFolder<T>(work: (folder: string) => T): T {
  const folder = mkdtempSync(join(tmpdir(), 'lampwright-paper-'));
  try {
    return work(folder);
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}

function poppler(program: string, pdf: Buffer, before: string[] = [], after: string[] = []): string {
  return inFolder((folder) => {
    const path = join(folder, 'paper.pdf');
    writeFileSync(path, pdf);
    return execFileSync(program, [...before, path, ...after], {
      encoding: 'utf8',
      maxBuffer: 64 * 1024 * 1024,
    });
  });
}

/** The text of a PDF, a string a page. */
export const pagesOf = (pdf: Buffer): string[] =>
  poppler('pdftotext', pdf, ['-layout'], ['-']).split('\f').slice(0, -1);

/** The text of one page, from 1, as it was written: column after column. */
export const toldOn = (pdf: Buffer, page: number): string =>
  poppler('pdftotext', pdf, ['-raw', '-f', String(page), '-l', String(page)], ['-']).replace(/\s+/g, ' ');

/** The pictures of a PDF, page by page, and how fine they are printed. */
export const imagesOf = (pdf: Buffer): { readonly page: number; readonly dotsPerInch: number }[] =>
  poppler('pdfimages', pdf, ['-list'])
    .split('\n')
    .slice(2)
    .filter((line) => line.trim() !== '')
    .map((line) => {
      const cells = line.trim().split(/\s+/);
      return { page: Number(cells[0]), dotsPerInch: Number(cells[12]) };
    });

/** What pdfinfo tells, by its labels. */
export const infoOf = (pdf: Buffer): Map<string, string> =>
  new Map(
    poppler('pdfinfo', pdf)
      .split('\n')
      .flatMap((line) => {
        const at = line.indexOf(':');
        return at < 0 ? [] : [[line.slice(0, at), line.slice(at + 1).trim()] as const];
      }),
  );

export const fontsOf = (pdf: Buffer): string => poppler('pdffonts', pdf);

export interface PlacedWord {
  readonly text: string;
  readonly page: { readonly number: number; readonly width: number; readonly height: number };
  /** Points from the upper left corner of the page. */
  readonly xMin: number;
  readonly yMin: number;
  readonly xMax: number;
  readonly yMax: number;
}

/** Every word of a PDF with the box that it fills. */
export function wordsOf(pdf: Buffer): PlacedWord[] {
  const html = poppler('pdftotext', pdf, ['-bbox'], ['-']);
  const words: PlacedWord[] = [];
  html.split('<page ').forEach((part, number) => {
    const size = /^width="([\d.]+)" height="([\d.]+)"/.exec(part);
    if (!size) return;
    const page = { number, width: Number(size[1]), height: Number(size[2]) };
    for (const [, xMin, yMin, xMax, yMax, text = ''] of part.matchAll(
      /<word xMin="([\d.-]+)" yMin="([\d.-]+)" xMax="([\d.-]+)" yMax="([\d.-]+)">(.*?)<\/word>/gs,
    ))
      words.push({
        text,
        page,
        xMin: Number(xMin),
        yMin: Number(yMin),
        xMax: Number(xMax),
        yMax: Number(yMax),
      });
  });
  return words;
}
