import type { RouteCase } from './route-case.js';
import { MARK, type World } from './world.js';

async function job({ owner }: World) {
  const made = await owner
    .post('/api/jobs')
    .send({
      name: `${MARK} job`,
      client: { name: `${MARK} client` },
      property: { name: `${MARK} garden`, address: '' },
    })
    .expect(201);
  return made.body as { id: string; client: { id: string }; property: { id: string } };
}

const ofJob = async (world: World) => ({ params: { id: (await job(world)).id } });

const siteWalk = {
  lineVoltsUnderLoad: 118,
  outletLocation: '',
  circuitRatingAmps: 15,
  otherLoadsOnCircuit: '',
  protected: 'yes',
  existingTransformer: '',
  existingCable: '',
  irrigation: { present: 'unknown', note: '' },
  gas: { present: 'unknown', note: '' },
  petFence: { present: 'unknown', note: '' },
  associationRules: '',
  permits: '',
  notes: '',
};

export const routes: readonly RouteCase[] = [
  {
    route: 'GET /api/jobs',
    audience: 'everyone',
    answers: 200,
    request: async (world) => {
      await job(world);
      return {};
    },
  },
  {
    route: 'POST /api/jobs',
    audience: 'planners',
    elsewhere: 'hidden',
    answers: 201,
    request: async (world) => {
      const { client, property } = await job(world);
      return { body: { name: 'Second visit', client: { id: client.id }, property: { id: property.id } } };
    },
  },
  { route: 'GET /api/jobs/:id', audience: 'everyone', answers: 200, request: ofJob },
  {
    route: 'PATCH /api/jobs/:id',
    audience: 'planners',
    answers: 200,
    request: async (world) => ({ ...(await ofJob(world)), body: { stage: 'plan' } }),
  },
  {
    route: 'PUT /api/jobs/:id/site-walk',
    audience: 'everyone',
    answers: 200,
    request: async (world) => ({ ...(await ofJob(world)), body: siteWalk }),
  },
  { route: 'POST /api/jobs/:id/archive', audience: 'planners', answers: 200, request: ofJob },
  { route: 'POST /api/jobs/:id/restore', audience: 'planners', answers: 200, request: ofJob },
];
