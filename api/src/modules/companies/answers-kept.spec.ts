import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { startTestApp, type TestApp } from '../../../test/harness.js';
import { addCompany, addPerson } from '../../../test/people.js';
import { OnceRepository } from '../../http/once.repository.js';
import { CompaniesRepository } from './companies.repository.js';

let test: TestApp;
beforeAll(async () => {
  test = await startTestApp();
});
afterAll(() => test?.close());

it('loses with a company what its people and homeowners were answered, and nothing of others', async () => {
  const [gone, stays] = [await addCompany(test), await addCompany(test)];
  const user = (await addPerson(test, stays, 'owner')).actor.userId;
  const link = randomUUID();
  const once = test.app.get(OnceRepository, { strict: false });
  const scopes = [
    `company ${gone} user ${user}`,
    `company ${gone} link ${link}`,
    `company ${stays} user ${user}`,
    `company ${stays} link ${link}`,
    `user ${user}`,
  ];
  for (const scope of scopes)
    await once.keep(
      { scope, key: 'k', route: 'POST /', bodyHash: '' },
      { status: 200, body: { name: 'Ida' } },
    );
  await test.app.get(CompaniesRepository, { strict: false }).delete(gone);
  const { rows } = await test.database.executeSql('SELECT scope FROM idempotency_keys');
  expect((rows as { scope: string }[]).map(({ scope }) => scope).sort()).toEqual(scopes.slice(2).sort());
});
