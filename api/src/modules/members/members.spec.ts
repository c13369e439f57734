import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { type Agent, startTestApp, type TestApp } from '../../../test/harness.js';
import { type Me, meSchema } from '../auth/auth.dto.js';
import { lettersTo, tokenFor } from '../auth/auth.testkit.js';

describe('members and invitations', () => {
  let test: TestApp;
  let owner: Agent;
  let me: Me;
  let people = 0;
  beforeAll(async () => {
    test = await startTestApp();
  });
  afterAll(() => test.close());
  beforeEach(async () => {
    owner = (await test.signUp()).agent;
    me = meSchema.parse((await owner.get('/api/auth/me')).body);
  });

  const nextAddress = () => {
    people += 1;
    return `invited-${people}@example.com`;
  };
  const accept = (agent: Agent, body: object) => agent.post('/api/invitations/accept').send(body);
  const look = (token: string) => test.agent().post('/api/invitations/look').send({ token });

  async function invite(email: string, role = 'designer'): Promise<{ id: string; token: string }> {
    const { body } = await owner.post('/api/invitations').send({ email, role }).expect(201);
    return { id: body.id, token: await tokenFor(test.database, email) };
  }

  async function join(role = 'designer'): Promise<{ agent: Agent; me: Me; email: string }> {
    const email = nextAddress();
    const { token } = await invite(email, role);
    const agent = test.agent();
    const answer = await accept(agent, { token, name: 'New Member', password: 'chosen by them' }).expect(200);
    return { agent, me: meSchema.parse(answer.body), email };
  }

  it('brings an invited person in as what they were invited for', async () => {
    const { agent, me: member, email } = await join('crew');
    expect(member).toMatchObject({ user: { email }, company: { id: me.company?.id }, role: 'crew' });
    const list = await owner.get('/api/members').expect(200);
    expect(list.body.items).toMatchObject([
      { userId: me.user.id, role: 'owner' },
      { userId: member.user.id, role: 'crew', name: 'New Member', email },
    ]);
    expect((await owner.get('/api/invitations').expect(200)).body.items).toEqual([]);
    await test.agent().post('/api/auth/sign-in').send({ email, password: 'chosen by them' }).expect(200);
    await agent.post('/api/invitations').send({ email: nextAddress(), role: 'owner' }).expect(403);
  });

  it('says in the letter who invites, and keeps the secret out of the server’s reach', async () => {
    const email = nextAddress();
    const { token } = await invite(email, 'crew');
    const [letter] = await lettersTo(test.database, email);
    expect(letter?.subject).toBe(`${me.company?.name} invites you`);
    expect(letter?.text).toContain(`http://127.0.0.1:3000/invitation#token=${token}`);
    expect(letter?.text).toContain('a member of the crew');
    const { rows } = await test.database.executeSql('SELECT * FROM invitations');
    expect(JSON.stringify(rows)).not.toContain(token);
  });

  it('shows what an invitation is about without using it up', async () => {
    const email = nextAddress();
    const { token } = await invite(email);
    for (const _ of [1, 2])
      expect((await look(token).expect(200)).body).toEqual({
        companyName: me.company?.name,
        email,
        role: 'designer',
        hasAccount: false,
      });
    await look('no-such-secret').expect(404);
  });

  it('asks a new person for name and password', async () => {
    const { token } = await invite(nextAddress());
    const answer = await accept(test.agent(), { token }).expect(400);
    expect(answer.body.errors).toMatchObject([{ pointer: '/name' }, { pointer: '/password' }]);
    await accept(test.agent(), { token, name: 'Now', password: 'given this time' }).expect(200);
  });

  it('takes somebody with an account by its password, or as signed in, and nobody else', async () => {
    const known = await test.signUp();
    const { token } = await invite(known.email, 'crew');
    expect((await look(token).expect(200)).body.hasAccount).toBe(true);
    await accept(test.agent(), { token, name: 'Somebody', password: 'not the password' }).expect(400);
    await accept(test.agent(), { token }).expect(400);
    const stranger = await test.signUp();
    expect((await accept(stranger.agent, { token, password: known.password }).expect(409)).body.code).toBe(
      'other-account',
    );
    const joined = meSchema.parse((await accept(known.agent, { token }).expect(200)).body);
    expect(joined.company?.id).toBe(me.company?.id);
    expect(joined.companies.map(({ role }) => role).sort()).toEqual(['crew', 'owner']);

    const other = await test.signUp();
    const second = await invite(other.email);
    await accept(test.agent(), { token: second.token, password: other.password }).expect(200);
  });

  it('takes an invitation once, whoever is fastest', async () => {
    const { token } = await invite(nextAddress());
    const answers = await Promise.all(
      Array.from({ length: 5 }, (_, n) =>
        accept(test.agent(), { token, name: `Number ${n}`, password: 'one of the five' }),
      ),
    );
    const statuses = answers.map(({ status }) => status).sort();
    expect(statuses[0]).toBe(200);
    // Those who come later find it used, or their address taken by the first.
    for (const status of statuses.slice(1)) expect([409, 410, 400]).toContain(status);
    expect((await owner.get('/api/members')).body.items).toHaveLength(2);
    await accept(test.agent(), { token, name: 'Late', password: 'much too late' }).expect(410);
    await look(token).expect(410);
  });

  it('lets an invitation die by being taken back, by time, and by a newer letter', async () => {
    const revoked = await invite(nextAddress());
    await owner.delete(`/api/invitations/${revoked.id}`).expect(204);
    await owner.delete(`/api/invitations/${revoked.id}`).expect(404);
    await look(revoked.token).expect(410);

    const email = nextAddress();
    const old = await invite(email);
    expect(
      (await owner.post(`/api/invitations/${old.id}/resend`).expect(429)).headers['retry-after'],
    ).toMatch(/^[1-6]?\d$/);
    await test.database.executeSql(
      "UPDATE invitations SET expires_at = now() - interval '1 second' WHERE id = $1",
      [old.id],
    );
    await accept(test.agent(), { token: old.token, name: 'Late', password: 'much too late' }).expect(410);
    const [listed] = (await owner.get('/api/invitations')).body.items;
    expect(listed).toMatchObject({ id: old.id, expired: true });
    await owner.post(`/api/invitations/${old.id}/resend`).expect(200);
    await look(old.token).expect(404);
    const fresh = await tokenFor(test.database, email);
    await accept(test.agent(), { token: fresh, name: 'In time', password: 'early enough' }).expect(200);
  });

  it('invites nobody twice, and no member', async () => {
    const email = nextAddress();
    const answers = await Promise.all(
      [1, 2, 3].map(() => owner.post('/api/invitations').send({ email, role: 'crew' })),
    );
    expect(answers.map(({ status }) => status).sort()).toEqual([201, 409, 409]);
    const again = await owner
      .post('/api/invitations')
      .send({ email: ` ${email.toUpperCase()}`, role: 'crew' });
    expect(again.body.code).toBe('is-invited');
    const self = await owner
      .post('/api/invitations')
      .send({ email: me.user.email, role: 'crew' })
      .expect(409);
    expect(self.body.code).toBe('is-member');
  });

  it('changes a role at once, also for sessions that are open', async () => {
    const { agent, me: member } = await join('crew');
    await agent.get('/api/invitations').expect(403);
    const changed = await owner.patch(`/api/members/${member.user.id}`).send({ role: 'owner' }).expect(200);
    expect(changed.body.role).toBe('owner');
    await agent.get('/api/invitations').expect(200);
    await owner.patch(`/api/members/${member.user.id}`).send({ role: 'boss' }).expect(400);
  });

  it('removes a member at once, who keeps the account and moves on to a company of theirs', async () => {
    const { agent, me: member } = await join();
    await owner.delete(`/api/members/${member.user.id}`).expect(204);
    await agent.get('/api/members').expect(403);
    expect(meSchema.parse((await agent.get('/api/auth/me').expect(200)).body)).toMatchObject({
      company: null,
      role: null,
      companies: [],
    });
    const known = await test.signUp();
    const { token } = await invite(known.email);
    const joined = meSchema.parse((await accept(known.agent, { token }).expect(200)).body);
    await owner.delete(`/api/members/${joined.user.id}`).expect(204);
    expect(meSchema.parse((await known.agent.get('/api/auth/me')).body).role).toBe('owner');
  });

  it('never loses the last owner', async () => {
    await owner.patch(`/api/members/${me.user.id}`).send({ role: 'crew' }).expect(409);
    await owner.delete(`/api/members/${me.user.id}`).expect(409);
    const { agent: second, me: other } = await join('owner');
    // Both try to get rid of each other at the same moment.
    const answers = await Promise.all([
      owner.delete(`/api/members/${other.user.id}`),
      second.patch(`/api/members/${me.user.id}`).send({ role: 'crew' }),
    ]);
    expect(answers.filter(({ status }) => status < 300)).toHaveLength(1);
    const { rows } = await test.database.executeSql(
      "SELECT count(*)::int AS n FROM memberships WHERE company_id = $1 AND role = 'owner'",
      [me.company?.id],
    );
    expect(rows).toEqual([{ n: 1 }]);
  });

  it('hides other companies’ members and invitations', async () => {
    const { me: member } = await join();
    const email = nextAddress();
    const { id } = await invite(email);
    const stranger = (await test.signUp()).agent;
    await stranger.patch(`/api/members/${member.user.id}`).send({ role: 'crew' }).expect(404);
    await stranger.delete(`/api/members/${member.user.id}`).expect(404);
    await stranger.delete(`/api/invitations/${id}`).expect(404);
    await stranger.post(`/api/invitations/${id}/resend`).expect(404);
    expect((await stranger.get('/api/invitations')).body.items).toEqual([]);
    expect((await stranger.get('/api/members')).body.items).toHaveLength(1);
  });
});
