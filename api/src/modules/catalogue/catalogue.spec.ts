import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { startTestApp, type TestApp } from '../../../test/harness.js';
import { addCompany, addPerson, type TestPerson } from '../../../test/people.js';
import { CatalogueService } from './catalogue.service.js';
import { starterCatalogue } from './starter/index.js';

describe('the catalogue', () => {
  let test: TestApp;
  let owner: TestPerson;
  let crew: TestPerson;
  let stranger: TestPerson;
  beforeAll(async () => {
    test = await startTestApp();
    const company = await addCompany(test);
    const other = await addCompany(test);
    for (const id of [company, other]) await test.app.get(CatalogueService, { strict: false }).seed(id);
    owner = await addPerson(test, company, 'owner');
    crew = await addPerson(test, company, 'crew');
    stranger = await addPerson(test, other, 'owner');
  });
  afterAll(() => test?.close());

  const hub = (name: string, ways = 6) => ({ item: { category: 'hub', name, ways } });

  it('begins with the starter items, each company with its own', async () => {
    const mine = (await crew.agent.get('/api/catalogue').expect(200)).body.items;
    const theirs = (await stranger.agent.get('/api/catalogue').expect(200)).body.items;
    expect(mine).toHaveLength(starterCatalogue.length);
    const ids = new Set(mine.map((entry: { id: string }) => entry.id));
    expect(theirs.filter((entry: { id: string }) => ids.has(entry.id))).toEqual([]);
  });

  it('is given to a company as it signs up', async () => {
    const { agent } = await test.signUp();
    const { items } = (await agent.get('/api/catalogue').expect(200)).body;
    expect(items).toHaveLength(starterCatalogue.length);
  });

  it('filters by category and name', async () => {
    const lamps = (await owner.agent.get('/api/catalogue?category=lamp&search=halogen').expect(200)).body;
    expect(lamps.items).toHaveLength(5);
    await owner.agent.get('/api/catalogue?category=brands').expect(400);
  });

  it('takes, replaces, archives and restores an item', async () => {
    const made = (await owner.agent.post('/api/catalogue').send(hub('Post hub')).expect(201)).body;
    const path = `/api/catalogue/${made.id}`;
    const changed = await owner.agent.put(path).send(hub('Post hub, tall', 8)).expect(200);
    expect(changed.body.item).toEqual({ category: 'hub', name: 'Post hub, tall', ways: 8 });
    await owner.agent.post(`${path}/archive`).expect(200);
    const find = async (archived: boolean) =>
      (await owner.agent.get(`/api/catalogue?search=post+hub&archived=${archived}`).expect(200)).body.items
        .length;
    expect([await find(false), await find(true)]).toEqual([0, 1]);
    await owner.agent.post(`${path}/restore`).expect(200);
    expect([await find(false), await find(true)]).toEqual([1, 0]);
  });

  it('refuses what is no item, by pointer', async () => {
    const answer = await owner.agent.post('/api/catalogue').send(hub('Bad hub', 1)).expect(400);
    expect(answer.body.errors).toMatchObject([{ pointer: '/item/ways' }]);
  });

  it('is changed by planners of the company only', async () => {
    const made = (await owner.agent.post('/api/catalogue').send(hub('Guarded hub')).expect(201)).body;
    const path = `/api/catalogue/${made.id}`;
    await crew.agent.post('/api/catalogue').send(hub('Mine')).expect(403);
    await crew.agent.put(path).send(hub('Mine')).expect(403);
    await stranger.agent.put(path).send(hub('Mine')).expect(404);
    await stranger.agent.post(`${path}/archive`).expect(404);
    expect(await test.agent().get('/api/catalogue')).toMatchObject({ status: 401 });
  });
});
