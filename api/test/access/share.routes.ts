import { proposalRevisions } from '../../src/database/schema/index.js';
import { addProposal, approve, type TestProposal } from '../../src/modules/payments/payments.testkit.js';
import type { RevisionDocument } from '../../src/modules/proposals/revision-document.js';
import { addLink } from '../../src/modules/share/share.testkit.js';
import { ObjectStorage } from '../../src/ports/storage/storage.js';
import type { RouteCase } from './route-case.js';
import { MARK, type World } from './world.js';

const HASH = 'hash-of-the-document';
const TOTAL_MINOR = 120_000;
const SHEET = 'sheet-1';

const documentOf = ({ jobId, email }: TestProposal): RevisionDocument => ({
  form: 1,
  number: 1,
  revision: 1,
  changes: null,
  madeAt: '2026-05-01T12:00:00.000Z',
  validUntil: '2099-01-01',
  currency: 'USD',
  locale: 'en-US',
  region: 'us',
  units: 'imperial',
  company: { name: `${MARK} company`, email: '', phone: '', address: '', licence: '' },
  client: { name: `${MARK} client`, email, phone: '', address: '' },
  job: { id: jobId, name: `${MARK} job`, property: `${MARK} garden` },
  plan: { version: 1, records: [] },
  sheets: [{ id: SHEET, name: 'Garden', view: 'photo', widthPx: 100, heightPx: 100 }],
  lights: [],
  price: {
    groups: [],
    lines: [],
    discountName: '',
    tax: null,
    stages: [{ id: 'all', name: 'Deposit', due: 'approval', percent: 100 }],
    combinations: [
      {
        groups: [],
        subtotalMinor: TOTAL_MINOR,
        discountMinor: 0,
        taxableMinor: 0,
        taxMinor: 0,
        totalMinor: TOTAL_MINOR,
        stages: [
          {
            id: 'all',
            name: 'Deposit',
            due: 'approval',
            percent: null,
            amountMinor: TOTAL_MINOR,
            capped: false,
          },
        ],
        offerable: true,
        reason: '',
      },
    ],
  },
  words: { scope: '', exclusions: '', timeline: '', locate: '', warranty: '', terms: '', cancellation: '' },
  cautions: [],
  acceptedFaults: [],
});

/** A proposal of ours that was sent by the world's link, with its PDF and picture. */
async function sent(world: World) {
  const { test } = world;
  const proposal = await addProposal(test, world.companyId, `${MARK} job`);
  const storage = test.app.get(ObjectStorage, { strict: false });
  const key = `${world.companyId}/walk/${proposal.proposalId}`;
  await storage.put(`${key}.pdf`, Buffer.from(`%PDF ${MARK}`), 'application/pdf');
  await storage.put(`${key}.jpg`, Buffer.from(MARK), 'image/jpeg');
  const [row] = await test.database.queries
    .insert(proposalRevisions)
    .values({
      companyId: world.companyId,
      proposalId: proposal.proposalId,
      revision: 1,
      planVersion: 1,
      document: JSON.stringify(documentOf(proposal)),
      hash: HASH,
      totalMinor: TOTAL_MINOR,
      status: 'ready',
      pdfKey: `${key}.pdf`,
      pdfHash: 'hash-of-the-pdf',
      pictures: { [SHEET]: `${key}.jpg` },
      validUntil: new Date('2099-01-01T00:00:00Z'),
      sentAt: new Date(),
    })
    .returning();
  const link = await addLink(test, proposal);
  return { ...proposal, ...link, revisionId: row!.id };
}

const params = async (world: World) => ({ params: { linkId: (await sent(world)).linkId } });
const question = { text: `${MARK} question`, recordId: null, point: null };

export const routes: readonly RouteCase[] = [
  {
    route: 'GET /p/:token',
    audience: 'anyone',
    answers: 200,
    request: async (world) => ({ params: { token: (await sent(world)).token } }),
  },
  {
    // The same shell for everybody: who has the link's cookie is asked by its script.
    route: 'GET /p/back/:linkId',
    audience: 'anyone',
    answers: 200,
    request: params,
  },
  { route: 'GET /api/share/:linkId', audience: 'link', answers: 200, request: params },
  { route: 'POST /api/share/:linkId/opened', audience: 'link', answers: 204, request: params },
  {
    route: 'GET /api/share/:linkId/pictures/:sheetId',
    audience: 'link',
    answers: 200,
    request: async (world) => ({ params: { ...(await params(world)).params, sheetId: SHEET } }),
  },
  { route: 'GET /api/share/:linkId/night', audience: 'link', answers: 200, request: params },
  {
    route: 'GET /api/share/:linkId/papers/:paperId',
    audience: 'link',
    answers: 200,
    request: async (world) => ({ params: { ...(await params(world)).params, paperId: 'proposal' } }),
  },
  {
    route: 'POST /api/share/:linkId/questions',
    audience: 'link',
    answers: 201,
    request: async (world) => ({ ...(await params(world)), body: question }),
  },
  {
    route: 'POST /api/share/:linkId/questions/:questionId/messages',
    audience: 'link',
    answers: 201,
    request: async (world) => {
      const { linkId, companyId, proposalId, revisionId } = await sent(world);
      const { rows } = await world.test.database.executeSql(
        'INSERT INTO questions (company_id, proposal_id, revision_id) VALUES ($1, $2, $3) RETURNING id',
        [companyId, proposalId, revisionId],
      );
      const [asked] = rows as { id: string }[];
      return { params: { linkId, questionId: asked!.id }, body: { text: 'And then?' } };
    },
  },
  {
    route: 'POST /api/share/:linkId/approve',
    audience: 'link',
    answers: 200,
    request: async (world) => {
      const { linkId, revisionId } = await sent(world);
      const body = {
        revisionId,
        hash: HASH,
        groups: [],
        totalMinor: TOTAL_MINOR,
        typedName: 'Ida Fairweather',
        agreed: true,
        consented: true,
      };
      return { params: { linkId }, body };
    },
  },
  {
    route: 'POST /api/share/:linkId/decline',
    audience: 'link',
    answers: 200,
    request: async (world) => {
      const { linkId, revisionId } = await sent(world);
      return { params: { linkId }, body: { revisionId, reason: '' } };
    },
  },
  {
    // The card service of the walk is never reached: whoever may pay is told so.
    route: 'POST /api/share/:linkId/dues/:dueId/checkout',
    audience: 'link',
    answers: 503,
    request: async (world) => {
      const proposal = await addProposal(world.test, world.companyId, `${MARK} job`);
      await approve(world.test, proposal, { revision: 1, totalMinor: TOTAL_MINOR });
      const { linkId } = await addLink(world.test, proposal);
      const { rows } = await world.test.database.executeSql(
        "SELECT id FROM dues WHERE proposal_id = $1 AND due = 'approval'",
        [proposal.proposalId],
      );
      const [due] = rows as { id: string }[];
      return { params: { linkId, dueId: due!.id } };
    },
  },
];
