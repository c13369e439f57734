import type { RouteCase } from './route-case.js';
import { PASSWORD } from './world.js';

export const routes: readonly RouteCase[] = [
  { route: 'GET /api/company', audience: 'everyone', answers: 200 },
  {
    route: 'PATCH /api/company',
    audience: 'owners',
    answers: 200,
    request: () => ({ body: { name: 'Another name', settings: { transformerTargetPercent: 75 } } }),
  },
  { route: 'POST /api/company/export', audience: 'owners', answers: 200 },
  {
    route: 'DELETE /api/company',
    audience: 'owners',
    answers: 204,
    request: (world, caller) => ({
      body: {
        password: PASSWORD,
        name: caller === world.otherOwner ? 'Another company' : world.companyName,
      },
    }),
  },
];
