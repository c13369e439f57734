import {
  apply,
  deleteRecords,
  drawCable,
  moveRecords,
  PLAN_SCHEMA_VERSION,
  type PlanDocument,
  placeNote,
  resolveConflicts,
} from '@lampwright/geometry/plan';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { cable12, choice, countedIds, must } from '../../../../geometry/src/plan/plan.testkit.js';
import { startTestApp, type TestApp } from '../../../test/harness.js';
import { addCompany, addPerson, type TestPerson } from '../../../test/people.js';
import { getPlan, plantThree, save, saveInConflict } from './plans.testkit.js';

const asObject = (plan: PlanDocument) => Object.fromEntries(plan);

describe('plans', () => {
  let test: TestApp;
  let designer: TestPerson;
  let second: TestPerson;
  let crew: TestPerson;
  let stranger: TestPerson;
  beforeAll(async () => {
    test = await startTestApp();
    const company = await addCompany(test);
    designer = await addPerson(test, company, 'designer');
    second = await addPerson(test, company, 'owner');
    crew = await addPerson(test, company, 'crew');
    stranger = await addPerson(test, await addCompany(test, 'Another'), 'owner');
  });
  afterAll(() => test?.close());

  const threeFixtures = () => plantThree(test, designer);

  it('begins with the settings of the company, and keeps what is saved', async () => {
    const { jobId, plan, version } = await threeFixtures();
    const read = await getPlan(crew.agent, jobId);
    expect(read.version).toBe(version);
    expect(asObject(read.plan)).toEqual(asObject(plan));
    expect(read.plan.get('settings')).toMatchObject({ lineVolts: 120 });
  });

  it('is read by the crew, written by owner and designer, and hidden from other companies', async () => {
    const { jobId, plan, version, ids, f1 } = await threeFixtures();
    const body = { baseVersion: version, changes: [must(moveRecords(plan, [f1], 1, 1, ids))] };
    const path = `/api/jobs/${jobId}/plan`;
    await crew.agent.post(`${path}/changes`).send(body).expect(403);
    await crew.agent.post(`${path}/restore`).send({ version: 1 }).expect(403);
    for (const route of [
      path,
      `${path}/changes?since=0`,
      `${path}/history`,
      `${path}/summary`,
      `${path}/events`,
    ])
      await stranger.agent.get(route).expect(404);
    await stranger.agent.post(`${path}/changes`).send(body).expect(404);
    await test.agent().get(path).expect(401);
    await second.agent.post(`${path}/changes`).send(body).expect(200);
  });

  it('answers a repeated change as it did first', async () => {
    const { jobId, plan, version, ids, f1 } = await threeFixtures();
    const change = must(moveRecords(plan, [f1], 5, 0, ids));
    const first = await save(designer.agent, jobId, { baseVersion: version, changes: [change] });
    const later = must(placeNote(plan, { sheetId: 'sheet1', at: { x: 1, y: 1 }, text: 'later' }, ids));
    await save(second.agent, jobId, { baseVersion: first.version, changes: [later] });
    const again = await save(designer.agent, jobId, { baseVersion: version, changes: [change] });
    expect(again.applied).toEqual(first.applied);
    expect(again).toMatchObject({ version: version + 2, others: [{ version: version + 2, change: later }] });
    const { body } = await designer.agent.get(`/api/jobs/${jobId}/plan/changes?since=${version}`).expect(200);
    expect(body).toMatchObject({ version: version + 2, more: false });
    expect(body.changes).toHaveLength(2);
  });

  it('merges changes of different records and tells each author what the other did', async () => {
    const { jobId, plan, version, ids, f1, f2 } = await threeFixtures();
    const mine = must(moveRecords(plan, [f1], 5, 0, ids));
    const theirs = must(moveRecords(plan, [f2], 0, 5, ids));
    await save(second.agent, jobId, { session: 'b', baseVersion: version, changes: [theirs] });
    const saved = await save(designer.agent, jobId, { session: 'a', baseVersion: version, changes: [mine] });
    expect(saved).toEqual({
      version: version + 2,
      applied: [{ id: mine.id, version: version + 2 }],
      others: [{ version: version + 1, change: theirs }],
    });
    const read = await getPlan(crew.agent, jobId);
    expect(asObject(read.plan)).toEqual(asObject(apply(apply(plan, theirs), mine)));
  });

  it('tells the later of two who changed one record, and saves nothing of that request', async () => {
    const { jobId, plan, version, ids, f1, f2 } = await threeFixtures();
    const theirs = must(moveRecords(plan, [f1], 0, 5, ids));
    await save(second.agent, jobId, { session: 'b', baseVersion: version, changes: [theirs] });
    const free = must(moveRecords(plan, [f2], 9, 9, ids));
    const mine = must(moveRecords(plan, [f1], 5, 0, ids));
    const again = must(moveRecords(apply(plan, mine), [f1], 5, 0, ids));
    const changes = [free, mine, again];
    const told = await saveInConflict(designer.agent, jobId, { session: 'a', baseVersion: version, changes });
    expect(told).toMatchObject({
      code: 'plan-conflict',
      version: version + 1,
      others: [{ version: version + 1, change: theirs }],
      conflicts: [
        {
          changeId: mine.id,
          recordId: f1,
          reason: 'changed',
          base: plan.get(f1),
          theirs: theirs.put[f1],
          mine: again.put[f1],
        },
      ],
    });
    const present = (await getPlan(designer.agent, jobId)).plan;
    expect(present.get(f2)).toEqual(plan.get(f2));
    const conflicts = told.conflicts;
    const decided = resolveConflicts(present, mine, conflicts, new Map([[f1, 'mine']]), 'decided');
    await save(designer.agent, jobId, { session: 'a', baseVersion: told.version, changes: [free, decided] });
    expect((await getPlan(designer.agent, jobId)).plan.get(f1)).toEqual(again.put[f1]);
  });

  it('does not hold an author’s own earlier changes against the later ones', async () => {
    const { jobId, plan, version, ids, f1 } = await threeFixtures();
    const one = must(moveRecords(plan, [f1], 5, 0, ids));
    const two = must(moveRecords(apply(plan, one), [f1], 5, 0, ids));
    const three = must(moveRecords(apply(apply(plan, one), two), [f1], 5, 0, ids));
    await save(designer.agent, jobId, { session: 'a', baseVersion: version, changes: [one] });
    await save(designer.agent, jobId, { session: 'a', baseVersion: version, changes: [two] });
    // Another window that took over the first's unsent changes names them.
    await saveInConflict(designer.agent, jobId, { session: 'c', baseVersion: version, changes: [three] });
    const own = [one.id, two.id];
    await save(designer.agent, jobId, { session: 'c', baseVersion: version, own, changes: [three] });
    expect((await getPlan(designer.agent, jobId)).plan.get(f1)).toMatchObject({ at: { x: 115, y: 100 } });
  });

  it('takes changes made on a version that a restored backup no longer knows', async () => {
    const { jobId, plan, version, ids, f1 } = await threeFixtures();
    const change = must(moveRecords(plan, [f1], 5, 0, ids));
    const saved = await save(designer.agent, jobId, { baseVersion: version + 500, changes: [change] });
    expect(saved).toMatchObject({ version: version + 1, others: [] });
  });

  it('conflicts where a change needs what somebody removed', async () => {
    const { jobId, plan, version, ids, f1, f2 } = await threeFixtures();
    const stops = [f1, f2].map((id) => ({ on: 'record' as const, id }));
    const mine = must(drawCable(plan, { sheetId: 'sheet1', stops, cable: choice(cable12) }, ids));
    await save(second.agent, jobId, {
      baseVersion: version,
      changes: [must(deleteRecords(plan, [f2], ids))],
    });
    const told = await saveInConflict(designer.agent, jobId, { baseVersion: version, changes: [mine] });
    expect(told.conflicts).toMatchObject([
      { recordId: f2, reason: 'missing', theirs: null, mine: plan.get(f2) },
    ]);
    // Broken from the start, with nobody else involved: the same answer.
    const gone = await saveInConflict(designer.agent, jobId, { baseVersion: version + 1, changes: [mine] });
    expect(gone.conflicts).toMatchObject([{ reason: 'missing' }]);
  });

  it('refuses what is no change, naming every fault, and newer forms in words', async () => {
    const { jobId, version } = await threeFixtures();
    const post = (changes: unknown[]) =>
      designer.agent.post(`/api/jobs/${jobId}/plan/changes`).send({ baseVersion: version, changes });
    const note = { kind: 'note', id: 'n', sheetId: 'sheet1', at: { x: 0, y: 0 }, text: 'x' };
    const change = { id: 'c', schema: PLAN_SCHEMA_VERSION, put: { n: note }, remove: [] };
    const bad = await post([{ ...change, put: { n: { ...note, text: 1 } } }, 'nonsense', change]).expect(400);
    expect(bad.body.errors.map((e: { pointer: string }) => e.pointer)).toEqual([
      '/changes/0/put/n/text',
      '/changes/1',
    ]);
    const newer = await post([{ ...change, schema: PLAN_SCHEMA_VERSION + 1 }]).expect(400);
    expect(newer.body).toMatchObject({ code: 'plan-schema-newer' });
    expect(newer.body.detail).toMatch(/Reload the page/);
    for (const text of ['a\u0000b', 'half \ud83d of a pair']) {
      const answer = await post([{ ...change, put: { n: { ...note, text } } }]).expect(400);
      expect(answer.body.errors[0].pointer).toBe('/changes/0/put/n/text');
    }
    await post([change, change]).expect(400);
    await post([]).expect(400);
    await post([{ ...change, put: { n: { ...note, text: '🌙 fine' } } }]).expect(200);
  });

  it('takes a change near the size of a large plan, and refuses one beyond the limit', async () => {
    const { jobId, version } = await threeFixtures();
    const notes = (n: number, length: number) =>
      Object.fromEntries(
        Array.from({ length: n }, (_, i) => [
          `n${i}`,
          { kind: 'note', id: `n${i}`, sheetId: 'sheet1', at: { x: i, y: i }, text: 'x'.repeat(length) },
        ]),
      );
    const body = (put: Record<string, unknown>) => ({
      baseVersion: version,
      changes: [{ id: 'big', schema: PLAN_SCHEMA_VERSION, put, remove: [] }],
    });
    const path = `/api/jobs/${jobId}/plan/changes`;
    await designer.agent
      .post(path)
      .send(body(notes(5000, 1900)))
      .expect(413);
    await designer.agent
      .post(path)
      .send(body(notes(5000, 1400)))
      .expect(200);
    expect((await getPlan(designer.agent, jobId)).plan.size).toBe(5000 + 6);
  });

  it('keeps archived jobs as they are', async () => {
    const { jobId, plan, version, ids, f1 } = await threeFixtures();
    await designer.agent.post(`/api/jobs/${jobId}/archive`).expect(200);
    const body = { baseVersion: version, changes: [must(moveRecords(plan, [f1], 1, 1, ids))] };
    const { body: told } = await designer.agent
      .post(`/api/jobs/${jobId}/plan/changes`)
      .send(body)
      .expect(409);
    expect(told).toMatchObject({ code: 'job-archived' });
    await designer.agent.get(`/api/jobs/${jobId}/plan`).expect(200);
  });

  it('tells the history by person and time, and restores a version as a new one', async () => {
    const { jobId, plan, version, ids, f1 } = await threeFixtures();
    const removal = must(deleteRecords(plan, [f1], ids));
    await save(second.agent, jobId, { baseVersion: version, changes: [removal] });
    const path = `/api/jobs/${jobId}/plan`;
    const { body: page } = await crew.agent.get(`${path}/history?limit=2`).expect(200);
    expect(page.items).toMatchObject([
      { version: version + 1, label: 'Removed 1 fixture', author: { id: second.actor.userId } },
      { version, label: 'Added 1 fixture', author: { id: designer.actor.userId } },
    ]);
    const { body: rest } = await crew.agent.get(`${path}/history?before=${page.next}`).expect(200);
    expect(rest.items.at(-1)).toMatchObject({ version: 1, author: null });
    expect(rest.next).toBeNull();

    const restored = await designer.agent
      .post(`${path}/restore`)
      .send({ version, changeId: 'back' })
      .expect(201);
    expect(restored.body).toMatchObject({ version: version + 2 });
    expect(asObject((await getPlan(crew.agent, jobId)).plan)).toEqual(asObject(plan));
    const again = await designer.agent
      .post(`${path}/restore`)
      .send({ version, changeId: 'back' })
      .expect(201);
    expect(again.body.version).toBe(version + 2);
    await designer.agent.post(`${path}/restore`).send({ version: 999 }).expect(404);
  });

  it('lets many writers of one plan through, one at a time', async () => {
    const { jobId, plan, version } = await threeFixtures();
    const saves = Array.from({ length: 12 }, async (_, i) => {
      const at = { x: i, y: i };
      const change = must(placeNote(plan, { sheetId: 'sheet1', at, text: `${i}` }, countedIds(`w${i}-`)));
      const person = i % 2 ? designer : second;
      return save(person.agent, jobId, { session: `w${i}`, baseVersion: version, changes: [change] });
    });
    const versions = (await Promise.all(saves)).map((saved) => saved.applied[0]!.version);
    expect(versions.sort((a, b) => a - b)).toEqual(Array.from({ length: 12 }, (_, i) => version + 1 + i));
    expect((await getPlan(designer.agent, jobId)).plan.size).toBe(plan.size + 12);
  });
});
