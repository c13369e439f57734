import type { RouteCase } from './route-case.js';

const open = (route: string): RouteCase => ({ route, audience: 'anyone' });

/** Health and the API's own description. */
export const routes: readonly RouteCase[] = [
  open('GET /api/health'),
  open('GET /api/openapi.json'),
  open('GET /api/docs'),
  open('GET /api/docs/'),
  open('GET /api/docs/index.html'),
  // Registered by the viewer so as not to be served from its package.
  { route: 'GET /api/docs/LICENSE', audience: 'anyone', answers: 404 },
  open('GET /api/docs/swagger-ui-init.js'),
  open('GET /api/docs/docs/swagger-ui-init.js'),
  open('GET /api/docs-yaml'),
];
