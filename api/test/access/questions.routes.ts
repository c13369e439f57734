import { addQuestion, addShownProposal } from '../../src/modules/proposals/shown.testkit.js';
import type { RouteCase } from './route-case.js';
import { MARK, type World } from './world.js';

async function ofQuestion({ test, companyId }: World) {
  const proposal = await addShownProposal(test, companyId, `${MARK} job`);
  const questionId = await addQuestion(test, proposal, `${MARK} question`);
  return { params: { jobId: proposal.jobId, questionId } };
}

const path = '/api/jobs/:jobId/questions';

export const routes: readonly RouteCase[] = [
  {
    route: `GET ${path}`,
    audience: 'planners',
    answers: 200,
    request: async (world) => {
      const { params } = await ofQuestion(world);
      return { params: { jobId: params.jobId } };
    },
  },
  {
    route: `POST ${path}/:questionId/messages`,
    audience: 'planners',
    answers: 201,
    request: async (world) => ({ ...(await ofQuestion(world)), body: { text: 'Yes, it can.' } }),
  },
  { route: `POST ${path}/:questionId/resolve`, audience: 'planners', answers: 200, request: ofQuestion },
  { route: `POST ${path}/:questionId/reopen`, audience: 'planners', answers: 200, request: ofQuestion },
];
