import { eq } from 'drizzle-orm';
import sharp from 'sharp';
import { sheets } from '../../src/database/schema/index.js';
import { pageKey } from '../../src/modules/sheets/sheet-keys.js';
import { ObjectStorage } from '../../src/ports/storage/storage.js';
import type { RouteCase, ValidRequest } from './route-case.js';
import { MARK, type World } from './world.js';

const photo = await sharp({ create: { width: 64, height: 64, channels: 3, background: 'olive' } })
  .jpeg()
  .toBuffer();

async function job({ owner }: World): Promise<string> {
  const made = await owner
    .post('/api/jobs')
    .send({ name: `${MARK} job`, client: { name: 'Client' }, property: { name: 'Garden', address: '' } })
    .expect(201);
  return made.body.id;
}

async function ofSheet(world: World): Promise<ValidRequest & { params: { id: string } }> {
  const made = await world.owner
    .post(`/api/jobs/${await job(world)}/sheets`)
    .field({ view: 'plan', name: `${MARK} sheet` })
    .attach('file', photo, 'a.jpg')
    .expect(202);
  return { params: { id: made.body.id } };
}

/** A sheet as the worker leaves it. */
async function ofReadySheet(world: World): Promise<ValidRequest> {
  const sheet = await ofSheet(world);
  const key = `${world.companyId}/sheets/${sheet.params.id}/image-x`;
  await world.test.app.get(ObjectStorage, { strict: false }).put(key, photo, 'image/jpeg');
  await world.test.database.queries
    .update(sheets)
    .set({ status: 'ready', imageKey: key, thumbnailKey: key, widthPx: 64, heightPx: 64 })
    .where(eq(sheets.id, sheet.params.id));
  return sheet;
}

/** A document with two pages to choose from. */
async function ofDocument(world: World): Promise<ValidRequest & { params: { id: string } }> {
  const sheet = await ofSheet(world);
  const { id } = sheet.params;
  await world.test.app
    .get(ObjectStorage, { strict: false })
    .put(pageKey(world.companyId, id, 2), photo, 'image/jpeg');
  await world.test.database.queries
    .update(sheets)
    .set({ status: 'choose-page', pageCount: 2 })
    .where(eq(sheets.id, id));
  return sheet;
}

export const routes: readonly RouteCase[] = [
  {
    route: 'GET /api/jobs/:id/sheets',
    audience: 'everyone',
    answers: 200,
    request: async (world) => ({ params: { id: await job(world) } }),
  },
  {
    route: 'POST /api/jobs/:id/sheets',
    audience: 'planners',
    answers: 202,
    request: async (world) => ({
      params: { id: await job(world) },
      fields: { view: 'photo' },
      file: { name: 'photo.jpg', content: photo },
    }),
  },
  { route: 'GET /api/sheets/:id', audience: 'everyone', answers: 200, request: ofSheet },
  {
    route: 'PATCH /api/sheets/:id',
    audience: 'planners',
    answers: 200,
    request: async (world) => ({ ...(await ofSheet(world)), body: { name: 'Front' } }),
  },
  { route: 'DELETE /api/sheets/:id', audience: 'planners', answers: 204, request: ofSheet },
  {
    route: 'POST /api/sheets/:id/page',
    audience: 'planners',
    answers: 202,
    request: async (world) => ({ ...(await ofDocument(world)), body: { page: 2 } }),
  },
  {
    route: 'GET /api/sheets/:id/pages/:page',
    audience: 'everyone',
    answers: 200,
    request: async (world) => ({ params: { ...(await ofDocument(world)).params, page: '2' } }),
  },
  { route: 'POST /api/sheets/:id/retry', audience: 'planners', answers: 202, request: ofSheet },
  { route: 'GET /api/sheets/:id/image', audience: 'everyone', answers: 200, request: ofReadySheet },
  { route: 'GET /api/sheets/:id/thumbnail', audience: 'everyone', answers: 200, request: ofReadySheet },
];
