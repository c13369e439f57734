import { randomUUID } from 'node:crypto';
import { mkdtemp, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import sharp from 'sharp';
import { vi } from 'vitest';
import { sheet } from '../../../../geometry/src/plan/plan.testkit.js';
import { type Agent, startTestApp, type TestApp } from '../../../test/harness.js';
import { approvals, sheets } from '../../database/schema/index.js';
import { PlanBuilder } from '../../demo/plan-builder.js';
import { startFakeS3 } from '../../ports/storage/fake-s3.js';
import { ObjectStorage } from '../../ports/storage/storage.js';
import { CatalogueService } from '../catalogue/catalogue.service.js';
import { PlacedSheets } from '../plans/placed-sheets.js';
import { PlanWriter } from '../plans/plan-writer.js';
import { addJob } from '../plans/plans.testkit.js';
import { type PricedCompany, priceAll, quoteFor } from '../pricing/pricing.testkit.js';
import type { Proposal, Revision } from './proposals.dto.js';

export const LIGHT = 'Brass path light, 3 W';
const CABLE = '12 AWG landscape cable, 2-core';
const WIDTH = 2400;
const HEIGHT = 1800;

/** The application with object storage beside it. */
export async function startProposalTest(settings: Record<string, string> = {}): Promise<TestApp> {
  const dir = await mkdtemp(join(tmpdir(), 'lampwright-proposals-'));
  const fake = await startFakeS3({
    port: 0,
    dir,
    bucket: 'lampwright',
    accessKeyId: 'test',
    secretAccessKey: 'test',
  });
  const test = await startTestApp({ S3_ENDPOINT: fake.endpoint, ...settings });
  return {
    ...test,
    async close() {
      await test.close();
      await fake.close();
      await rm(dir, { recursive: true, force: true });
    },
  };
}

export interface ReadyJob {
  readonly jobId: string;
  readonly sheetId: string;
  readonly lights: readonly string[];
}

/** Companies that have a price for all that such a job needs. */
const priced = new WeakSet<PricedCompany>();

/** A job that is drawn, wired and priced, on a sheet with a picture: a proposal can be made of it. */
export async function addReadyJob(
  test: TestApp,
  company: PricedCompany,
  name = 'Weir Walk',
): Promise<ReadyJob> {
  const { companyId } = company;
  const jobId = await addJob(company.designer, name);
  const sheetId = randomUUID();
  await keepPicture(test, companyId, jobId, sheetId);
  await test.app
    .get(PlacedSheets, { strict: false })
    .place(companyId, jobId, { ...sheet(sheetId), widthPx: WIDTH, heightPx: HEIGHT });
  let lights: string[] = [];
  await drawOn(test, companyId, jobId, sheetId, (plan) => {
    const box = plan.transformer('Multi-tap transformer, 300 VA', [100, 100], 'Shed wall');
    lights = plan.fixtures(LIGHT, [
      [300, 100],
      [500, 100],
      [700, 100],
    ]);
    const [first] = plan.cable(CABLE, [box, ...lights]);
    plan.land(first ?? '', 'Walk', '12V', 'C1');
  });
  if (!priced.has(company)) await priceAll(company, jobId);
  priced.add(company);
  const { faults } = await quoteFor(company.owner.agent, jobId);
  for (const { key, message } of faults)
    await company.designer.agent
      .post(`/api/jobs/${jobId}/fault-acceptances`)
      .send({ faultKey: key, message, reason: 'Known to us.' })
      .expect(201);
  return { jobId, sheetId, lights };
}

export async function drawOn(
  test: TestApp,
  companyId: string,
  jobId: string,
  sheetId: string,
  drawing: (plan: PlanBuilder) => void,
): Promise<void> {
  const items = await test.app.get(CatalogueService, { strict: false }).byName(companyId);
  await test.app
    .get(PlanWriter, { strict: false })
    .write({ companyId, jobId }, { userId: null, session: '' }, async ({ plan, version }) => {
      const item = (wanted: string) => {
        const found = items.get(wanted);
        if (!found) throw new Error(`no item ${wanted}`);
        return found;
      };
      const builder = new PlanBuilder(plan, sheetId, item, `v${version}`);
      drawing(builder);
      return builder.changes.map((change) => ({ change }));
    });
}

let picture: Promise<Buffer> | null = null;
/** Noise: as hard to make small as any garden. */
function gardenPicture(): Promise<Buffer> {
  const noise = { type: 'gaussian', mean: 128, sigma: 40 } as const;
  picture ??= sharp({ create: { width: WIDTH, height: HEIGHT, channels: 3, background: 'white', noise } })
    .blur(4)
    .jpeg()
    .toBuffer();
  return picture;
}

async function keepPicture(test: TestApp, companyId: string, jobId: string, sheetId: string): Promise<void> {
  const imageKey = `${companyId}/sheets/${sheetId}/image.jpg`;
  await test.app.get(ObjectStorage, { strict: false }).put(imageKey, await gardenPicture(), 'image/jpeg');
  await test.database.queries.insert(sheets).values({
    id: sheetId,
    companyId,
    jobId,
    name: 'Garden',
    view: 'plan',
    status: 'ready',
    imageKey,
    imageType: 'image/jpeg',
    widthPx: WIDTH,
    heightPx: HEIGHT,
  });
}

/** Posts with an Idempotency-Key, a new one unless it is named. */
export const post = (agent: Agent, path: string, body: object = {}, key: string = randomUUID()) =>
  agent.post(path).set('Idempotency-Key', key).send(body);

export const proposalPath = (jobId: string) => `/api/jobs/${jobId}/proposal`;

export async function proposalFor(agent: Agent, jobId: string): Promise<Proposal> {
  return (await agent.get(proposalPath(jobId)).expect(200)).body as Proposal;
}

export async function freeze(agent: Agent, jobId: string): Promise<Revision> {
  return (await post(agent, `${proposalPath(jobId)}/revisions`).expect(201)).body as Revision;
}

/** A revision once a running worker has made its PDF. */
export async function frozenAndReady(agent: Agent, jobId: string): Promise<Revision> {
  const { id } = await freeze(agent, jobId);
  return untilRevision(agent, jobId, id, ({ progress }) => progress === 100);
}

export function untilRevision(
  agent: Agent,
  jobId: string,
  id: string,
  holds: (revision: Revision) => boolean,
): Promise<Revision> {
  return vi.waitFor(
    async () => {
      const found = (await proposalFor(agent, jobId)).revisions.find((revision) => revision.id === id);
      if (!found || !holds(found)) throw new Error(`not yet: ${JSON.stringify(found)}`);
      return found;
    },
    { timeout: 80_000, interval: 250 },
  );
}

export const sendTo = (email: string, message = 'Here it is.') => ({
  recipients: [{ name: 'Ida Fairweather', email }],
  message,
});

/** Writes down a yes, as the homeowner's page does: to what is offered, unless told otherwise. */
export async function approveRevision(
  test: TestApp,
  companyId: string,
  revision: Revision,
  taken: { readonly groups: readonly string[]; readonly totalMinor: number } = {
    groups: [],
    totalMinor: revision.totalMinor,
  },
): Promise<void> {
  const { rows } = await test.database.executeSql(
    `SELECT l.id, l.proposal_id FROM proposal_links l
       JOIN proposal_revisions r ON r.company_id = l.company_id AND r.proposal_id = l.proposal_id
      WHERE l.company_id = $1 AND r.id = $2`,
    [companyId, revision.id],
  );
  const [link] = rows as { id: string; proposal_id: string }[];
  await test.database.queries.insert(approvals).values({
    companyId,
    proposalId: link!.proposal_id,
    revisionId: revision.id,
    linkId: link!.id,
    groups: taken.groups,
    totalMinor: taken.totalMinor,
    typedName: 'Ida Fairweather',
    agreedTo: 'I approve.',
    consentedTo: 'Electronic records are fine with me.',
    address: '192.0.2.1',
    userAgent: 'spec',
    revisionHash: revision.hash,
    pdfHash: 'none',
  });
}
