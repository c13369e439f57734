import { defaultSettings, newId, PLAN_SCHEMA_VERSION } from '@lampwright/geometry/plan';
import type { RouteCase } from './route-case.js';
import { MARK, type World } from './world.js';

/** One edit of a plan: it sets the line volts. */
const change = (lineVolts: number) => ({
  id: newId(),
  schema: PLAN_SCHEMA_VERSION,
  put: { settings: { ...defaultSettings('us'), lineVolts } },
  remove: [],
});

/** A job whose plan was edited twice. */
async function ofPlan(world: World): Promise<{ params: { jobId: string } }> {
  const { owner } = world;
  const made = await owner
    .post('/api/jobs')
    .send({ name: `${MARK} job`, client: { name: 'Client' }, property: { name: 'Garden', address: '' } })
    .expect(201);
  const jobId: string = made.body.id;
  const { body } = await owner.get(`/api/jobs/${jobId}/plan`).expect(200);
  await owner
    .post(`/api/jobs/${jobId}/plan/changes`)
    .send({ baseVersion: body.version, changes: [change(118), change(121)] })
    .expect(200);
  return { params: { jobId } };
}

const read = (route: string): RouteCase => ({ route, audience: 'everyone', answers: 200, request: ofPlan });

export const routes: readonly RouteCase[] = [
  read('GET /api/jobs/:jobId/plan'),
  {
    ...read('GET /api/jobs/:jobId/plan/changes'),
    request: async (world) => ({ ...(await ofPlan(world)), query: { since: '0' } }),
  },
  read('GET /api/jobs/:jobId/plan/history'),
  read('GET /api/jobs/:jobId/plan/summary'),
  { ...read('GET /api/jobs/:jobId/plan/events'), endless: true },
  {
    route: 'POST /api/jobs/:jobId/plan/changes',
    audience: 'planners',
    answers: 200,
    request: async (world) => {
      const { params } = await ofPlan(world);
      const { body } = await world.owner.get(`/api/jobs/${params.jobId}/plan`).expect(200);
      return { params, body: { baseVersion: body.version, changes: [change(119)] } };
    },
  },
  {
    route: 'POST /api/jobs/:jobId/plan/restore',
    audience: 'planners',
    answers: 201,
    request: async (world) => ({ ...(await ofPlan(world)), body: { version: 1 } }),
  },
];
