import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { type Agent, startTestApp, type TestApp } from '../../../test/harness.js';
import { meSchema } from '../auth/auth.dto.js';
import { lettersTo, tokenFor } from '../auth/auth.testkit.js';
import { companySchema } from './companies.dto.js';
import { fillEveryTable, tablesOfCompanies } from './companies.testkit.js';

describe('the company', () => {
  let test: TestApp;
  let owner: Agent;
  let password: string;
  let email: string;
  let companyId: string;
  beforeAll(async () => {
    test = await startTestApp();
  });
  afterAll(() => test.close());
  beforeEach(async () => {
    ({ agent: owner, password, email } = await test.signUp());
    companyId = companySchema.parse((await owner.get('/api/company').expect(200)).body).id;
  });

  const edit = async (change: object) =>
    companySchema.parse((await owner.patch('/api/company').send(change).expect(200)).body);

  it('begins with the usual values of its region', async () => {
    const { settings, words } = companySchema.parse((await owner.get('/api/company')).body);
    expect(settings).toMatchObject({
      units: 'imperial',
      currency: 'USD',
      lineVolts: 120,
      conductorTemperatureC: 25,
      waterClearanceMeters: 3.048,
      transformerTargetPercent: 80,
      aim: { led: { minVolts: 10.5, maxVolts: 13 }, halogen: { minVolts: 10.8, maxVolts: 12 } },
    });
    expect(words).toEqual({ wiringRules: 'NEC', protectiveDevice: 'GFCI' });
  });

  it('takes the values of another region with it, but for those of its own', async () => {
    await edit({ settings: { conductorTemperatureC: 40 } });
    const moved = await edit({ region: 'uk', name: 'Moved Lights' });
    expect(moved).toMatchObject({
      name: 'Moved Lights',
      region: 'uk',
      words: { wiringRules: 'IEC 60364-7-715', protectiveDevice: 'RCD' },
      settings: { units: 'metric', currency: 'GBP', lineVolts: 230, conductorTemperatureC: 40 },
    });
    // A form that sends every value back unchanged makes none of them the company's own.
    await edit({ settings: moved.settings });
    expect((await edit({ region: 'us' })).settings).toMatchObject({
      lineVolts: 120,
      conductorTemperatureC: 40,
    });
  });

  it('refuses settings that make no sense, by field', async () => {
    const answer = await owner
      .patch('/api/company')
      .send({
        settings: {
          lineVolts: -1,
          aim: { led: { minVolts: 13, maxVolts: 10 }, halogen: { minVolts: 10.8, maxVolts: 12 } },
          currency: 'dollars',
          colour: 'red',
        },
      })
      .expect(400);
    const pointers = (answer.body.errors as { pointer: string }[]).map(({ pointer }) => pointer);
    expect(pointers).toEqual(
      expect.arrayContaining(['/settings/lineVolts', '/settings/currency', '/settings/colour']),
    );
    expect(pointers.some((pointer) => pointer.startsWith('/settings/aim/led'))).toBe(true);
  });

  it('has an evening: a schedule, a time zone of the region and, once it is told, a place', async () => {
    const { settings } = companySchema.parse((await owner.get('/api/company')).body);
    expect(settings).toMatchObject({
      schedule: { on: { kind: 'sunset', minutesAfter: 0 }, off: { kind: 'clock', at: '23:00' } },
      timeZone: 'America/New_York',
      place: null,
    });
    const schedule = {
      on: { kind: 'sunset', minutesAfter: 20 },
      off: { kind: 'sunrise', minutesAfter: -30 },
    };
    const place = { latitude: 40.2, longitude: -75 };
    const told = await edit({ settings: { schedule, place, timeZone: 'Asia/Kolkata' } });
    expect(told.settings).toMatchObject({ schedule, place, timeZone: 'Asia/Kolkata' });
    expect((await edit({ settings: { place: null } })).settings.place).toBeNull();
    await edit({ settings: settings });
  });

  it('refuses an evening that makes no sense, by field', async () => {
    const refused = async (evening: object) => {
      const { body } = await owner.patch('/api/company').send({ settings: evening }).expect(400);
      return body.errors.map(({ pointer }: { pointer: string }) => pointer);
    };
    const off = { kind: 'clock', at: '23:00' };
    expect(await refused({ timeZone: 'Nowhere/Marlow_Bend' })).toEqual(['/settings/timeZone']);
    expect(await refused({ place: { latitude: 91, longitude: 0 } })).toEqual(['/settings/place/latitude']);
    expect(await refused({ place: { latitude: 40 } })).toEqual(['/settings/place/longitude']);
    expect(await refused({ schedule: { on: { kind: 'clock', at: '25:00' }, off } })).toEqual([
      '/settings/schedule/on/at',
    ]);
    expect(await refused({ schedule: { on: { kind: 'sunset', minutesAfter: 0.5 }, off } })).toEqual([
      '/settings/schedule/on/minutesAfter',
    ]);
  });

  it('loses no edit of two at once', async () => {
    await Promise.all([
      edit({ settings: { transformerTargetPercent: 70 } }),
      edit({ settings: { slackAtFixtureMeters: 1 } }),
      edit({ name: 'Both' }),
    ]);
    expect(companySchema.parse((await owner.get('/api/company')).body)).toMatchObject({
      name: 'Both',
      settings: { transformerTargetPercent: 70, slackAtFixtureMeters: 1 },
    });
  });

  it('is deleted only with its name and the password, with all that it has', async () => {
    const { name } = await edit({ name: 'Short Lived' });
    const client = await owner.post('/api/clients').send({ name: 'A client' }).expect(201);
    const property = await owner
      .post('/api/properties')
      .send({ clientId: client.body.id, name: 'A yard', address: '1 Lane' })
      .expect(201);
    expect(property.body.id).toBeDefined();
    await owner.post('/api/invitations').send({ email: 'mate@example.com', role: 'crew' }).expect(201);
    const mate = test.agent();
    const token = await tokenFor(test.database, 'mate@example.com');
    await mate
      .post('/api/invitations/accept')
      .send({ token, name: 'Mate', password: 'the mates password' })
      .expect(200);
    await owner.post('/api/invitations').send({ email: 'never@example.com', role: 'crew' }).expect(201);

    await fillEveryTable(test.database, companyId);
    const tables = async () => {
      const [full, empty]: [string[], string[]] = [[], []];
      for (const table of await tablesOfCompanies(test.database)) {
        const sql = `SELECT 1 FROM "${table}" WHERE company_id = $1`;
        const { rows } = await test.database.executeSql(sql, [companyId]);
        (rows.length > 0 ? full : empty).push(table);
      }
      return { full, empty };
    };
    const { full, empty: before } = await tables();
    expect(before).toEqual([]);
    expect(full).toEqual(
      expect.arrayContaining(['plan_changes', 'proposal_revisions', 'approvals', 'payments', 'job_events']),
    );

    await mate.delete('/api/company').send({ password: 'the mates password', name }).expect(403);
    await owner.delete('/api/company').send({ password: 'not it', name }).expect(400);
    const wrong = await owner.delete('/api/company').send({ password, name: 'Other' }).expect(400);
    expect(wrong.body.errors).toMatchObject([{ pointer: '/name' }]);
    await owner.delete('/api/company').send({ password, name }).expect(204);

    const { empty } = await tables();
    expect(empty).toEqual(await tablesOfCompanies(test.database));
    const jobs = await test.database.executeSql(
      `SELECT start_after > now() + interval '30 minutes' AS later FROM pgboss.job
       WHERE name = 'storage.delete' AND data = jsonb_build_object('prefix', $1::text) ORDER BY start_after`,
      [`${companyId}/`],
    );
    // The second takes what a worker stored that did not know yet.
    expect(jobs.rows).toEqual([{ later: false }, { later: true }]);
    // People keep their accounts.
    for (const agent of [owner, mate])
      expect(meSchema.parse((await agent.get('/api/auth/me').expect(200)).body)).toMatchObject({
        company: null,
        companies: [],
      });
    expect((await lettersTo(test.database, email)).at(-1)?.subject).toBe('Short Lived was deleted');
  });

  it('leaves its members in another company of theirs', async () => {
    const { body } = await owner
      .post('/api/auth/sign-up')
      .send({ companyName: 'Second', name: 'Same', email, password })
      .expect(201);
    expect(body.company.name).toBe('Second');
    await owner.delete('/api/company').send({ password, name: 'Second' }).expect(204);
    expect(meSchema.parse((await owner.get('/api/auth/me')).body).company?.id).toBe(companyId);
  });
});
