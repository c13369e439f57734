import type { RouteCase } from './route-case.js';
import { MARK, type World } from './world.js';

/** A client of our company with a property. */
async function clientWithProperty({ owner }: World) {
  const client = await owner
    .post('/api/clients')
    .send({ name: `${MARK} client` })
    .expect(201);
  const property = await owner
    .post('/api/properties')
    .send({ clientId: client.body.id, name: `${MARK} garden`, address: '1 Weir Walk' })
    .expect(201);
  return { clientId: client.body.id as string, propertyId: property.body.id as string };
}

const ofClient = async (world: World) => ({ params: { id: (await clientWithProperty(world)).clientId } });
const ofProperty = async (world: World) => ({ params: { id: (await clientWithProperty(world)).propertyId } });

export const routes: readonly RouteCase[] = [
  {
    route: 'GET /api/clients',
    audience: 'everyone',
    answers: 200,
    request: async (world) => {
      await clientWithProperty(world);
      return {};
    },
  },
  {
    route: 'POST /api/clients',
    audience: 'planners',
    answers: 201,
    request: () => ({ body: { name: 'Somebody new' } }),
  },
  { route: 'GET /api/clients/:id', audience: 'everyone', answers: 200, request: ofClient },
  {
    route: 'PATCH /api/clients/:id',
    audience: 'planners',
    answers: 200,
    request: async (world) => ({ ...(await ofClient(world)), body: { name: 'Another name' } }),
  },
  { route: 'POST /api/clients/:id/archive', audience: 'planners', answers: 200, request: ofClient },
  { route: 'POST /api/clients/:id/restore', audience: 'planners', answers: 200, request: ofClient },
  {
    route: 'GET /api/properties',
    audience: 'everyone',
    answers: 200,
    request: async (world) => ({ query: { clientId: (await clientWithProperty(world)).clientId } }),
  },
  {
    route: 'POST /api/properties',
    audience: 'planners',
    elsewhere: 'hidden',
    answers: 201,
    request: async (world) => ({
      body: { clientId: (await clientWithProperty(world)).clientId, name: 'Front', address: '' },
    }),
  },
  { route: 'GET /api/properties/:id', audience: 'everyone', answers: 200, request: ofProperty },
  {
    route: 'PATCH /api/properties/:id',
    audience: 'planners',
    answers: 200,
    request: async (world) => ({ ...(await ofProperty(world)), body: { accessNotes: 'By the gate' } }),
  },
];
