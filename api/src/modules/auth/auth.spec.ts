import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { startTestApp, type TestApp } from '../../../test/harness.js';
import { SESSION_COOKIE } from '../../access/cookie.js';
import { meSchema } from './auth.dto.js';
import { lettersTo, tokenFor } from './auth.testkit.js';

describe('signing up, in and out', () => {
  let test: TestApp;
  beforeAll(async () => {
    test = await startTestApp();
  });
  afterAll(() => test.close());

  const cookieOf = (answer: { headers: Record<string, unknown> }) => {
    const cookies = answer.headers['set-cookie'] as unknown as string[] | undefined;
    return cookies?.find((cookie) => cookie.startsWith(`${SESSION_COOKIE}=`)) ?? '';
  };

  it('makes a company with its owner, signed in', async () => {
    const agent = test.agent();
    const answer = await agent
      .post('/api/auth/sign-up')
      .send({
        companyName: ' Alder Lights ',
        name: 'Ada Alder',
        email: ' Ada@Example.com',
        password: 'ten letters',
        region: 'eu',
      })
      .expect(201);
    const me = meSchema.parse(answer.body);
    expect(me).toMatchObject({
      user: {
        name: 'Ada Alder',
        email: 'ada@example.com',
        preferences: { units: 'metric', theme: 'system' },
      },
      company: {
        name: 'Alder Lights',
        region: 'eu',
        settings: { lineVolts: 230 },
        words: { protectiveDevice: 'RCD' },
      },
      role: 'owner',
    });
    expect(me.companies).toEqual([{ id: me.company?.id, name: 'Alder Lights', role: 'owner' }]);
    expect(cookieOf(answer)).toMatch(/; HttpOnly; SameSite=Lax$/);
    expect((await agent.get('/api/auth/me').expect(200)).body).toEqual(answer.body);
  });

  it('says what is wrong with a form, by field', async () => {
    const answer = await test
      .agent()
      .post('/api/auth/sign-up')
      .send({ companyName: '', name: 'A\nB', email: 'nobody', password: 'short', more: 1 })
      .expect(400);
    const pointers = (answer.body.errors as { pointer: string }[]).map(({ pointer }) => pointer);
    expect(pointers.sort()).toEqual(['/companyName', '/email', '/more', '/name', '/password']);
    const { email } = await test.signUp();
    for (const [password, at] of [
      ['x'.repeat(201), 400],
      ['x'.repeat(200), 401],
    ] as const)
      await test.agent().post('/api/auth/sign-in').send({ email, password }).expect(at);
  });

  it('answers 401 without a session, with one that ended, and with a token of another maker', async () => {
    await test.agent().get('/api/auth/me').expect(401);
    const forged = `${Buffer.from('{"alg":"none"}').toString('base64url')}.${Buffer.from('{"sid":"x"}').toString('base64url')}.`;
    await test.agent().get('/api/auth/me').set('Cookie', `${SESSION_COOKIE}=${forged}`).expect(401);
    const { agent } = await test.signUp();
    await test.database.executeSql('UPDATE sessions SET expires_at = now()');
    await agent.get('/api/auth/me').expect(401);
  });

  it('begins a new session at each sign-in and ends the one before', async () => {
    const { email, password } = await test.signUp();
    const first = await test.agent().post('/api/auth/sign-in').send({ email, password }).expect(200);
    const planted = cookieOf(first).split(';')[0]!;
    const second = await test
      .agent()
      .post('/api/auth/sign-in')
      .set('Cookie', planted)
      .send({ email, password })
      .expect(200);
    const fresh = cookieOf(second).split(';')[0]!;
    expect(fresh).not.toBe(planted);
    await test.agent().get('/api/auth/me').set('Cookie', planted).expect(401);
    await test.agent().get('/api/auth/me').set('Cookie', fresh).expect(200);
  });

  it('signs out here, or everywhere, at once', async () => {
    const { agent, email, password } = await test.signUp();
    const other = test.agent();
    await other.post('/api/auth/sign-in').send({ email, password }).expect(200);
    const kept = test.agent();
    const cookie = cookieOf(await kept.post('/api/auth/sign-in').send({ email, password })).split(';')[0]!;
    await kept.post('/api/auth/sign-out').expect(204);
    await kept.get('/api/auth/me').expect(401);
    await test.agent().get('/api/auth/me').set('Cookie', cookie).expect(401);
    await agent.get('/api/auth/me').expect(200);
    await agent.post('/api/auth/sign-out-everywhere').expect(204);
    for (const one of [agent, other]) await one.get('/api/auth/me').expect(401);
    await test.agent().post('/api/auth/sign-out').expect(204);
  });

  it('forgets sessions that ended long ago', async () => {
    const { agent, email, password } = await test.signUp();
    await agent.post('/api/auth/sign-out').expect(204);
    const count = async () => {
      const { rows } = await test.database.executeSql(
        'SELECT count(*)::int AS n FROM sessions s JOIN users u ON u.id = s.user_id WHERE u.email = $1',
        [email],
      );
      return (rows[0] as { n: number }).n;
    };
    await test.agent().post('/api/auth/sign-in').send({ email, password }).expect(200);
    expect(await count()).toBe(2);
    await test.database.executeSql(
      "UPDATE sessions SET revoked_at = revoked_at - interval '91 days' WHERE revoked_at IS NOT NULL",
    );
    await test.agent().post('/api/auth/sign-in').send({ email, password }).expect(200);
    expect(await count()).toBe(2);
  });

  it('keeps answers behind the sign-in out of caches', async () => {
    const { agent } = await test.signUp();
    for (const path of ['/api/auth/me', '/api/company', '/api/members'])
      expect((await agent.get(path).expect(200)).headers['cache-control']).toBe('no-store');
  });

  it('answers alike for a wrong password and for nobody', async () => {
    const { email } = await test.signUp();
    const [wrong, nobody] = await Promise.all(
      [email, 'nobody-at-all@example.com'].map((address) =>
        test
          .agent()
          .post('/api/auth/sign-in')
          .send({ email: address, password: 'a wrong password' })
          .expect(401),
      ),
    );
    const { requestId: _a, ...first } = wrong!.body;
    const { requestId: _b, ...second } = nobody!.body;
    expect(first).toEqual(second);
  });

  it('refuses a sign-up with somebody’s address without naming why, and tells them', async () => {
    const { email, password } = await test.signUp();
    const form = { companyName: 'Second', name: 'Somebody', email };
    const refused = await test
      .agent()
      .post('/api/auth/sign-up')
      .send({ ...form, password: 'not their password' })
      .expect(400);
    expect(refused.body.code).toBe('sign-up-refused');
    expect(cookieOf(refused)).toBe('');
    expect((await lettersTo(test.database, email)).map(({ subject }) => subject)).toEqual([
      'You already have an account',
    ]);
    // With their own password they own one company more, and one only.
    for (const _ of [1, 2]) {
      const agent = test.agent();
      const me = meSchema.parse(
        (
          await agent
            .post('/api/auth/sign-up')
            .send({ ...form, password })
            .expect(201)
        ).body,
      );
      expect(me.company?.name).toBe('Second');
      expect(me.companies).toHaveLength(2);
    }
  });

  it('makes one account of many sign-ups at once', async () => {
    const form = { companyName: 'Once', name: 'Una', email: 'una@example.com', password: 'una una una' };
    const answers = await Promise.all(
      Array.from({ length: 6 }, () => test.agent().post('/api/auth/sign-up').send(form)),
    );
    expect(answers.map(({ status }) => status)).toEqual([201, 201, 201, 201, 201, 201]);
    expect(new Set(answers.map(({ body }) => meSchema.parse(body).company?.id)).size).toBe(1);
  });

  it('lets a person with several companies change between them, and into no other', async () => {
    const { agent, email, password } = await test.signUp();
    const stranger = meSchema.parse((await (await test.signUp()).agent.get('/api/auth/me')).body);
    const first = meSchema.parse((await agent.get('/api/auth/me')).body);
    const second = meSchema.parse(
      (
        await agent
          .post('/api/auth/sign-up')
          .send({ companyName: 'Another', name: 'Same', email, password })
          .expect(201)
      ).body,
    );
    const back = await agent
      .post('/api/auth/active-company')
      .send({ companyId: first.company?.id })
      .expect(200);
    expect(meSchema.parse(back.body).company?.id).toBe(first.company?.id);
    expect(second.company?.id).not.toBe(first.company?.id);
    await agent.post('/api/auth/active-company').send({ companyId: stranger.company?.id }).expect(404);
    // The next sign-in begins where the last one worked.
    const again = await test.agent().post('/api/auth/sign-in').send({ email, password }).expect(200);
    expect(meSchema.parse(again.body).company?.id).toBe(first.company?.id);
  });

  it('gives a new password by mail, once, and signs out everywhere', async () => {
    const { agent, email, password } = await test.signUp();
    const stale = await linkAfterAsking(email);
    const token = await linkAfterAsking(email);
    const next = 'another long password';
    await test.agent().post('/api/auth/reset-password').send({ token, password: 'short' }).expect(400);
    await test.agent().post('/api/auth/reset-password').send({ token, password: next }).expect(204);
    await agent.get('/api/auth/me').expect(401);
    for (const used of [token, stale, 'no such token'])
      await test.agent().post('/api/auth/reset-password').send({ token: used, password: next }).expect(410);
    await test.agent().post('/api/auth/sign-in').send({ email, password }).expect(401);
    await test.agent().post('/api/auth/sign-in').send({ email, password: next }).expect(200);
    expect((await lettersTo(test.database, email)).at(-1)?.subject).toBe('Your password was changed');
  });

  it('lets one of many uses of a link at once through', async () => {
    const { email } = await test.signUp();
    const token = await linkAfterAsking(email);
    const answers = await Promise.all(
      Array.from({ length: 8 }, (_, n) =>
        test
          .agent()
          .post('/api/auth/reset-password')
          .send({ token, password: `chosen by number ${n}` }),
      ),
    );
    expect(answers.map(({ status }) => status).sort()).toEqual([204, ...Array<number>(7).fill(410)]);
  });

  it('refuses a link whose time has run out', async () => {
    const { email } = await test.signUp();
    const token = await linkAfterAsking(email);
    await test.database.executeSql("UPDATE email_tokens SET expires_at = now() - interval '1 second'");
    await test
      .agent()
      .post('/api/auth/reset-password')
      .send({ token, password: 'too late by far' })
      .expect(410);
  });

  it('keeps only hashes of links', async () => {
    const { email } = await test.signUp();
    const token = await linkAfterAsking(email);
    const { rows } = await test.database.executeSql('SELECT * FROM email_tokens');
    expect(JSON.stringify(rows)).not.toContain(token);
    expect(Buffer.from(token, 'base64url')).toHaveLength(32);
  });

  it('answers a forgotten password alike for nobody, and writes to nobody', async () => {
    const answer = await test
      .agent()
      .post('/api/auth/forgot-password')
      .send({ email: 'not-here@example.com' })
      .expect(202);
    expect(answer.body).toEqual({});
    expect(await lettersTo(test.database, 'not-here@example.com')).toEqual([]);
  });

  it('sends no more than five reset letters an hour', async () => {
    const { email } = await test.signUp();
    await Promise.all(
      Array.from({ length: 9 }, () =>
        test.agent().post('/api/auth/forgot-password').send({ email }).expect(202),
      ),
    );
    expect(await lettersTo(test.database, email)).toHaveLength(5);
  });

  it('refuses what another site’s page sends', async () => {
    const { email, password } = await test.signUp();
    const signIn = () => test.agent().post('/api/auth/sign-in').send({ email, password });
    expect((await signIn().set('Sec-Fetch-Site', 'cross-site').expect(403)).body.code).toBe('cross-site');
    await signIn().set('Sec-Fetch-Site', 'same-site').expect(403);
    await signIn().set('Origin', 'https://elsewhere.example').expect(403);
    await signIn().set('Origin', 'null').expect(403);
    await signIn().set('Sec-Fetch-Site', 'same-origin').expect(200);
    await signIn().set('Origin', 'http://127.0.0.1:3000').expect(200);
    await signIn().expect(200);
  });

  async function linkAfterAsking(email: string): Promise<string> {
    await test.agent().post('/api/auth/forgot-password').send({ email }).expect(202);
    return tokenFor(test.database, email);
  }
});
