import type { RouteCase } from './route-case.js';
import { MARK, type World } from './world.js';

const tableOf = (name: string) => ({
  fileName: `${name}.csv`,
  rows: [['hub', `${name} hub`, '4']],
  mapping: { category: 0, name: 1, ways: 2 },
  category: null,
  leftOut: [],
});
const table = tableOf('Sent by whoever asks');

async function done({ owner }: World) {
  const made = await owner
    .post('/api/catalogue/imports')
    .set('Idempotency-Key', 'made before')
    .send(tableOf(MARK))
    .expect(201);
  return { params: { importId: made.body.id as string } };
}

export const routes: readonly RouteCase[] = [
  {
    route: 'POST /api/catalogue/tables',
    audience: 'planners',
    answers: 200,
    request: () => ({ file: { name: 'list.csv', content: Buffer.from('Name,Ways\nHub,4\n') } }),
  },
  {
    route: 'POST /api/catalogue/imports/preview',
    audience: 'planners',
    answers: 200,
    request: () => ({ body: table }),
  },
  {
    route: 'POST /api/catalogue/imports',
    audience: 'planners',
    answers: 201,
    request: () => ({ headers: { 'Idempotency-Key': 'a key' }, body: table }),
  },
  {
    route: 'GET /api/catalogue/imports',
    audience: 'planners',
    answers: 200,
    request: async (world) => {
      await done(world);
      return {};
    },
  },
  { route: 'POST /api/catalogue/imports/:importId/undo', audience: 'planners', answers: 200, request: done },
  {
    route: 'GET /api/catalogue/export',
    audience: 'planners',
    answers: 200,
    request: async (world) => {
      await done(world);
      return { query: { format: 'csv' } };
    },
  },
];
