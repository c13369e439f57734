import { CatalogueService } from '../../src/modules/catalogue/catalogue.service.js';
import { addReadyJob } from '../../src/modules/proposals/proposals.testkit.js';
import { addShownProposal } from '../../src/modules/proposals/shown.testkit.js';
import { usualTexts } from '../../src/modules/proposals/usual-texts.js';
import type { RouteCase } from './route-case.js';
import { MARK, type World } from './world.js';

const shown = ({ test, companyId }: World) => addShownProposal(test, companyId, `${MARK} job`);

async function ofJob(world: World) {
  return { params: { jobId: (await shown(world)).jobId } };
}

async function ofApproved(world: World) {
  const { jobId, approvedId } = await shown(world);
  return { params: { jobId, revisionId: approvedId } };
}

async function ofSent(world: World) {
  const { jobId, sentId } = await shown(world);
  return { params: { jobId, revisionId: sentId } };
}

async function ofLink(world: World) {
  const { jobId, linkId } = await shown(world);
  return { params: { jobId, linkId } };
}

/** A job of which a proposal can be made. */
async function ready({ test, companyId, members }: World) {
  await test.app.get(CatalogueService, { strict: false }).seed(companyId);
  const { jobId } = await addReadyJob(test, { companyId, ...members, items: new Map() }, `${MARK} job`);
  return { params: { jobId } };
}

export const routes: readonly RouteCase[] = [
  { route: 'GET /api/proposal-texts', audience: 'planners', answers: 200 },
  {
    route: 'PUT /api/proposal-texts',
    audience: 'planners',
    answers: 200,
    request: () => ({ body: { baseVersion: 0, texts: usualTexts('us') } }),
  },
  { route: 'GET /api/jobs/:jobId/proposal', audience: 'planners', answers: 200, request: ofJob },
  {
    route: 'PUT /api/jobs/:jobId/proposal/words',
    audience: 'planners',
    answers: 200,
    request: async (world) => ({ ...(await ofJob(world)), body: { timeline: 'In June.' } }),
  },
  { route: 'POST /api/jobs/:jobId/proposal/revisions', audience: 'planners', answers: 201, request: ready },
  {
    route: 'GET /api/jobs/:jobId/proposal/revisions/:revisionId',
    audience: 'planners',
    answers: 200,
    request: ofSent,
  },
  {
    route: 'GET /api/jobs/:jobId/proposal/revisions/:revisionId/pdf',
    audience: 'planners',
    answers: 200,
    request: ofSent,
  },
  {
    route: 'GET /api/jobs/:jobId/proposal/revisions/:revisionId/signed-pdf',
    audience: 'planners',
    answers: 200,
    request: ofApproved,
  },
  {
    route: 'POST /api/jobs/:jobId/proposal/revisions/:revisionId/send',
    audience: 'planners',
    answers: 200,
    request: async (world) => ({
      ...(await ofSent(world)),
      body: { recipients: [{ name: 'Ida', email: 'ida@example.com' }], message: 'Here it is.' },
    }),
  },
  {
    route: 'POST /api/jobs/:jobId/proposal/revisions/:revisionId/withdraw',
    audience: 'planners',
    answers: 200,
    request: ofSent,
  },
  {
    route: 'POST /api/jobs/:jobId/proposal/revisions/:revisionId/release',
    audience: 'planners',
    answers: 200,
    request: ofApproved,
  },
  {
    route: 'POST /api/jobs/:jobId/proposal/links/:linkId/resend',
    audience: 'planners',
    answers: 200,
    request: ofLink,
  },
  {
    route: 'POST /api/jobs/:jobId/proposal/links/:linkId/revoke',
    audience: 'planners',
    answers: 200,
    request: ofLink,
  },
];
