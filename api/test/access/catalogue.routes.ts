import type { RouteCase } from './route-case.js';
import { MARK, type World } from './world.js';

const hub = (name: string) => ({ item: { category: 'hub', name, ways: 6 } });

async function ofItem({ owner }: World) {
  const made = await owner
    .post('/api/catalogue')
    .send(hub(`${MARK} hub`))
    .expect(201);
  return { params: { id: made.body.id as string } };
}

export const routes: readonly RouteCase[] = [
  {
    route: 'GET /api/catalogue',
    audience: 'everyone',
    answers: 200,
    request: async (world) => {
      await ofItem(world);
      return {};
    },
  },
  {
    route: 'POST /api/catalogue',
    audience: 'planners',
    answers: 201,
    request: () => ({ body: hub('New hub') }),
  },
  {
    route: 'PUT /api/catalogue/:id',
    audience: 'planners',
    answers: 200,
    request: async (world) => ({ ...(await ofItem(world)), body: hub('Other hub') }),
  },
  { route: 'POST /api/catalogue/:id/archive', audience: 'planners', answers: 200, request: ofItem },
  { route: 'POST /api/catalogue/:id/restore', audience: 'planners', answers: 200, request: ofItem },
];
