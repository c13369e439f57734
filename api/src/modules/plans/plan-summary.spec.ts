import { apply, drawCable, placeTransformer } from '@lampwright/geometry/plan';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { cable12, choice, must, transformer300 } from '../../../../geometry/src/plan/plan.testkit.js';
import { startTestApp, type TestApp } from '../../../test/harness.js';
import { addCompany, addPerson, type TestPerson } from '../../../test/people.js';
import { plantThree, save } from './plans.testkit.js';

describe('the summary of a plan', () => {
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

  it('makes a summary on the server after a save, with the volts of its own solver', async () => {
    const { jobId, ids, f1, ...rest } = await plantThree(test, designer);
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
