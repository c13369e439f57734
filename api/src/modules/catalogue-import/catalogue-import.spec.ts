import ExcelJS from 'exceljs';
import Papa from 'papaparse';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { startTestApp, type TestApp } from '../../../test/harness.js';
import { addCompany, addPerson, type TestPerson } from '../../../test/people.js';
import { buildDecodingChild } from '../../media/media.testkit.js';
import { CatalogueService } from '../catalogue/catalogue.service.js';
import { starterCatalogue } from '../catalogue/starter/index.js';
import type { Preview, Table } from './catalogue-import.dto.js';

describe('tables of the catalogue', () => {
  let test: TestApp;
  beforeAll(async () => {
    await buildDecodingChild();
    test = await startTestApp();
  });
  afterAll(() => test?.close());

  async function people() {
    const company = await addCompany(test);
    await test.app.get(CatalogueService, { strict: false }).seed(company);
    return {
      owner: await addPerson(test, company, 'owner'),
      designer: await addPerson(test, company, 'designer'),
    };
  }
  const read = async ({ agent }: TestPerson, bytes: Buffer | string, name = 'list.csv') => {
    const { body } = await agent
      .post('/api/catalogue/tables')
      .attach('file', Buffer.from(bytes), name)
      .expect(200);
    return body as Table;
  };
  const refused = async ({ agent }: TestPerson, bytes: Buffer | string, status = 400) => {
    const { body } = await agent
      .post('/api/catalogue/tables')
      .attach('file', Buffer.from(bytes), 'x')
      .expect(status);
    return body.detail as string;
  };
  const importOf = ({ fileName, rows, mapping }: Table) => ({
    fileName,
    rows,
    mapping,
    category: null as string | null,
    leftOut: [] as number[],
  });
  const preview = async ({ agent }: TestPerson, body: object) =>
    (await agent.post('/api/catalogue/imports/preview').send(body).expect(200)).body as Preview;
  let key = 0;
  const take = ({ agent }: TestPerson, body: object) => {
    key += 1;
    return agent.post('/api/catalogue/imports').set('Idempotency-Key', `key-${key}`).send(body);
  };
  const catalogue = async ({ agent }: TestPerson) =>
    (await agent.get('/api/catalogue').expect(200)).body.items as {
      id: string;
      item: { name: string; ways?: number };
    }[];
  const prices = async ({ agent }: TestPerson) =>
    (await agent.get('/api/catalogue-prices').expect(200)).body.items as {
      itemId: string;
      price: { costMinor: number; supplier: string };
    }[];

  it('say which rows add, change, leave as it is or fail, and why, before anything happens', async () => {
    const { owner } = await people();
    const table = await read(
      owner,
      [
        'Category,Name,Ways,Net price,SKU',
        'hub,"Buried junction hub, 4-way",5,"12.50",H4',
        'hub,"Buried junction hub, 8-way",8,,',
        'hub,New hub,6,30,H6',
        'hub,Broken hub,many,,',
        'hub,New hub,7,,',
        'gadget,Thing,,,',
      ].join('\n'),
    );
    expect(table.columns).toEqual(['Category', 'Name', 'Ways', 'Net price', 'SKU']);
    expect(table.mapping).toMatchObject({
      category: 0,
      name: 1,
      ways: 2,
      cost: 3,
      orderNumber: 4,
      price: null,
    });
    const before = await catalogue(owner);
    const told = await preview(owner, importOf(table));
    expect(told.rows.map(({ action }) => action)).toEqual([
      'change',
      'same',
      'add',
      'fault',
      'fault',
      'fault',
    ]);
    expect(told).toMatchObject({ added: 1, changed: 1, same: 1, faults: 3 });
    expect(told.rows[0]?.changes).toContainEqual({ field: 'Ways', was: '4', now: '5' });
    expect(told.rows[0]?.changes).toContainEqual({ field: 'Cost', was: '', now: '12.50' });
    expect(told.rows[3]?.faults).toEqual([{ column: 2, detail: 'Ways: “many” is no number.' }]);
    expect(told.rows[4]?.faults[0]?.detail).toBe('Row 3 is about the same item.');
    expect(told.rows[5]?.faults[0]).toMatchObject({ column: 0 });
    expect(await catalogue(owner)).toEqual(before);
    expect(await prices(owner)).toEqual([]);
  });

  it('are taken in once for a key, and undone as one', async () => {
    const { owner } = await people();
    const table = await read(
      owner,
      'Category;Name;Ways;Cost;Supplier\nhub;Buried junction hub, 4-way;5;12.50;Supplier A\nhub;New hub;6;30;\n',
    );
    const before = await catalogue(owner);
    const first = await take(owner, importOf(table)).expect(201);
    key -= 1;
    const again = await take(owner, importOf(table)).expect(201);
    expect(again.body.id).toBe(first.body.id);
    const after = await catalogue(owner);
    expect(after).toHaveLength(before.length + 1);
    const four = after.find(({ item }) => item.name === 'Buried junction hub, 4-way');
    expect(four?.item.ways).toBe(5);
    expect((await prices(owner)).find(({ itemId }) => itemId === four?.id)?.price).toMatchObject({
      costMinor: 1250,
      supplier: 'Supplier A',
    });
    const history = await owner.agent.get(`/api/catalogue/${four?.id}/prices`).expect(200);
    expect(history.body.items[0]).toMatchObject({ importedFrom: 'list.csv' });
    expect((await owner.agent.get('/api/catalogue/imports').expect(200)).body.items).toMatchObject([
      { id: first.body.id, fileName: 'list.csv', undoneAt: null, summary: { added: 1, changed: 1 } },
    ]);

    const undone = await owner.agent.post(`/api/catalogue/imports/${first.body.id}/undo`).expect(200);
    expect(undone.body).toEqual({ kept: [] });
    const content = (list: typeof before) => list.map(({ id, item }) => ({ id, item }));
    expect(content(await catalogue(owner))).toEqual(content(before));
    expect(await prices(owner)).toEqual([]);
    await owner.agent.post(`/api/catalogue/imports/${first.body.id}/undo`).expect(409);
  });

  it('leave what somebody changed since as it is when they are undone', async () => {
    const { owner } = await people();
    const table = await read(owner, 'Category,Name,Ways\nhub,"Buried junction hub, 4-way",5\n');
    const done = await take(owner, importOf(table)).expect(201);
    const four = (await catalogue(owner)).find(({ item }) => item.ways === 5);
    const edited = { item: { category: 'hub', name: 'Our hub', ways: 5 } };
    await owner.agent.put(`/api/catalogue/${four?.id}`).send(edited).expect(200);
    const undone = await owner.agent.post(`/api/catalogue/imports/${done.body.id}/undo`).expect(200);
    expect(undone.body.kept).toEqual(['Buried junction hub, 4-way']);
    expect((await catalogue(owner)).find(({ id }) => id === four?.id)?.item.name).toBe('Our hub');
  });

  it('bring new prices by order number alone, without a category', async () => {
    const { owner } = await people();
    const [entry] = await catalogue(owner);
    const price = {
      costMinor: 1000,
      priceMinor: null,
      per: 1,
      unit: 'each',
      increment: 1,
      taxable: true,
      supplier: 'S',
      orderNumber: 'A-1',
    };
    await owner.agent.put(`/api/catalogue/${entry?.id}/price`).send({ price }).expect(200);
    const table = await read(owner, 'Item no,Net\na-1,"$1,011.00"\nB-2,5\n');
    const told = await preview(owner, importOf(table));
    expect(told.rows.map(({ action, itemId }) => [action, itemId])).toEqual([
      ['change', entry?.id],
      ['fault', null],
    ]);
    await take(owner, importOf(table)).expect(201);
    expect((await prices(owner)).find(({ itemId }) => itemId === entry?.id)?.price).toMatchObject({
      costMinor: 101100,
      supplier: 'S',
    });
  });

  it('come back from an export, as CSV and as XLSX, with nothing to change', async () => {
    const { owner } = await people();
    for (const format of ['csv', 'xlsx']) {
      const file = await owner.agent
        .get(`/api/catalogue/export?format=${format}`)
        .buffer(true)
        .parse((response, done) => {
          const chunks: Buffer[] = [];
          response.on('data', (chunk: Buffer) => chunks.push(chunk));
          response.on('end', () => done(null, Buffer.concat(chunks)));
        })
        .expect(200);
      const table = await read(owner, file.body as Buffer, `catalogue.${format}`);
      expect(table.rows).toHaveLength(starterCatalogue.length);
      const told = await preview(owner, importOf(table));
      expect(told.rows.filter(({ action }) => action !== 'same')).toEqual([]);
    }
  });

  it('show and take no money where costs are not for one’s eyes', async () => {
    const { owner, designer } = await people();
    const list = 'Category,Name,Ways,Cost\nhub,"Buried junction hub, 4-way",5,98765\n';
    await take(owner, importOf(await read(owner, list))).expect(201);
    const file = await designer.agent.get('/api/catalogue/export?format=csv').expect(200);
    expect(file.text).not.toContain('98,765');
    expect(Papa.parse<string[]>(file.text).data[0]).not.toContain('Cost');
    const table = await read(designer, list.replace('98765', '1').replace(',5,', ',6,'));
    expect(table.pricesTaken).toBe(false);
    const told = await preview(designer, importOf(table));
    expect(told.rows[0]?.changes).toEqual([{ field: 'Ways', was: '5', now: '6' }]);
    await take(designer, importOf(table)).expect(201);
    expect((await prices(owner))[0]?.price.costMinor).toBe(9_876_500);
  });

  it('are read whatever wrote them: marks, code pages, formulas, quotes', async () => {
    const { owner } = await people();
    const heads = async (bytes: Buffer | string) => (await read(owner, bytes)).rows[0];
    expect(await heads('\ufeffName,Note\n"A ""b"" c","two\nlines"\n')).toEqual(['A "b" c', 'two\nlines']);
    expect(await heads(Buffer.from('Name\tNote\nCaf\u00e9\tx\n', 'latin1'))).toEqual(['Café', 'x']);
    expect(await heads(Buffer.from('\ufeffName,Note\nÖse,x\n', 'utf16le'))).toEqual(['Öse', 'x']);
    const workbook = new ExcelJS.Workbook();
    workbook.addWorksheet('Empty');
    const sheet = workbook.addWorksheet('List');
    sheet.addRow(['Name', '', 'Cost', 'Since']);
    sheet.addRow([
      { richText: [{ text: 'Rich ' }, { text: 'hub' }] },
      null,
      { formula: '2*6', result: 12 },
      new Date('2026-03-01T00:00:00Z'),
    ]);
    expect(await heads(Buffer.from(await workbook.xlsx.writeBuffer()))).toEqual([
      'Rich hub',
      '12',
      '2026-03-01',
    ]);
  });

  it('are refused in a sentence when they are none, empty, damaged or too long', async () => {
    const { owner } = await people();
    expect(await refused(owner, 'Name,Note\n')).toContain('no rows');
    expect(await refused(owner, '')).toContain('no rows');
    expect(await refused(owner, Buffer.from('%PDF-1.7\n%âãÏÓ\n'))).toMatch(/attention/);
    expect(await refused(owner, Buffer.from([0, 1, 2, 3, 0, 255]))).toContain('no table');
    expect(await refused(owner, 'Name\n"never closed\n')).toContain('not closed');
    const workbook = new ExcelJS.Workbook();
    workbook.addWorksheet('List').addRow(['Name']);
    const whole = Buffer.from(await workbook.xlsx.writeBuffer());
    expect(await refused(owner, whole.subarray(0, whole.length - 200))).toMatch(/damaged|no table/);
    expect(await refused(owner, `Name\n${'x\n'.repeat(5001)}`)).toContain('5001 rows');
    expect(await refused(owner, `${'a,'.repeat(120)}b\n${'1,'.repeat(120)}2\n`)).toContain('121 columns');
    expect(await refused(owner, Buffer.alloc(6 * 1024 * 1024, 'a'), 413)).toContain('5 MB');
  });

  it('need rows that do something, and mappings that are columns', async () => {
    const { owner } = await people();
    const body = { fileName: 'x', rows: [['hub']], mapping: { category: 0 }, category: null, leftOut: [] };
    await take(owner, body).expect(400);
    await take(owner, { ...body, mapping: { colour: 0 } }).expect(400);
    await take(owner, { ...body, mapping: { category: -1 } }).expect(400);
    const left = {
      ...body,
      rows: [['hub', 'A', '3']],
      mapping: { category: 0, name: 1, ways: 2 },
      leftOut: [0],
    };
    expect((await preview(owner, left)).rows[0]?.action).toBe('left-out');
  });
});
