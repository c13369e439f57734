import { defaultSettings, newId, PLAN_SCHEMA_VERSION } from '@lampwright/geometry/plan';
import { emptyPricing, type PriceBook } from '@lampwright/geometry/price';
import { PlacedSheets } from '../../src/modules/plans/placed-sheets.js';
import type { RouteCase } from './route-case.js';
import { MARK, type World } from './world.js';

const price = {
  costMinor: 1200,
  priceMinor: null,
  per: 1,
  unit: 'each',
  increment: 1,
  taxable: true,
  supplier: `${MARK} supplier`,
  orderNumber: '',
};

/** Ours lets its designers see costs, so that each may do what their role allows. */
async function ofBook({ owner }: World): Promise<{ baseVersion: number; book: PriceBook }> {
  const { body } = await owner.get('/api/price-book').expect(200);
  const book = { ...body.book, designersSeeCosts: true };
  const saved = await owner.put('/api/price-book').send({ baseVersion: body.version, book }).expect(200);
  return { baseVersion: saved.body.version, book };
}

/** An item with a price. */
async function ofItem(world: World) {
  await ofBook(world);
  const { owner } = world;
  const item = { category: 'hub', name: `${MARK} hub`, ways: 6 };
  const made = await owner.post('/api/catalogue').send({ item }).expect(201);
  const itemId: string = made.body.id;
  await owner.put(`/api/catalogue/${itemId}/price`).send({ price }).expect(200);
  return { params: { itemId } };
}

async function ofJob({ owner }: World) {
  const made = await owner
    .post('/api/jobs')
    .send({ name: `${MARK} job`, client: { name: 'Client' }, property: { name: 'Garden', address: '' } })
    .expect(201);
  return { params: { jobId: made.body.id as string } };
}

/** A job whose plan has a fault: a lamp that does not fit its fixture. */
async function ofFault(world: World) {
  const { params } = await ofJob(world);
  const { jobId } = params;
  const { owner, companyId, test } = world;
  await test.app.get(PlacedSheets, { strict: false }).place(companyId, jobId, {
    kind: 'sheet',
    id: 'sheet1',
    name: 'Sheet',
    order: 0,
    widthPx: 1000,
    heightPx: 1000,
    view: 'plan',
    pixelsPerPaperMeter: null,
    references: [],
    groundMetersPerPaperMeter: null,
    whiteLux: null,
  });
  const light = { load: { kind: 'driver', watts: 3, powerFactor: 0.9, minVolts: 9 }, target: null };
  const about = { lumens: null, beamDegrees: null, cctKelvin: null, window: { minVolts: 9, maxVolts: 15 } };
  const fixture = {
    category: 'fixture',
    name: `${MARK} fixture`,
    kind: 'path',
    light: 'lamp',
    base: 'G4',
    maxWatts: 20,
    lead: { conductor: { awg: 18 }, lengthMeters: 1 },
    mountingHeightMeters: null,
    wetListed: false,
  };
  const lamp = {
    category: 'lamp',
    name: 'Lamp',
    base: 'GU5.3',
    technology: 'led',
    lifeHours: null,
    ...light,
    ...about,
  };
  const put = {
    settings: defaultSettings('us'),
    i1: { kind: 'item', id: 'i1', sourceId: null, item: fixture },
    i2: { kind: 'item', id: 'i2', sourceId: null, item: lamp },
    f1: {
      kind: 'fixture',
      id: 'f1',
      sheetId: 'sheet1',
      at: { x: 10, y: 10 },
      number: 1,
      name: '',
      itemId: 'i1',
      lampId: 'i2',
      quantity: 1,
      lead: null,
      aim: null,
      mountingHeightMeters: null,
      zoneId: null,
      note: '',
    },
  };
  const { body } = await owner.get(`/api/jobs/${jobId}/plan`).expect(200);
  const change = { id: newId(), schema: PLAN_SCHEMA_VERSION, put, remove: [] };
  await owner
    .post(`/api/jobs/${jobId}/plan/changes`)
    .send({ baseVersion: body.version, changes: [change] })
    .expect(200);
  const quote = (await owner.get(`/api/jobs/${jobId}/quote`).expect(200)).body;
  const { key: faultKey, message } = quote.faults[0];
  return { params, body: { faultKey, message, reason: 'Another lamp is on its way.' } };
}

export const routes: readonly RouteCase[] = [
  {
    route: 'GET /api/price-book',
    audience: 'planners',
    answers: 200,
    // A designer of another company asks for the book of that company, which must let them see it too.
    request: async (world, caller) => {
      await ofBook(world);
      if (caller?.actor.companyId === world.otherOwner.actor.companyId)
        await ofBook({ ...world, owner: world.otherOwner.agent });
      return {};
    },
  },
  {
    route: 'PUT /api/price-book',
    audience: 'owners',
    answers: 200,
    request: async (world, caller) => {
      const ours = await ofBook(world);
      const owner = caller && caller.actor.companyId !== world.companyId ? caller.agent : null;
      return { body: owner ? await ofBook({ ...world, owner }) : ours };
    },
  },
  {
    route: 'GET /api/catalogue-prices',
    audience: 'planners',
    answers: 200,
    request: async (world) => {
      await ofItem(world);
      return {};
    },
  },
  {
    route: 'PUT /api/catalogue/:itemId/price',
    audience: 'planners',
    answers: 200,
    request: async (world) => ({ ...(await ofItem(world)), body: { price: { ...price, costMinor: 1300 } } }),
  },
  { route: 'GET /api/catalogue/:itemId/prices', audience: 'planners', answers: 200, request: ofItem },
  { route: 'GET /api/jobs/:jobId/pricing', audience: 'planners', answers: 200, request: ofJob },
  {
    route: 'PUT /api/jobs/:jobId/pricing',
    audience: 'planners',
    answers: 200,
    request: async (world) => ({ ...(await ofJob(world)), body: { baseVersion: 0, pricing: emptyPricing } }),
  },
  { route: 'GET /api/jobs/:jobId/quote', audience: 'planners', answers: 200, request: ofJob },
  { route: 'GET /api/jobs/:jobId/materials', audience: 'everyone', answers: 200, request: ofJob },
  {
    route: 'POST /api/jobs/:jobId/fault-acceptances',
    audience: 'planners',
    answers: 201,
    request: ofFault,
  },
  {
    route: 'DELETE /api/jobs/:jobId/fault-acceptances/:acceptanceId',
    audience: 'planners',
    answers: 204,
    request: async (world) => {
      const { params, body } = await ofFault(world);
      const made = await world.owner
        .post(`/api/jobs/${params.jobId}/fault-acceptances`)
        .send(body)
        .expect(201);
      return { params: { ...params, acceptanceId: made.body.id as string } };
    },
  },
];
