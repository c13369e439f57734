import {
  apply,
  type Change,
  type PlanDocument,
  placeNote,
  rebase,
  resolveConflicts,
} from '@lampwright/geometry/plan';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { countedIds, must, randomEdit, seeded } from '../../../../geometry/src/plan/plan.testkit.js';
import { startTestApp, type TestApp } from '../../../test/harness.js';
import { addCompany, addPerson, type TestPerson } from '../../../test/people.js';
import { PlanDocuments } from './plan-documents.js';
import { addJob, addSheet, getPlan, save } from './plans.testkit.js';

const asObject = (plan: PlanDocument) => Object.fromEntries(plan);

describe('a plan and its changes', () => {
  let test: TestApp;
  let designer: TestPerson;
  let second: TestPerson;
  beforeAll(async () => {
    test = await startTestApp();
    const company = await addCompany(test);
    designer = await addPerson(test, company, 'designer');
    second = await addPerson(test, company, 'owner');
  });
  afterAll(() => test?.close());

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
});
