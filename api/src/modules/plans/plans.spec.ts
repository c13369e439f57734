import {
  apply,
  type Change,
  deleteRecords,
  drawCable,
  moveRecords,
  PLAN_SCHEMA_VERSION,
  type PlanDocument,
  placeFixture,
  placeNote,
  placeTransformer,
  rebase,
  resolveConflicts,
} from '@lampwright/geometry/plan';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import {
  cable12,
  choice,
  countedIds,
  must,
  pathLight,
  randomEdit,
  seeded,
  transformer300,
} from '../../../../geometry/src/plan/plan.testkit.js';
import { startTestApp, type TestApp } from '../../../test/harness.js';
import { addCompany, addPerson, type TestPerson } from '../../../test/people.js';
import { PlanDocuments } from './plan-documents.js';
import { addJob, addSheet, getPlan, save, saveInConflict } from './plans.testkit.js';

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

  /** A job with a sheet and three fixtures, placed by the designer. */
  async function threeFixtures() {
    const jobId = await addJob(designer);
    await addSheet(test, designer, jobId);
    const ids = countedIds(`${jobId.slice(0, 8)}-`);
    let { plan, version } = await getPlan(designer.agent, jobId);
    const fixtures: string[] = [];
    for (const x of [100, 200, 300]) {
      const placing = { sheetId: 'sheet1', at: { x, y: 100 }, fixture: choice(pathLight), lamp: null };
      const edit = placeFixture(plan, placing, ids);
      const change = must(edit);
      ({ version } = await save(designer.agent, jobId, {
        session: 'a',
        baseVersion: version,
        changes: [change],
      }));
      plan = apply(plan, change);
      if (edit.kind === 'change') fixtures.push(...edit.selected);
    }
    const [f1 = '', f2 = '', f3 = ''] = fixtures;
    return { jobId, ids, plan, version, f1, f2, f3 };
  }

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

  it.each([21, 22])(
    'seed %i: two clients in random order converge, and the plan is its changes replayed',
    async (seed) => {
      const jobId = await addJob(designer, `Seed ${seed}`);
      await addSheet(test, designer, jobId);
      const random = seeded(seed);
      const start = await getPlan(designer.agent, jobId);
      const clients = [designer, second].map((person, i) => ({
        person,
        ids: countedIds(`s${seed}c${i}-`),
        session: `session-${i}`,
        version: start.version,
        view: start.plan,
        unsent: [] as Change[],
      }));
      let conflicts = 0;
      const send = async (client: (typeof clients)[number]) => {
        const { person, session } = client;
        if (client.unsent.length > 0) {
          const body = { session, baseVersion: client.version, changes: client.unsent };
          const answer = await person.agent.post(`/api/jobs/${jobId}/plan/changes`).send(body);
          if (answer.status === 409) {
            conflicts += 1;
            // Decides at random, change by change, on what the server now has.
            let { plan, version } = await getPlan(person.agent, jobId);
            for (const change of client.unsent) {
              const choices = new Map(
                answer.body.conflicts.map((c: { recordId: string }) => [
                  c.recordId,
                  random() < 0.5 ? 'mine' : 'theirs',
                ]),
              ) as Map<string, 'mine' | 'theirs'>;
              const rebased = rebase(plan, plan, change);
              const own = rebased.kind === 'conflict' ? rebased.conflicts : [];
              const told = answer.body.conflicts.filter(
                (c: { recordId: string }) => change.put[c.recordId] ?? change.remove.includes(c.recordId),
              );
              const decided = resolveConflicts(plan, change, [...told, ...own], choices, client.ids());
              ({ version } = await save(person.agent, jobId, {
                session,
                baseVersion: version,
                changes: [decided],
              }));
              plan = apply(plan, decided);
            }
          } else expect(answer.status, answer.text).toBe(200);
        }
        const { plan, version } = await getPlan(person.agent, jobId);
        Object.assign(client, { view: plan, version, unsent: [] });
      };
      for (let i = 0; i < 150; i += 1) {
        const client = clients[random() < 0.5 ? 0 : 1]!;
        if (random() < 0.15) await send(client);
        else {
          const change = randomEdit(client.view, random, client.ids);
          if (!change) continue;
          client.unsent.push(change);
          client.view = apply(client.view, change);
        }
      }
      for (const client of [...clients, ...clients]) await send(client);
      expect(asObject(clients[0]!.view)).toEqual(asObject(clients[1]!.view));
      expect(conflicts).toBeGreaterThan(0);
      const documents = test.app.get(PlanDocuments, { strict: false });
      const key = { companyId: designer.actor.companyId, jobId };
      const { version, plan } = (await documents.read(key))!;
      expect(asObject(await documents.at(key, version))).toEqual(asObject(plan));
      expect(version).toBeGreaterThan(30);
    },
  );

  it('keeps snapshots, and replays from them to the same plan', async () => {
    const jobId = await addJob(designer, 'Long history');
    await addSheet(test, designer, jobId);
    let { plan, version } = await getPlan(designer.agent, jobId);
    const ids = countedIds('long-');
    const views = new Map([[version, plan]]);
    while (version < 430) {
      const changes = Array.from({ length: 50 }, (_, i) => {
        const change = must(placeNote(plan, { sheetId: 'sheet1', at: { x: i, y: version }, text: 'x' }, ids));
        plan = apply(plan, change);
        return change;
      });
      ({ version } = await save(designer.agent, jobId, { baseVersion: version, changes }));
      views.set(version, plan);
    }
    const documents = test.app.get(PlanDocuments, { strict: false });
    const key = { companyId: designer.actor.companyId, jobId };
    const { rows } = await test.database.executeSql('SELECT version FROM plan_snapshots WHERE job_id = $1', [
      jobId,
    ]);
    expect(rows).toHaveLength(2);
    for (const [at, view] of views) expect(asObject(await documents.at(key, at))).toEqual(asObject(view));
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

  it('makes a summary on the server after a save, with the volts of its own solver', async () => {
    const { jobId, ids, f1, ...rest } = await threeFixtures();
    let { plan, version } = rest;
    const place = { sheetId: 'sheet1', at: { x: 0, y: 100 } };
    const placed = placeTransformer(plan, { ...place, transformer: choice(transformer300) }, ids);
    const [t = ''] = placed.kind === 'change' ? placed.selected : [];
    plan = apply(plan, must(placed));
    const stops = [t, f1].map((id) => ({ on: 'record' as const, id }));
    const wired = must(drawCable(plan, { sheetId: 'sheet1', stops, cable: choice(cable12) }, ids));
    const changes = [must(placed), wired];
    ({ version } = await save(designer.agent, jobId, { baseVersion: version, changes }));
    const worker = await test.startWorker();
    const path = `/api/jobs/${jobId}/plan/summary`;
    const { body } = await until(
      () => crew.agent.get(path),
      (r) => r.body.summary?.planVersion === version,
    );
    await worker.close();
    expect(body.version).toBe(version);
    expect(body.summary).toMatchObject({
      fixtures: 3,
      unwired: 2,
      waiting: 0,
      failure: null,
      cableMeters: expect.closeTo(1 + 0.9144 + 0.6096, 6),
      conduitMeters: 0,
      counts: { fault: 0, caution: 2 },
    });
    // 1 m drawn and the slack of US settings, 3 W at 0.9: some millivolts below 12 V.
    expect(body.summary.lowestVolts).toBeGreaterThan(11.95);
    expect(body.summary.lowestVolts).toBeLessThan(12);
    expect(body.summary.runs).toMatchObject([
      { label: 'run 1', lengthMeters: expect.closeTo(1 + 0.9144 + 0.6096, 6) },
    ]);
    const { body: list } = await crew.agent.get('/api/jobs?pageSize=100').expect(200);
    const job = list.items.find((item: { id: string }) => item.id === jobId);
    expect(JSON.stringify(job)).toContain('"fixtures":3');
  });
});

/** Asks until the answer is as wanted, for ten seconds at most. */
async function until<T>(ask: () => PromiseLike<T>, done: (answer: T) => boolean): Promise<T> {
  for (let i = 0; i < 100; i += 1) {
    const answer = await ask();
    if (done(answer)) return answer;
    await new Promise((resolve) => setTimeout(resolve, 100));
  }
  throw new Error('no such answer came in ten seconds');
}
