import { sql } from 'drizzle-orm';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { startTestApp, type TestApp } from '../../../test/harness.js';
import { addCompany, addPerson, type TestPerson } from '../../../test/people.js';
import { clients, jobs, planSummaries, plans } from '../../database/schema/index.js';
import type { SiteWalk } from './site-walk.dto.js';

const survey: SiteWalk = {
  lineVoltsUnderLoad: 117.5,
  outletLocation: 'Wall beside the patio door',
  circuitRatingAmps: 15,
  otherLoadsOnCircuit: 'Patio fan',
  protected: 'yes',
  existingTransformer: '',
  existingCable: '',
  irrigation: { present: 'yes', note: 'Four zones, valve box at the gate' },
  gas: { present: 'unknown', note: '' },
  petFence: { present: 'no', note: '' },
  associationRules: '',
  permits: '',
  notes: '',
};

const newJob = (name: string, client = 'Rowan Ashdown') => ({
  name,
  client: { name: client, email: 'rowan@example.com' },
  property: { name: 'Rear garden', address: '4 Mill Rise, Marlow Bend' },
});

describe('jobs', () => {
  let test: TestApp;
  let owner: TestPerson;
  let crew: TestPerson;
  let stranger: TestPerson;
  beforeAll(async () => {
    test = await startTestApp();
    const company = await addCompany(test);
    owner = await addPerson(test, company, 'owner');
    crew = await addPerson(test, company, 'crew');
    stranger = await addPerson(test, await addCompany(test, 'Another company'), 'owner');
  });
  afterAll(() => test?.close());

  const create = async (name: string, client?: string) =>
    (await owner.agent.post('/api/jobs').send(newJob(name, client)).expect(201)).body;

  it('makes a job with its client and property in one go', async () => {
    const job = await create('Mill Rise');
    expect(job).toMatchObject({
      name: 'Mill Rise',
      stage: 'enquiry',
      existingSystem: false,
      siteWalk: null,
      sheets: [],
      client: { name: 'Rowan Ashdown', email: 'rowan@example.com', phone: null },
      property: { address: '4 Mill Rise, Marlow Bend', region: '', latitude: null },
    });
    const read = await owner.agent.get(`/api/jobs/${job.id}`).expect(200);
    expect(read.body).toEqual(job);
  });

  it('makes a job for a client and property that are known already', async () => {
    const first = await create('First visit');
    const second = await owner.agent
      .post('/api/jobs')
      .send({
        name: 'Second visit',
        client: { id: first.client.id },
        property: { id: first.property.id },
        existingSystem: true,
      })
      .expect(201);
    expect(second.body).toMatchObject({ existingSystem: true, client: { id: first.client.id } });
  });

  it('leaves nothing behind when a part of a new job is refused', async () => {
    const other = await create('Other');
    const before = await test.database.queries.select({ n: sql<number>`count(*)::int` }).from(clients);
    const refused = await owner.agent
      .post('/api/jobs')
      .send({ ...newJob('Mixed up'), property: { id: other.property.id } })
      .expect(400);
    expect(refused.body.errors).toEqual([
      { pointer: '/property/id', detail: 'This property belongs to another client.' },
    ]);
    const after = await test.database.queries.select({ n: sql<number>`count(*)::int` }).from(clients);
    expect(after).toEqual(before);
  });

  it('names every fault of the input, unknown fields too', async () => {
    const answer = await owner.agent
      .post('/api/jobs')
      .send({ ...newJob(' '), colour: 'blue' })
      .expect(400);
    const pointers = answer.body.errors.map((error: { pointer: string }) => error.pointer);
    expect(pointers).toEqual(expect.arrayContaining(['/name', '/colour']));
  });

  it('edits only what is named, and keeps dates as days', async () => {
    const job = await create('To edit');
    const edited = await owner.agent
      .patch(`/api/jobs/${job.id}`)
      .send({ stage: 'prepare', siteWalkOn: '2026-03-29', installOn: '2026-12-31' })
      .expect(200);
    expect(edited.body).toMatchObject({
      name: 'To edit',
      stage: 'prepare',
      siteWalkOn: '2026-03-29',
      installOn: '2026-12-31',
    });
    const cleared = await owner.agent.patch(`/api/jobs/${job.id}`).send({ installOn: null }).expect(200);
    expect(cleared.body).toMatchObject({ siteWalkOn: '2026-03-29', installOn: null });
    await owner.agent.patch(`/api/jobs/${job.id}`).send({ installOn: '31/12/2026' }).expect(400);
  });

  it('lets the crew fill in the site walk, and nothing else', async () => {
    const job = await create('Survey');
    const saved = await crew.agent.put(`/api/jobs/${job.id}/site-walk`).send(survey).expect(200);
    expect(saved.body.siteWalk).toEqual(survey);
    await crew.agent
      .put(`/api/jobs/${job.id}/site-walk`)
      .send({ ...survey, protected: 'perhaps' })
      .expect(400);
    await crew.agent.patch(`/api/jobs/${job.id}`).send({ name: 'Mine' }).expect(403);
    await crew.agent.post('/api/jobs').send(newJob('Mine')).expect(403);
    await crew.agent.post(`/api/jobs/${job.id}/archive`).expect(403);
  });

  it('shows a company nothing of another', async () => {
    const job = await create('Private');
    await stranger.agent.get(`/api/jobs/${job.id}`).expect(404);
    await stranger.agent.patch(`/api/jobs/${job.id}`).send({ name: 'Taken' }).expect(404);
    await stranger.agent.put(`/api/jobs/${job.id}/site-walk`).send(survey).expect(404);
    await stranger.agent.post(`/api/jobs/${job.id}/archive`).expect(404);
    await stranger.agent
      .post('/api/jobs')
      .send({ name: 'Theirs', client: { id: job.client.id }, property: { id: job.property.id } })
      .expect(404);
    await stranger.agent
      .post('/api/properties')
      .send({ clientId: job.client.id, name: 'Theirs', address: '' })
      .expect(404);
    expect((await stranger.agent.get('/api/jobs').expect(200)).body).toMatchObject({ items: [], total: 0 });
    expect((await stranger.agent.get('/api/clients').expect(200)).body).toMatchObject({ total: 0 });
    const properties = await stranger.agent.get(`/api/properties?clientId=${job.client.id}`).expect(200);
    expect(properties.body.items).toEqual([]);
  });
});

describe('the list of jobs', () => {
  let test: TestApp;
  let owner: TestPerson;
  const ids: Record<string, string> = {};
  beforeAll(async () => {
    test = await startTestApp();
    owner = await addPerson(test, await addCompany(test), 'owner');
    for (const [name, client] of [
      ['Birch Lane', 'Ann'],
      ['alder court', 'Bea'],
      ['100% cedar', 'Cy'],
      ['Dogwood', 'Di'],
    ] as const) {
      const made = await owner.agent.post('/api/jobs').send(newJob(name, client)).expect(201);
      ids[name] = made.body.id;
    }
    await owner.agent.patch(`/api/jobs/${ids['Birch Lane']}`).send({ stage: 'install' }).expect(200);
    await owner.agent.post(`/api/jobs/${ids.Dogwood}/archive`).expect(200);
  });
  afterAll(() => test?.close());

  const names = async (query: string) => {
    const answer = await owner.agent.get(`/api/jobs?${query}`).expect(200);
    return answer.body.items.map((item: { name: string }) => item.name);
  };

  it('sorts by name without regard to case, and by stage in the order of the work', async () => {
    expect(await names('sort=name')).toEqual(['100% cedar', 'alder court', 'Birch Lane']);
    expect(await names('sort=name&direction=desc')).toEqual(['Birch Lane', 'alder court', '100% cedar']);
    expect((await names('sort=stage')).at(-1)).toBe('Birch Lane');
    expect(await names('sort=created')).toEqual(['100% cedar', 'alder court', 'Birch Lane']);
    expect(await names('')).toEqual(['Birch Lane', '100% cedar', 'alder court']);
  });

  it('finds by job, client and address, and takes signs of patterns literally', async () => {
    expect(await names('search=BIRCH')).toEqual(['Birch Lane']);
    expect(await names('search=bea')).toEqual(['alder court']);
    expect(await names('search=mill+rise')).toHaveLength(3);
    expect(await names('search=%25')).toEqual(['100% cedar']);
    expect(await names('search=_')).toEqual([]);
  });

  it('filters by stage and by what is archived', async () => {
    expect(await names('stage=install')).toEqual(['Birch Lane']);
    expect(await names('archived=true')).toEqual(['Dogwood']);
    await owner.agent.post(`/api/jobs/${ids.Dogwood}/restore`).expect(200);
    expect(await names('archived=true')).toEqual([]);
    await owner.agent.post(`/api/jobs/${ids.Dogwood}/archive`).expect(200);
  });

  it('pages, and still tells the total beyond the end', async () => {
    const second = await owner.agent.get('/api/jobs?sort=name&pageSize=2&page=2').expect(200);
    expect(second.body).toMatchObject({ total: 3, page: 2, pageSize: 2 });
    expect(second.body.items).toHaveLength(1);
    const beyond = await owner.agent.get('/api/jobs?pageSize=2&page=9').expect(200);
    expect(beyond.body).toMatchObject({ total: 3, items: [] });
    await owner.agent.get('/api/jobs?page=0').expect(400);
    await owner.agent.get('/api/jobs?sort=client').expect(400);
  });

  it('shows what the server last worked out of the plan, and counts an edit of the plan as an update', async () => {
    const { companyId } = owner.actor;
    const jobId = ids['alder court']!;
    const { queries } = test.database;
    await queries.insert(plans).values({ companyId, jobId, schemaVersion: 1, version: 12 });
    const summary = { companyId, jobId, solverVersion: '1', summary: {} };
    await queries.insert(planSummaries).values([
      { ...summary, planVersion: 12, faults: 3, cautions: 1, fixtures: 14 },
      { ...summary, planVersion: 9, faults: 8, cautions: 0, fixtures: 11 },
    ]);
    const list = await owner.agent.get('/api/jobs').expect(200);
    expect(list.body.items[0]).toMatchObject({ name: 'alder court', faults: 3, cautions: 1, fixtures: 14 });
    expect(list.body.items[1]).toMatchObject({ faults: null, cautions: null, fixtures: null });
    const opened = await owner.agent.get(`/api/jobs/${jobId}`).expect(200);
    expect(opened.body.updatedAt).toBe(list.body.items[0].updatedAt);
    expect(Date.parse(opened.body.updatedAt)).toBeGreaterThan(Date.parse(opened.body.createdAt));

    // A plan that only began is no edit.
    await queries.update(plans).set({ version: 1 }).where(sql`${plans.jobId} = ${jobId}`);
    const began = await owner.agent.get(`/api/jobs/${jobId}`).expect(200);
    expect(Date.parse(began.body.updatedAt)).toBeLessThan(Date.parse(opened.body.updatedAt));
    await queries.delete(jobs).where(sql`${jobs.id} = ${jobId}`);
  });
});
