import { buffer } from 'node:stream/consumers';
import sharp from 'sharp';
import { afterAll, beforeAll, expect, it, vi } from 'vitest';
import type { TestApp } from '../../../test/harness.js';
import { PrepareProposal } from '../../jobs/prepare-proposal.js';
import { pagesOf, toldOn } from '../../paper/paper.testkit.js';
import { ObjectStorage } from '../../ports/storage/storage.js';
import { addPricedCompany, type PricedCompany } from '../pricing/pricing.testkit.js';
import { copyProposal, freezeReady, handlerOf, startShareTest } from '../share/share.testkit.js';
import { NightPictures } from './night-pictures.js';
import { nightKeyOf } from './pictures.js';
import { ProposalStore, picturesOf, type ShownRevision } from './proposal-store.js';

// Pictures are rendered here: on a busy machine that takes its time.
vi.setConfig({ testTimeout: 120_000, hookTimeout: 180_000 });

let test: TestApp;
let company: PricedCompany;
let sheetId: string;
let shown: ShownRevision;

beforeAll(async () => {
  test = await startShareTest();
  company = await addPricedCompany(test);
  const { job, revisionId } = await freezeReady(test, company);
  sheetId = job.sheetId;
  shown = await revisionOf(revisionId);
});
afterAll(() => test?.close());

const storage = () => test.app.get(ObjectStorage, { strict: false });
const nights = () => test.app.get(NightPictures, { strict: false });

async function revisionOf(revisionId: string): Promise<ShownRevision> {
  const found = await test.app.get(ProposalStore, { strict: false }).revision(company.companyId, revisionId);
  return found!;
}

async function stored(key: string): Promise<Buffer | null> {
  const object = await storage().get(key);
  return object && buffer(object.stream);
}

const keyOf = ({ row }: ShownRevision) => picturesOf(row).get(sheetId)!;
const dayOf = async (one: ShownRevision) => new Map([[sheetId, (await stored(keyOf(one)))!]]);
const pdfOf = async ({ row }: ShownRevision) => (await stored(row.pdfKey!))!;

/** Sheet pixels of a light of the plan, 100 to the metre; and how bright a picture is about there. */
async function brightnessAt(picture: Buffer, [x, y]: readonly [number, number]): Promise<number> {
  const { width = 0 } = await sharp(picture).metadata();
  const scale = width / 2400;
  const region = {
    left: Math.round((x - 40) * scale),
    top: Math.round((y - 40) * scale),
    width: Math.round(80 * scale),
    height: Math.round(80 * scale),
  };
  const { channels } = await sharp(await sharp(picture).extract(region).toBuffer()).stats();
  return channels.reduce((sum, { mean }) => sum + mean, 0) / channels.length;
}

it('are kept beside the day picture, in the dark but for the lights as offered, and are in the PDF', async () => {
  const night = await stored(nightKeyOf(keyOf(shown)));
  const [day] = (await dayOf(shown)).values();
  const { format, width, height } = await sharp(night!).metadata();
  expect({ format, width, height }).toEqual({ format: 'jpeg', width: 1600, height: 1200 });
  const dark = await brightnessAt(night!, [2000, 1500]);
  expect(dark).toBeLessThan((await brightnessAt(day!, [2000, 1500])) / 2);
  expect(await brightnessAt(night!, [300, 100])).toBeGreaterThan(dark * 1.5);
  // The third light is offered apart, and not taken.
  expect(await brightnessAt(night!, [700, 100])).toBeLessThan((await brightnessAt(night!, [300, 100])) * 0.9);
  const page = toldOn(await pdfOf(shown), 2);
  expect(page).toContain('At night: ');
  expect(page).toContain('Artist’s impression');
});

it('are the same for a signed copy of what was offered, and show what else was approved', async () => {
  const day = await dayOf(shown);
  const night = await stored(nightKeyOf(keyOf(shown)));
  const [same] = await nights().asApproved(shown, day, []);
  expect(same?.picture.equals(night!)).toBe(true);
  const [more] = await nights().asApproved(shown, day, ['more']);
  expect(await brightnessAt(more!.picture, [700, 100])).toBeGreaterThan(
    (await brightnessAt(night!, [700, 100])) * 1.1,
  );
  expect((await stored(nightKeyOf(keyOf(shown))))!.equals(night!)).toBe(true);
});

it('are not in the signed copy of a revision that was offered without any', async () => {
  const key = 'older/sheet.jpg';
  const day = await dayOf(shown);
  await storage().put(key, day.get(sheetId)!, 'image/jpeg');
  const older = { ...shown, row: { ...shown.row, pictures: { [sheetId]: key } } };
  expect(await nights().asApproved(older, day, ['more'])).toEqual([]);
  expect(await stored(nightKeyOf(key))).toBeNull();
});

it('are left out where none can be made, and the proposal goes without', async () => {
  const broken = new Map([[sheetId, Buffer.from('no picture at all')]]);
  expect(await nights().keep(shown, broken)).toEqual([]);
  // Without a scale there is nothing to work it out from.
  const document = JSON.parse(shown.row.document) as ShownRevision['document'];
  const records = document.plan.records.map((record) =>
    record.kind === 'sheet' ? { ...record, references: [], pixelsPerPaperMeter: null } : record,
  );
  const { revisionId } = await copyProposal(test, company.designer, shown.row.id, {
    document: JSON.stringify({ ...document, plan: { ...document.plan, records } }),
    status: 'preparing',
    progress: 0,
    pdfKey: null,
    pdfHash: null,
    pictures: {},
  });
  const prepare = await handlerOf(test, PrepareProposal);
  await prepare.handle({ companyId: company.companyId, revisionId });
  const made = await revisionOf(revisionId);
  expect(made.row).toMatchObject({ status: 'ready', progress: 100, failure: null });
  expect(await stored(nightKeyOf(keyOf(made)))).toBeNull();
  expect(pagesOf(await pdfOf(made)).join()).not.toContain('At night');
});
