import { get } from 'node:http';
import { apply, placeNote } from '@lampwright/geometry/plan';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { countedIds, must } from '../../../../geometry/src/plan/plan.testkit.js';
import { startTestApp, type TestApp } from '../../../test/harness.js';
import { addCompany, addPerson, type TestPerson } from '../../../test/people.js';
import { addJob, addSheet, getPlan, save } from './plans.testkit.js';

/** A server-sent stream as it arrives. */
function listen(test: TestApp, person: TestPerson, jobId: string) {
  const versions: number[] = [];
  let raw = '';
  let wake = () => {};
  const request = get(`${test.url}/api/jobs/${jobId}/plan/events`, { headers: { Cookie: person.cookie } });
  const ended = new Promise<void>((resolve, reject) => {
    request.on('error', reject);
    request.on('response', (response) => {
      if (response.statusCode !== 200) reject(new Error(`the stream answered ${response.statusCode}`));
      response.setEncoding('utf8');
      response.on('data', (text: string) => {
        raw += text;
        for (const [, version] of text.matchAll(/^data: \{"version":(\d+)\}$/gm))
          versions.push(Number(version));
        wake();
      });
      response.on('end', resolve);
      response.on('error', reject);
    });
  });
  const until = async (version: number) => {
    while (!versions.includes(version)) await new Promise<void>((resolve) => (wake = resolve));
  };
  return { versions, until, ended, close: () => request.destroy(), raw: () => raw };
}

describe('the stream of plan versions', () => {
  let test: TestApp;
  let designer: TestPerson;
  let crew: TestPerson;
  beforeEach(async () => {
    test = await startTestApp();
    const company = await addCompany(test);
    designer = await addPerson(test, company, 'designer');
    crew = await addPerson(test, company, 'crew');
  });
  afterEach(() => test?.close());

  const ids = countedIds();
  async function write(jobId: string) {
    const { plan, version } = await getPlan(designer.agent, jobId);
    const note = must(placeNote(plan, { sheetId: 'sheet1', at: { x: 1, y: 1 }, text: 'x' }, ids));
    expect(apply(plan, note).size).toBe(plan.size + 1);
    return (await save(designer.agent, jobId, { baseVersion: version, changes: [note] })).version;
  }

  it('tells the present version at once and each new one, of its plan only', async () => {
    const [jobId, otherId] = [await addJob(designer), await addJob(designer, 'Another')];
    for (const id of [jobId, otherId]) await addSheet(test, designer, id);
    const { version } = await getPlan(crew.agent, jobId);
    const stream = listen(test, crew, jobId);
    await stream.until(version);
    await write(otherId);
    await stream.until(await write(jobId));
    expect(stream.versions).toEqual([version, version + 1]);
    expect(stream.raw()).toMatch(/^retry: \d+\n\n/);
    stream.close();
    await stream.ended.catch(() => undefined);
  });

  it('goes on after the database dropped the connection, and misses nothing', async () => {
    const jobId = await addJob(designer);
    await addSheet(test, designer, jobId);
    const stream = listen(test, crew, jobId);
    await stream.until((await getPlan(crew.agent, jobId)).version);
    // The present version is told before the connection is there.
    await vi.waitFor(async () => {
      const { rows } = await test.database.executeSql(
        "SELECT pg_terminate_backend(pid) FROM pg_stat_activity WHERE application_name = 'lampwright-listen' AND datname = current_database()",
      );
      expect(rows).toHaveLength(1);
    }, 10_000);
    await stream.until(await write(jobId));
    stream.close();
    await stream.ended.catch(() => undefined);
  });

  it('ends when the server shuts down, and does not hold it up', async () => {
    const jobId = await addJob(designer);
    const stream = listen(test, crew, jobId);
    await stream.until((await getPlan(crew.agent, jobId)).version);
    const before = performance.now();
    await test.app.close();
    await stream.ended;
    expect(performance.now() - before).toBeLessThan(8000);
  });
});
