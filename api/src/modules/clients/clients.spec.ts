import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { startTestApp, type TestApp } from '../../../test/harness.js';
import { addCompany, addPerson, type TestPerson } from '../../../test/people.js';

describe('clients and properties', () => {
  let test: TestApp;
  let designer: TestPerson;
  let crew: TestPerson;
  beforeAll(async () => {
    test = await startTestApp();
    const company = await addCompany(test);
    designer = await addPerson(test, company, 'designer');
    crew = await addPerson(test, company, 'crew');
  });
  afterAll(() => test?.close());

  const create = async (name: string) =>
    (await designer.agent.post('/api/clients').send({ name, phone: ' 555 0100 ' }).expect(201)).body;

  it('keeps, edits, archives and restores a client', async () => {
    const client = await create('  Ida Fairweather ');
    expect(client).toMatchObject({ name: 'Ida Fairweather', phone: '555 0100', email: null });
    const path = `/api/clients/${client.id}`;
    const edited = await designer.agent.patch(path).send({ email: 'ida@example.org' }).expect(200);
    expect(edited.body).toMatchObject({ name: 'Ida Fairweather', email: 'ida@example.org' });
    await designer.agent.patch(path).send({ email: 'ida at example' }).expect(400);
    expect((await designer.agent.post(`${path}/archive`).expect(200)).body.archivedAt).not.toBeNull();
    expect((await designer.agent.get('/api/clients?search=ida').expect(200)).body.total).toBe(0);
    expect((await designer.agent.get('/api/clients?search=ida&archived=true').expect(200)).body.total).toBe(
      1,
    );
    expect((await designer.agent.post(`${path}/restore`).expect(200)).body.archivedAt).toBeNull();
  });

  it('refuses text that the database cannot hold, in words', async () => {
    const refused = await designer.agent.post('/api/clients').send({ name: 'Ida\u0000' }).expect(400);
    expect(refused.body.code).toBe('bad-text');
    await designer.agent.get('/api/clients?search=%00').expect(400);
  });

  it('lists with the number of live jobs', async () => {
    const client = await create('Tom Brook');
    const property = { name: 'Front', address: '1 Weir Walk' };
    for (const name of ['One', 'Two', 'Three'])
      await designer.agent
        .post('/api/jobs')
        .send({ name, client: { id: client.id }, property })
        .expect(201);
    const { body: jobs } = await designer.agent.get('/api/jobs?search=tom+brook').expect(200);
    await designer.agent.post(`/api/jobs/${jobs.items[0].id}/archive`).expect(200);
    const { body } = await designer.agent.get('/api/clients?search=tom').expect(200);
    expect(body.items).toMatchObject([{ name: 'Tom Brook', jobs: 2 }]);
    const properties = await designer.agent.get(`/api/properties?clientId=${client.id}`).expect(200);
    expect(properties.body.items).toHaveLength(3);
  });

  it('keeps a place only when both of its coordinates are known', async () => {
    const client = await create('Una Field');
    const property = { clientId: client.id, name: 'Rear', address: '2 Weir Walk' };
    const refused = await designer.agent
      .post('/api/properties')
      .send({ ...property, latitude: 40 })
      .expect(400);
    expect(refused.body.errors[0].pointer).toBe('/longitude');
    const made = await designer.agent
      .post('/api/properties')
      .send({ ...property, latitude: 40, longitude: -75 })
      .expect(201);
    const path = `/api/properties/${made.body.id}`;
    await designer.agent.patch(path).send({ latitude: null }).expect(400);
    const moved = await designer.agent.patch(path).send({ accessNotes: 'Gate on the left' }).expect(200);
    expect(moved.body).toMatchObject({ latitude: 40, longitude: -75, accessNotes: 'Gate on the left' });
    expect((await designer.agent.get(path).expect(200)).body).toEqual(moved.body);
  });

  it('lets the crew look but not write', async () => {
    const client = await create('Vic Marsh');
    await crew.agent.get(`/api/clients/${client.id}`).expect(200);
    await crew.agent.post('/api/clients').send({ name: 'Mine' }).expect(403);
    await crew.agent.patch(`/api/clients/${client.id}`).send({ name: 'Mine' }).expect(403);
    await test.agent().get(`/api/clients/${client.id}`).expect(401);
  });
});
