import { usualPriceBook } from '@lampwright/geometry/price';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { startTestApp, type TestApp } from '../../../test/harness.js';
import type { TestPerson } from '../../../test/people.js';
import { catalogueImports, cataloguePrices } from '../../database/schema/index.js';
import { addPricedCompany, editBook, itemPrice, type PricedCompany } from './pricing.testkit.js';

/** Found nowhere by chance. */
const COST = 713_579;

let test: TestApp;
beforeAll(async () => {
  test = await startTestApp();
});
afterAll(() => test?.close());

describe('the price book', () => {
  let company: PricedCompany;
  beforeAll(async () => {
    company = await addPricedCompany(test);
  });

  it('begins as the usual one of the region, saved by nobody, without rates or markup', async () => {
    const { agent } = await test.signUp();
    const { body } = await agent.get('/api/price-book').expect(200);
    expect(body).toEqual({ version: 0, book: usualPriceBook('us'), currency: 'USD' });
    await agent.patch('/api/company').send({ region: 'uk' }).expect(200);
    const moved = (await agent.get('/api/price-book').expect(200)).body;
    expect(moved).toEqual({ version: 0, book: usualPriceBook('uk'), currency: 'GBP' });
  });

  it('is saved on top of the version it was made from, and told where it is at another', async () => {
    const { agent } = company.owner;
    const { body: first } = await agent.get('/api/price-book').expect(200);
    const mine = { ...first.book, overheadPercent: 12 };
    const saved = await agent.put('/api/price-book').send({ baseVersion: 0, book: mine }).expect(200);
    expect(saved.body).toEqual({ version: 1, book: mine, currency: 'USD' });
    for (const baseVersion of [0, 2]) {
      const late = await agent
        .put('/api/price-book')
        .send({ baseVersion, book: { ...mine, overheadPercent: 99 } })
        .expect(409);
      expect(late.body).toMatchObject({ code: 'price-book-conflict', version: 1, book: mine });
    }
    const again = await agent.put('/api/price-book').send({ baseVersion: 1, book: mine }).expect(200);
    expect(again.body.version).toBe(2);
    expect((await agent.get('/api/price-book').expect(200)).body).toEqual(again.body);
  });

  it('gets one of two saves at the same moment', async () => {
    const { agent } = (await addPricedCompany(test)).owner;
    const { body: first } = await agent.get('/api/price-book').expect(200);
    const saves = [1, 2, 3].map((overheadPercent) =>
      agent.put('/api/price-book').send({ baseVersion: 0, book: { ...first.book, overheadPercent } }),
    );
    const statuses = (await Promise.all(saves)).map(({ status }) => status);
    expect(statuses.sort()).toEqual([200, 409, 409]);
  });

  it('is refused by pointer where it names what is not there', async () => {
    const { agent } = company.owner;
    const other = await addPricedCompany(test);
    const { body } = await agent.get('/api/price-book').expect(200);
    const parts = {
      ...body.book.parts,
      conduit: other.items.get('Conduit, 20 mm (¾ in)'),
      'tree-mount': company.items.get('Surface mount, brass'),
    };
    const tax = { id: 't', name: 'Tax', jurisdiction: '', percent: 5, onMaterials: true, onLabour: false };
    const answer = await agent
      .put('/api/price-book')
      .send({
        baseVersion: body.version,
        book: { ...body.book, parts, taxes: [tax, tax], defaultTaxId: 'none', locale: 'en-ab12' },
      })
      .expect(400);
    expect(answer.body.errors.map(({ pointer }: { pointer: string }) => pointer).sort()).toEqual([
      '/book/defaultTaxId',
      '/book/locale',
      '/book/parts/conduit',
      '/book/parts/tree-mount',
      '/book/taxes/1/id',
    ]);
  });

  it('is for the owner, and for designers where the owner says so', async () => {
    const told = await company.designer.agent.get('/api/price-book').expect(403);
    expect(told.body.detail).toContain('for the owner’s eyes');
    await company.crew.agent.get('/api/price-book').expect(403);
    const { book } = await editBook(company.owner.agent, (b) => ({ ...b, designersSeeCosts: true }));
    const seen = await company.designer.agent.get('/api/price-book').expect(200);
    expect(seen.body.book).toEqual(book);
    const version = seen.body.version;
    await company.designer.agent.put('/api/price-book').send({ baseVersion: version, book }).expect(403);
    await company.crew.agent.get('/api/price-book').expect(403);
    await editBook(company.owner.agent, (b) => ({ ...b, designersSeeCosts: false }));
    await company.designer.agent.get('/api/price-book').expect(403);
  });
});

describe('prices of catalogue items', () => {
  let company: PricedCompany;
  let lamp: string;
  const set = ({ agent }: TestPerson, itemId: string, edit: Parameters<typeof itemPrice>[0]) =>
    agent.put(`/api/catalogue/${itemId}/price`).send({ price: itemPrice(edit) });
  const historyOf = async ({ agent }: TestPerson, itemId = lamp) =>
    (await agent.get(`/api/catalogue/${itemId}/prices`).expect(200)).body.items;

  beforeAll(async () => {
    company = await addPricedCompany(test);
    lamp = company.items.get('LED lamp G4, 2 W') ?? '';
    const secret = { supplier: 'Marlow Wholesale', orderNumber: 'MW-4711' };
    await set(company.owner, lamp, { costMinor: COST, priceMinor: 900_000, ...secret }).expect(200);
  });

  it('are each kept: the newest holds, the others are history', async () => {
    const { body } = await set(company.owner, lamp, { costMinor: COST + 1 }).expect(200);
    expect(body).toMatchObject({ currency: 'USD', locale: 'en-US', seesCosts: true });
    expect(body.items).toEqual([
      { itemId: lamp, price: itemPrice({ costMinor: COST + 1 }), since: expect.any(String) },
    ]);
    const items = await historyOf(company.owner);
    expect(items.map(({ price }: { price: { costMinor: number } }) => price.costMinor)).toEqual([
      COST + 1,
      COST,
    ]);
    const names = new Set(items.map(({ by }: { by: string }) => by));
    expect(names.size).toBe(1);
    expect(items[0]).toMatchObject({ by: expect.stringMatching(/^Someone \d+$/), importedFrom: null });
  });

  it('get no new row for what was the same before', async () => {
    const before = await historyOf(company.owner);
    await set(company.owner, lamp, { costMinor: COST + 1 }).expect(200);
    expect(await historyOf(company.owner)).toEqual(before);
  });

  it('tell the file that they came from', async () => {
    const itemId = company.items.get('LED lamp G4, 3 W') ?? '';
    const { companyId } = company;
    const { queries } = test.database;
    const [imported] = await queries
      .insert(catalogueImports)
      .values({ companyId, fileName: 'spring prices.csv', summary: {}, undo: {} })
      .returning();
    await queries
      .insert(cataloguePrices)
      .values({ companyId, itemId, price: itemPrice(), importId: imported!.id });
    expect(await historyOf(company.owner, itemId)).toMatchObject([
      { by: '', importedFrom: 'spring prices.csv' },
    ]);
  });

  it('show designers no cost, supplier or order number unless the owner lets them', async () => {
    const { agent } = company.designer;
    await set(company.owner, lamp, {
      costMinor: COST,
      priceMinor: 900_000,
      supplier: 'Marlow Wholesale',
      orderNumber: 'MW-4711',
    }).expect(200);
    for (const path of ['/api/catalogue-prices', `/api/catalogue/${lamp}/prices`]) {
      const { text, body } = await agent.get(path).expect(200);
      for (const hidden of [`${COST}`, 'Marlow Wholesale', 'MW-4711']) expect(text).not.toContain(hidden);
      const priced = body.items.find(
        ({ price }: { price: { priceMinor: number } }) => price.priceMinor === 900_000,
      );
      expect(priced.price).toEqual(itemPrice({ costMinor: null, priceMinor: 900_000 }));
    }
    const refused = await set(company.designer, lamp, { costMinor: 1 }).expect(403);
    expect(refused.body.detail).toContain('who see costs');
    await editBook(company.owner.agent, (b) => ({ ...b, designersSeeCosts: true }));
    const { body } = await set(company.designer, lamp, { costMinor: COST + 2 }).expect(200);
    expect(body.seesCosts).toBe(true);
    expect(JSON.stringify(body)).toContain(`${COST + 2}`);
    await editBook(company.owner.agent, (b) => ({ ...b, designersSeeCosts: false }));
  });

  it('are nothing to the crew', async () => {
    const { crew } = company;
    await crew.agent.get('/api/catalogue-prices').expect(403);
    await crew.agent.get(`/api/catalogue/${lamp}/prices`).expect(403);
    await set(crew, lamp, {}).expect(403);
  });

  it('belong to one company', async () => {
    const other = await addPricedCompany(test);
    await set(other.owner, lamp, {}).expect(404);
    await other.owner.agent.get(`/api/catalogue/${lamp}/prices`).expect(404);
    const { body } = await other.owner.agent.get('/api/catalogue-prices').expect(200);
    expect(body.items).toEqual([]);
  });
});
