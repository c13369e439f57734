import { addShownProposal } from '../../src/modules/proposals/shown.testkit.js';
import type { RouteCase } from './route-case.js';
import { MARK, type World } from './world.js';

async function ofJob({ test, companyId }: World) {
  const { jobId } = await addShownProposal(test, companyId, `${MARK} job`);
  return { params: { jobId } };
}

/** There is something to tell; whoever asks is told of their own company's jobs. */
async function ofCompany(world: World) {
  await ofJob(world);
  return {};
}

export const routes: readonly RouteCase[] = [
  { route: 'GET /api/jobs/:jobId/timeline', audience: 'everyone', answers: 200, request: ofJob },
  { route: 'GET /api/board', audience: 'everyone', answers: 200, request: ofCompany },
  { route: 'GET /api/numbers', audience: 'owners', answers: 200, request: ofCompany },
];
