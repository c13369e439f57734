import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { startTestApp, type TestApp } from '../../test/harness.js';
import { tokenFor } from '../modules/auth/auth.testkit.js';

describe('the limit on failed passwords', () => {
  let test: TestApp;
  beforeAll(async () => {
    test = await startTestApp({ TRUST_PROXY_HOPS: '1' });
  });
  afterAll(() => test.close());

  const signIn = (email: string, password: string, address = '192.0.2.1') =>
    test.agent().post('/api/auth/sign-in').set('X-Forwarded-For', address).send({ email, password });

  async function fail(email: string, times: number, address?: string): Promise<void> {
    for (let n = 0; n < times; n += 1) await signIn(email, 'a wrong password', address).expect(401);
  }

  it('lets the tenth failure pass and refuses the eleventh attempt, even with the right password', async () => {
    const { email, password } = await test.signUp();
    await fail(email, 10);
    const refused = await signIn(email, password).expect(429);
    expect(refused.body.code).toBe('too-many-attempts');
    const wait = Number(refused.headers['retry-after']);
    expect(wait).toBeGreaterThan(14 * 60);
    expect(wait).toBeLessThanOrEqual(15 * 60);
    // Another way of writing the same address does not help, another place does.
    await signIn(` ${email.toUpperCase()} `, password).expect(429);
    await signIn(email, password, '192.0.2.2').expect(200);
    await signIn(email, password).expect(429);
  });

  it('counts anew after a success', async () => {
    const { email, password } = await test.signUp();
    await fail(email, 9);
    await signIn(email, password).expect(200);
    await fail(email, 10);
    await signIn(email, password).expect(429);
  });

  it('counts what is within fifteen minutes, and lets go one by one', async () => {
    const { email, password } = await test.signUp();
    await test.database.executeSql('DELETE FROM sign_in_failures');
    await fail(email, 10);
    const age = (minutes: string) =>
      test.database.executeSql(
        `UPDATE sign_in_failures SET at = at - $1::interval
         WHERE id IN (SELECT id FROM sign_in_failures ORDER BY at LIMIT 1)`,
        [minutes],
      );
    await age('14 minutes');
    const refused = await signIn(email, password).expect(429);
    expect(Number(refused.headers['retry-after'])).toBeLessThanOrEqual(60);
    await age('1 minute 1 second');
    await signIn(email, 'a wrong password').expect(401);
    await signIn(email, password).expect(429);
  });

  it('looks at no more than ten of many passwords tried at once', async () => {
    const { email, password } = await test.signUp();
    const answers = await Promise.all(
      Array.from({ length: 40 }, (_, n) => signIn(email, `wrong password ${n}`)),
    );
    const count = (status: number) => answers.filter((answer) => answer.status === status).length;
    expect([count(401), count(429)]).toEqual([10, 30]);
    await signIn(email, password).expect(429);
  });

  it('counts for accounts that don’t exist alike', async () => {
    await fail('nobody@example.com', 10);
    await signIn('nobody@example.com', 'a wrong password').expect(429);
  });

  it('takes the addresses that one IPv6 customer may choose from as one', async () => {
    const { email, password } = await test.signUp();
    await fail(email, 5, '2001:db8:1:2::1');
    await fail(email, 5, '2001:db8:1:2:ffff::9');
    await signIn(email, password, '2001:db8:1:2:3:4:5:6').expect(429);
    await signIn(email, password, '2001:db8:1:3::1').expect(200);
  });

  it('counts every other place that asks for the password', async () => {
    const { agent, email, password } = await test.signUp();
    const post = (path: string, body: object) =>
      agent.post(path).set('X-Forwarded-For', '192.0.2.1').send(body);
    const wrong = 'a wrong password';
    const tries: (() => Promise<{ status: number }>)[] = [
      () => post('/api/account/password', { current: wrong, next: 'a good new password' }),
      () => post('/api/account/email', { password: wrong, email: 'new@example.com' }),
      () => agent.delete('/api/account').set('X-Forwarded-For', '192.0.2.1').send({ password: wrong }),
      () =>
        agent
          .delete('/api/company')
          .set('X-Forwarded-For', '192.0.2.1')
          .send({ password: wrong, name: 'Any' }),
      async () => post('/api/auth/sign-up', { companyName: 'More', name: 'Me', email, password: wrong }),
    ];
    for (const attempt of [...tries, ...tries]) expect((await attempt()).status).toBe(400);
    for (const attempt of tries) expect((await attempt()).status).toBe(429);
    await signIn(email, password).expect(429);
  });

  it('forgets the failures once a new password was set by mail', async () => {
    const { email } = await test.signUp();
    await fail(email, 10);
    await test.agent().post('/api/auth/forgot-password').send({ email }).expect(202);
    const token = await tokenFor(test.database, email);
    await test
      .agent()
      .post('/api/auth/reset-password')
      .send({ token, password: 'remembered now' })
      .expect(204);
    await signIn(email, 'remembered now').expect(200);
  });

  it('keeps neither addresses nor accounts in clear', async () => {
    await fail('in-clear@example.com', 1, '198.51.100.77');
    const { rows } = await test.database.executeSql('SELECT * FROM sign_in_failures');
    expect(JSON.stringify(rows)).not.toMatch(/in-clear|198\.51/);
  });
});
