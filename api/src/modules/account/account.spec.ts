import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { type Agent, startTestApp, type TestApp } from '../../../test/harness.js';
import { meSchema } from '../auth/auth.dto.js';
import { lettersTo, tokenFor } from '../auth/auth.testkit.js';
import { sessionListSchema } from './account.dto.js';

describe('a person’s own account', () => {
  let test: TestApp;
  beforeAll(async () => {
    test = await startTestApp();
  });
  afterAll(() => test.close());

  const signIn = (email: string, password: string) =>
    test.agent().post('/api/auth/sign-in').send({ email, password });
  const meOf = async (agent: Agent) => meSchema.parse((await agent.get('/api/auth/me').expect(200)).body);

  it('keeps name and preferences, each on its own', async () => {
    const { agent } = await test.signUp();
    expect((await meOf(agent)).user.preferences).toEqual({ units: 'imperial', theme: 'system' });
    await agent
      .patch('/api/account')
      .send({ preferences: { theme: 'dark' } })
      .expect(200);
    await agent.patch('/api/account').send({ name: ' New Name ' }).expect(200);
    const answer = await agent
      .patch('/api/account')
      .send({ preferences: { units: 'metric' } })
      .expect(200);
    expect(meSchema.parse(answer.body).user).toMatchObject({
      name: 'New Name',
      preferences: { units: 'metric', theme: 'dark' },
    });
    await agent
      .patch('/api/account')
      .send({ preferences: { theme: 'purple' } })
      .expect(400);
    await agent.patch('/api/account').send({ email: 'x@example.com' }).expect(400);
  });

  it('changes the password, stays signed in here, and nowhere else', async () => {
    const { agent, email, password } = await test.signUp();
    const other = test.agent();
    await other.post('/api/auth/sign-in').send({ email, password }).expect(200);
    const next = 'quite another password';
    const wrong = await agent.post('/api/account/password').send({ current: 'not it', next }).expect(400);
    expect(wrong.body.errors).toMatchObject([{ pointer: '/current' }]);
    await agent.post('/api/account/password').send({ current: password, next }).expect(204);
    await agent.get('/api/auth/me').expect(200);
    await other.get('/api/auth/me').expect(401);
    await signIn(email, password).expect(401);
    await signIn(email, next).expect(200);
  });

  it('changes the address only by the link sent to it, and tells the former one', async () => {
    const { agent, email, password } = await test.signUp();
    const fresh = `new-${email}`;
    await agent.post('/api/account/email').send({ password: 'not it', email: fresh }).expect(400);
    await agent.post('/api/account/email').send({ password, email: fresh }).expect(202);
    expect((await meOf(agent)).user.email).toBe(email);
    const token = await tokenFor(test.database, fresh);
    await test.agent().post('/api/auth/confirm-email').send({ token }).expect(204);
    await test.agent().post('/api/auth/confirm-email').send({ token }).expect(410);
    expect((await meOf(agent)).user.email).toBe(fresh);
    expect((await lettersTo(test.database, email)).map(({ subject }) => subject)).toEqual([
      'A new address was asked for',
      'Your address was changed',
    ]);
    await signIn(email, password).expect(401);
    await signIn(fresh, password).expect(200);
  });

  it('stops a change of address by a newer one, or by a change of password', async () => {
    const { agent, email, password } = await test.signUp();
    await agent
      .post('/api/account/email')
      .send({ password, email: `a-${email}` })
      .expect(202);
    const first = await tokenFor(test.database, `a-${email}`);
    await agent
      .post('/api/account/email')
      .send({ password, email: `b-${email}` })
      .expect(202);
    await test.agent().post('/api/auth/confirm-email').send({ token: first }).expect(410);
    const second = await tokenFor(test.database, `b-${email}`);
    await agent
      .post('/api/account/password')
      .send({ current: password, next: 'changed in a hurry' })
      .expect(204);
    await test.agent().post('/api/auth/confirm-email').send({ token: second }).expect(410);
    // A link for one purpose does not serve another.
    await test.agent().post('/api/auth/forgot-password').send({ email }).expect(202);
    const reset = await tokenFor(test.database, email);
    await test.agent().post('/api/auth/confirm-email').send({ token: reset }).expect(410);
  });

  it('does not tell whether another address has an account', async () => {
    const { agent, password } = await test.signUp();
    const { email: taken } = await test.signUp();
    const answers = [
      await agent.post('/api/account/email').send({ password, email: taken }).expect(202),
      await agent.post('/api/account/email').send({ password, email: 'free@example.com' }).expect(202),
    ];
    expect(answers[0]!.body).toEqual(answers[1]!.body);
    expect((await lettersTo(test.database, taken))[0]?.subject).toBe('This address already has an account');
    expect((await lettersTo(test.database, taken))[0]?.text).not.toContain('token');
  });

  it('refuses an address that was taken after the link was sent', async () => {
    const { agent, password } = await test.signUp();
    await agent.post('/api/account/email').send({ password, email: 'race@example.com' }).expect(202);
    const token = await tokenFor(test.database, 'race@example.com');
    await test.signUp({ email: 'race@example.com' });
    await test.agent().post('/api/auth/confirm-email').send({ token }).expect(410);
  });

  it('lists the sessions that are open, and ends one of them', async () => {
    const { agent, email, password } = await test.signUp();
    const other = test.agent();
    await other.post('/api/auth/sign-in').set('User-Agent', 'A phone').send({ email, password }).expect(200);
    const { items } = sessionListSchema.parse((await agent.get('/api/account/sessions').expect(200)).body);
    expect(items).toHaveLength(2);
    expect(items.filter(({ current }) => current)).toHaveLength(1);
    const phone = items.find(({ userAgent }) => userAgent === 'A phone');
    expect(phone?.current).toBe(false);
    const stranger = (await test.signUp()).agent;
    await stranger.delete(`/api/account/sessions/${phone?.id}`).expect(404);
    await other.get('/api/auth/me').expect(200);
    await agent.delete(`/api/account/sessions/${phone?.id}`).expect(204);
    await other.get('/api/auth/me').expect(401);
    await agent.delete(`/api/account/sessions/${phone?.id}`).expect(404);
    await agent.delete('/api/account/sessions/nonsense').expect(400);
  });

  it('does not orphan a company', async () => {
    const { agent, password } = await test.signUp();
    const alone = await agent.delete('/api/account').send({ password }).expect(409);
    expect(alone.body).toMatchObject({ code: 'only-member', detail: expect.stringContaining('Company') });
    await joinAs(agent, 'designer');
    expect((await agent.delete('/api/account').send({ password }).expect(409)).body.code).toBe('only-owner');
    await joinAs(agent, 'owner');
    await agent.delete('/api/account').send({ password: 'not it' }).expect(400);
    await agent.delete('/api/account').send({ password }).expect(204);
    await agent.get('/api/auth/me').expect(401);
  });

  it('deletes a person and keeps the company’s records, without personal data', async () => {
    const { agent: owner } = await test.signUp();
    const leaver = await joinAs(owner, 'designer');
    const client = await leaver.agent.post('/api/clients').send({ name: 'A client' }).expect(201);
    await leaver.agent
      .post('/api/account/email')
      .send({ password: leaver.password, email: 'l2@example.com' });
    await leaver.agent.delete('/api/account').send({ password: leaver.password }).expect(204);

    await owner.get(`/api/clients/${client.body.id}`).expect(200);
    expect((await owner.get('/api/members')).body.items).toHaveLength(1);
    await signIn(leaver.email, leaver.password).expect(401);
    const { rows } = await test.database.executeSql('SELECT * FROM users WHERE id = $1', [leaver.id]);
    expect(rows).toMatchObject([{ name: 'Former member', password_hash: null, preferences: {} }]);
    // Nothing in any table of the product names them any more.
    const { rows: tables } = await test.database.executeSql(
      "SELECT table_name AS name FROM information_schema.tables WHERE table_schema = 'public'",
    );
    for (const { name } of tables as { name: string }[]) {
      const { rows: found } = await test.database.executeSql(
        `SELECT 1 FROM "${name}" t WHERE t::text ILIKE $1 OR t::text ILIKE $2`,
        [`%${leaver.email}%`, `%${leaver.name}%`],
      );
      expect(found, name).toEqual([]);
    }
    // The address is free again.
    await test.signUp({ email: leaver.email });
  });

  let joined = 0;
  async function joinAs(owner: Agent, role: string) {
    joined += 1;
    const email = `leaver-${joined}@example.com`;
    await owner.post('/api/invitations').send({ email, role }).expect(201);
    const token = await tokenFor(test.database, email);
    const agent = test.agent();
    const [name, password] = [`Leaver number ${joined}`, 'a password of theirs'];
    const { body } = await agent.post('/api/invitations/accept').send({ token, name, password }).expect(200);
    return { agent, name, email, password, id: meSchema.parse(body).user.id };
  }
});
