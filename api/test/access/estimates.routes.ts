import type { RouteCase } from './route-case.js';

/** An estimate is worked out from what it is sent alone; it reads nobody's records. */
export const routes: readonly RouteCase[] = [
  {
    route: 'POST /api/estimates',
    audience: 'everyone',
    answers: 200,
    request: () => ({ body: { transformers: [], runs: [] } }),
  },
];
