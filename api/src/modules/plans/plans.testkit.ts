import {
  apply,
  type Change,
  type PlanConflict,
  type PlanDocument,
  type PlanRecord,
  placeFixture,
  planOf,
} from '@lampwright/geometry/plan';
import { choice, countedIds, must, pathLight, sheet } from '../../../../geometry/src/plan/plan.testkit.js';
import type { Agent, TestApp } from '../../../test/harness.js';
import type { TestPerson } from '../../../test/people.js';
import { PlacedSheets } from './placed-sheets.js';

export interface SaveBody {
  readonly session?: string;
  readonly baseVersion: number;
  readonly own?: readonly string[];
  readonly changes: readonly unknown[];
}
export interface Committed {
  readonly version: number;
  readonly change: Change;
}
export interface SavedBody {
  readonly version: number;
  readonly applied: readonly { readonly id: string; readonly version: number }[];
  readonly others: readonly Committed[];
}
export interface ConflictBody {
  readonly code: string;
  readonly version: number;
  readonly conflicts: readonly (PlanConflict & { readonly changeId: string })[];
  readonly others: readonly Committed[];
}

/** A job with a client and a property of its own. */
export async function addJob(designer: TestPerson, name = 'Weir Walk'): Promise<string> {
  const { body } = await designer.agent
    .post('/api/jobs')
    .send({ name, client: { name: 'Ida Fairweather' }, property: { name: 'Front', address: '1 Weir Walk' } })
    .expect(201);
  return body.id as string;
}

/** Puts the sheet that the geometry's test edits draw on, as the worker does when an image is ready. */
export async function addSheet(test: TestApp, person: TestPerson, jobId: string): Promise<void> {
  await test.app.get(PlacedSheets, { strict: false }).place(person.actor.companyId, jobId, sheet());
}

export async function getPlan(
  agent: Agent,
  jobId: string,
): Promise<{ version: number; plan: PlanDocument; records: PlanRecord[] }> {
  const { body } = await agent.get(`/api/jobs/${jobId}/plan`).expect(200);
  return { version: body.version, records: body.records, plan: planOf(body.records as PlanRecord[]) };
}

export async function save(agent: Agent, jobId: string, body: SaveBody): Promise<SavedBody> {
  const answer = await agent.post(`/api/jobs/${jobId}/plan/changes`).send(body);
  if (answer.status !== 200) throw new Error(`save answered ${answer.status}: ${answer.text.slice(0, 2000)}`);
  return answer.body as SavedBody;
}

export async function saveInConflict(agent: Agent, jobId: string, body: SaveBody): Promise<ConflictBody> {
  const answer = await agent.post(`/api/jobs/${jobId}/plan/changes`).send(body).expect(409);
  return answer.body as ConflictBody;
}

/** A job with a sheet and three fixtures, placed by the designer. */
export async function plantThree(test: TestApp, designer: TestPerson) {
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
