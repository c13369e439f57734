import { randomUUID } from 'node:crypto';
import sharp from 'sharp';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { TestApp } from '../../../test/harness.js';
import { ObjectStorage } from '../../ports/storage/storage.js';
import { addPricedCompany, type PricedCompany } from '../pricing/pricing.testkit.js';
import { post, proposalPath, type ReadyJob, sendTo } from '../proposals/proposals.testkit.js';
import type { RevisionDocument } from '../proposals/revision-document.js';
import { type SharedNight, sharedNightSchema } from './share.dto.js';
import {
  addLink,
  copyProposal,
  freezeReady,
  type Homeowner,
  linkCookie,
  open,
  pageOf,
  type SharedProposal,
  sendCopy,
  sharePath,
  startShareTest,
  tokenSentTo,
  yesTo,
} from './share.testkit.js';

const COST = 777_123;
const RECIPIENT = 'ida@example.com';
const OTHER = 'the-other-recipient@example.com';

let test: TestApp;
let company: PricedCompany;
let job: ReadyJob;
let base: string;
let sent: Homeowner;

beforeAll(async () => {
  test = await startShareTest();
  company = await addPricedCompany(test);
  const { agent } = company.designer;
  const frozen = await freezeReady(test, company, COST);
  job = frozen.job;
  base = frozen.revisionId;
  await post(agent, `${proposalPath(job.jobId)}/revisions/${base}/send`, sendTo(RECIPIENT)).expect(200);
  sent = await open(test, await tokenSentTo(test, company.companyId, RECIPIENT));
}, 120_000);
afterAll(() => test?.close());

async function rows<T>(sql: string, ...values: unknown[]): Promise<T[]> {
  return (await test.database.executeSql(sql, values)).rows as T[];
}

/** Each table's rows, condensed: two of them are equal when nothing was written in between. */
async function digests(): Promise<Record<string, string>> {
  const tables = await rows<{ name: string }>(
    `SELECT format('%I.%I', schemaname, tablename) AS name FROM pg_tables
      WHERE schemaname = 'public' OR (schemaname = 'pgboss' AND tablename = 'job_common') ORDER BY 1`,
  );
  const all: Record<string, string> = {};
  for (const { name } of tables) {
    const [row] = await rows<{ digest: string }>(
      `SELECT count(*) || ' ' || coalesce(md5(string_agg(t::text, '|' ORDER BY t::text)), '') AS digest FROM ${name} t`,
    );
    all[name] = row!.digest;
  }
  return all;
}

async function fresh(
  edit: Parameters<typeof copyProposal>[3] = {},
): Promise<{ proposal: SharedProposal; home: Homeowner }> {
  const proposal = await copyProposal(test, company.designer, base, edit);
  const { token } = await addLink(test, proposal);
  return { proposal, home: await open(test, token) };
}

const mails = (subject: string) =>
  rows<{ to: string; subject: string }>(
    'SELECT "to", subject FROM mail_messages WHERE subject LIKE $1 ORDER BY created_at, "to"',
    `%${subject}%`,
  );

const eventsOf = ({ jobId }: SharedProposal) =>
  rows<{ kind: string; data: object; actor_id: string | null; actor_name: string }>(
    'SELECT kind, data, actor_id, actor_name FROM job_events WHERE job_id = $1 ORDER BY created_at, id',
    jobId,
  );

describe('the address of a link', () => {
  it('gives the page, a cookie for its own addresses and the picture to begin with, and nothing else', async () => {
    const answer = await test.agent().get(`/p/${sent.token}`).expect(200);
    expect(answer.headers).toMatchObject({
      'cache-control': 'no-store',
      'referrer-policy': 'no-referrer',
      'x-robots-tag': 'noindex, nofollow',
    });
    expect(answer.headers['content-security-policy']).toContain("script-src 'self'");
    const [cookie = ''] = answer.headers['set-cookie'] as unknown as string[];
    expect(cookie).toContain(`; Path=/api/share/${sent.linkId};`);
    expect(cookie).toContain('HttpOnly');
    expect(cookie).toContain('SameSite=Lax');
    const picture = `/api/share/${sent.linkId}/pictures/${job.sheetId}`;
    const hint = '<link rel="preload" as="image"';
    expect(answer.text).toContain(`${hint} href="${picture}?width=1000" media="(max-width: 719px)"`);
    expect(answer.text).toContain(`${hint} href="${picture}" media="not all and (max-width: 719px)"`);
    const [shown] = (await pageOf(sent)).pictures;
    expect(shown).toMatchObject({
      url: picture,
      light: { url: `${picture}?width=1000`, media: '(max-width: 719px)' },
    });
    expect(answer.text).toMatch(/<title>Proposal \d+ for Front – Test company<\/title>/);
    expect(answer.text).not.toContain(sent.token);
    await test.agent().head(`/p/${sent.token}`).expect(200);
  });

  it('escapes what others have named', async () => {
    const { rows: found } = await test.database.executeSql(
      'SELECT document FROM proposal_revisions WHERE id = $1',
      [base],
    );
    const document = JSON.parse((found[0] as { document: string }).document);
    document.company.name = '</title><script>alert("$&")</script>';
    const proposal = await copyProposal(test, company.designer, base, { document: JSON.stringify(document) });
    const { token } = await addLink(test, proposal);
    const { text } = await test.agent().get(`/p/${token}`).expect(200);
    expect(text).not.toContain('<script>');
    expect(text).toContain('&lt;script&gt;alert(&quot;$&amp;&quot;)');
  });

  it('says of links that never were and links that are over which they are, without data or cookie', async () => {
    const { proposal } = await fresh();
    const past = new Date(Date.now() - 1000);
    const expired = await addLink(test, proposal, { expiresAt: past });
    const revoked = await addLink(test, proposal, { revokedAt: past });
    const expectations = [
      [404, 'unknown', 'A'.repeat(43)],
      [404, 'unknown', 'short'],
      [404, 'unknown', `${sent.token}x`],
      [410, 'gone', expired.token],
      [410, 'gone', revoked.token],
    ] as const;
    for (const [status, state, token] of expectations) {
      const answer = await test.agent().get(`/p/${token}`).expect(status);
      expect(answer.text).toContain(`<meta name="lampwright-state" content="${state}">`);
      expect(answer.text).toContain('<title>Your garden lighting</title>');
      expect(answer.text).not.toContain('lampwright-link');
      expect(answer.headers['set-cookie']).toBeUndefined();
      expect(answer.headers['cache-control']).toBe('no-store');
    }
    for (const { linkId } of [expired, revoked]) {
      const answer = await test.agent().get(sharePath(linkId)).set('Cookie', linkCookie(test, linkId));
      expect([answer.status, answer.body.code]).toEqual([410, 'link-gone']);
    }
  });

  it('ends a page that is open when its link is revoked', async () => {
    const { home } = await fresh();
    await pageOf(home);
    await test.database.executeSql('UPDATE proposal_links SET revoked_at = now() WHERE id = $1', [
      home.linkId,
    ]);
    await home.agent.get(sharePath(home.linkId)).expect(410);
    await home.agent.get(`/p/${home.token}`).expect(410);
  });

  it('opens in a second browser when it is forwarded; a cookie opens its own link alone', async () => {
    const a = await fresh();
    const b = await fresh();
    const second = await open(test, a.home.token);
    expect((await pageOf(second)).revisionId).toBe(a.proposal.revisionId);
    // Several in one browser, each with its own cookie.
    await a.home.agent.get(`/p/${b.home.token}`).expect(200);
    expect((await pageOf({ ...b.home, agent: a.home.agent })).revisionId).toBe(b.proposal.revisionId);
    expect((await pageOf(a.home)).revisionId).toBe(a.proposal.revisionId);
    const forced = linkCookie(test, a.home.linkId);
    for (const rest of ['', '/night', '/papers/proposal', `/pictures/${job.sheetId}`])
      await test.agent().get(sharePath(b.home.linkId, rest)).set('Cookie', forced).expect(404);
    await test.agent().post(sharePath(b.home.linkId, '/opened')).set('Cookie', forced).expect(404);
    await test.agent().get(sharePath(b.home.linkId)).expect(404);
    await test.agent().get(sharePath(b.home.linkId)).set('Cookie', company.owner.cookie).expect(404);
  });

  it('lets whoever comes back from the card service in by their cookie, and nobody else', async () => {
    const { home } = await fresh();
    const back = `/p/back/${home.linkId}`;
    const answer = await home.agent.get(back).expect(200);
    expect(answer.headers).toMatchObject({ 'cache-control': 'no-store', 'referrer-policy': 'no-referrer' });
    expect(answer.headers['set-cookie']).toBeUndefined();
    expect(answer.text).toContain(`<meta name="lampwright-link" content="${home.linkId}">`);
    expect(answer.text).toContain('<meta name="lampwright-state" content="back">');
    await home.agent.get(sharePath(home.linkId)).expect(200);
    // Elsewhere the same address has the same page, and opens nothing; nor does it tell which links there are.
    const elsewhere = test.agent();
    expect((await elsewhere.get(back).expect(200)).text).toBe(answer.text);
    await elsewhere.get(sharePath(home.linkId)).expect(404);
    const madeUp = randomUUID();
    const { text } = await elsewhere.get(`/p/back/${madeUp}`).expect(200);
    expect(text.replace(madeUp, home.linkId)).toBe(answer.text);
    await elsewhere.get('/p/back/%3Cscript%3E').expect(404);
  });

  it('is not a sign-in: its cookie opens nothing of the company', async () => {
    const { agent } = test;
    const cookie = linkCookie(test, sent.linkId);
    await agent().get(`/api/jobs/${job.jobId}/proposal`).set('Cookie', cookie).expect(401);
    const asSession = cookie.replace(/^[^=]+/, company.owner.cookie.split('=')[0]!);
    await agent().get(`/api/jobs/${job.jobId}/proposal`).set('Cookie', asSession).expect(401);
  });
});

describe('the page', () => {
  it('holds what the homeowner may see, and no cost, margin, plan or other recipient', async () => {
    await addLink(
      test,
      { companyId: company.companyId, proposalId: await proposalIdOf(base) },
      { email: OTHER },
    );
    const answer = await sent.agent.get(sharePath(sent.linkId)).expect(200);
    const page = answer.body as Awaited<ReturnType<typeof pageOf>>;
    expect(page).toMatchObject({
      state: 'open',
      recipient: 'Ida Fairweather',
      differences: null,
      approval: null,
    });
    expect(page.document.lights).toHaveLength(3);
    expect(page.document.price.combinations).toHaveLength(2);
    expect(page.sentences.approval).toContain(String(page.document.number));
    const [stored] = await rows<{ cost_minor: string }>(
      'SELECT cost_minor FROM proposal_revisions WHERE id = $1',
      base,
    );
    expect(Number(stored?.cost_minor)).toBeGreaterThan(COST);
    for (const secret of [String(COST), stored!.cost_minor, OTHER, sent.token, '"plan":', '"records"'])
      expect(answer.text).not.toContain(secret);
    expect(answer.text).not.toMatch(/"(cost|margin)\w*"/i);
    expect(answer.headers['cache-control']).toBe('no-store');
  });

  it('changes nothing when it is read, however often and by whatever opens it', async () => {
    const { home } = await fresh();
    const page = await pageOf(home);
    await post(home.agent, sharePath(home.linkId, '/approve'), yesTo(page)).expect(200);
    const before = await digests();
    expect(Object.keys(before).length).toBeGreaterThan(20);
    expect((await nightOf(home)).scenes).toHaveLength(1);
    for (let round = 0; round < 2; round += 1) {
      const anew = await open(test, home.token);
      const { pictures, papers } = await pageOf(anew);
      await nightOf(anew);
      expect(pictures).toHaveLength(1);
      for (const { url } of pictures) await anew.agent.get(url).expect(200);
      for (const { url } of papers) if (url !== null) await anew.agent.get(url).expect(200);
      await anew.agent.get(`/p/${'B'.repeat(43)}`).expect(404);
      for (const action of ['/approve', '/decline', '/opened', '/questions'])
        await anew.agent.get(sharePath(anew.linkId, action)).expect(404);
    }
    expect(await digests()).toEqual(before);
  });

  it('sends pictures and papers of its own proposal alone', async () => {
    const { home, proposal } = await fresh();
    const picture = await home.agent.get(sharePath(home.linkId, `/pictures/${job.sheetId}`)).expect(200);
    expect(picture.headers['content-type']).toBe('image/jpeg');
    await home.agent
      .get(sharePath(home.linkId, `/pictures/${job.sheetId}`))
      .set('If-None-Match', picture.headers.etag!)
      .expect(304);
    const pdf = await home.agent.get(sharePath(home.linkId, '/papers/proposal')).expect(200);
    expect(pdf.headers['content-type']).toBe('application/pdf');
    for (const rest of ['/pictures/another', '/papers/signed', '/papers/money-x', `/papers/${base}`])
      await home.agent.get(sharePath(home.linkId, rest)).expect(404);
    // A picture that only a revision which nobody was sent has.
    await sendCopy(test, company.companyId, proposal.revisionId, {
      sentAt: null,
      pictures: { secret: 'some/key.jpg' },
    });
    await test.app.get(ObjectStorage, { strict: false }).put('some/key.jpg', Buffer.from('x'), 'image/jpeg');
    await home.agent.get(sharePath(home.linkId, '/pictures/secret')).expect(404);
  });

  it('has a light one of each picture, and sends the whole one where it was not made', async () => {
    const { home, proposal } = await fresh();
    const [picture] = (await pageOf(home)).pictures;
    const get = async (url: string) => (await home.agent.get(url).buffer(true).expect(200)).body as Buffer;
    const sizeOf = async (url: string) => {
      const { width, height } = await sharp(await get(url)).metadata();
      return [width, height];
    };
    expect(await sizeOf(picture!.url)).toEqual([1600, 1200]);
    expect(await sizeOf(picture!.light.url)).toEqual([1000, 750]);
    expect((await get(picture!.light.url)).length).toBeLessThan(120_000);
    const tags = [picture!.url, picture!.light.url].map(
      async (url) => (await home.agent.head(url)).headers.etag,
    );
    expect(new Set(await Promise.all(tags)).size).toBe(2);
    await home.agent.get(`${picture!.url}?width=999`).expect(400);

    const key = 'older/picture.jpg';
    const bytes = await sharp({ create: { width: 40, height: 30, channels: 3, background: 'green' } })
      .jpeg()
      .toBuffer();
    await test.app.get(ObjectStorage, { strict: false }).put(key, bytes, 'image/jpeg');
    await sendCopy(test, company.companyId, proposal.revisionId, { pictures: { [job.sheetId]: key } });
    expect(await sizeOf(picture!.light.url)).toEqual([40, 30]);
  });

  it('shows the newest revision that was sent and not taken back', async () => {
    const { home, proposal } = await fresh();
    await sendCopy(test, company.companyId, proposal.revisionId, { sentAt: null });
    expect((await pageOf(home)).document.revision).toBe(1);
    const third = await sendCopy(test, company.companyId, proposal.revisionId, { revision: 3 });
    expect((await pageOf(home)).revisionId).toBe(third);
    const withdraw = (id: string) =>
      test.database.executeSql('UPDATE proposal_revisions SET withdrawn_at = now() WHERE id = $1', [id]);
    await withdraw(third);
    expect(await pageOf(home)).toMatchObject({ revisionId: proposal.revisionId, state: 'open' });
    await withdraw(proposal.revisionId);
    expect((await pageOf(home)).state).toBe('withdrawn');
  });

  it('holds until the end of its last day in UTC', async () => {
    const day = (ago: number) =>
      new Date(`${new Date(Date.now() - ago * 86_400_000).toISOString().slice(0, 10)}T00:00:00Z`);
    expect((await pageOf((await fresh({ validUntil: day(0) })).home)).state).toBe('open');
    expect((await pageOf((await fresh({ validUntil: day(1) })).home)).state).toBe('expired');
  });

  it('is told as opened by a person’s gesture: the first time, and the last', async () => {
    const { home, proposal } = await fresh();
    const link = async () =>
      (
        await rows<{ opened_at: Date | null; last_seen_at: Date | null }>(
          'SELECT opened_at, last_seen_at FROM proposal_links WHERE id = $1',
          home.linkId,
        )
      )[0]!;
    await pageOf(home);
    expect(await link()).toEqual({ opened_at: null, last_seen_at: null });
    await home.agent.post(sharePath(home.linkId, '/opened')).expect(204);
    const first = await link();
    expect(first.opened_at).toEqual(first.last_seen_at);
    await home.agent.post(sharePath(home.linkId, '/opened')).expect(204);
    const again = await link();
    expect(again.opened_at).toEqual(first.opened_at);
    expect(again.last_seen_at!.getTime()).toBeGreaterThan(first.last_seen_at!.getTime());
    expect(await eventsOf(proposal)).toEqual([
      { kind: 'proposal-opened', data: { revision: 1 }, actor_id: null, actor_name: 'Ida Fairweather' },
    ]);
  });
});

describe('the night', () => {
  const place = { latitude: 40.71, longitude: -74.01 };
  const freeze = async (edit: (document: RevisionDocument) => object) => {
    const [row] = await rows<{ document: string }>(
      'SELECT document FROM proposal_revisions WHERE id = $1',
      base,
    );
    const document = JSON.parse(row!.document) as RevisionDocument;
    return { document: JSON.stringify({ ...document, ...edit(document) }) };
  };

  it('is made from the frozen plan: lamps with their groups, hours and place, and nothing of the company’s', async () => {
    const secret = 'The spare key is under the pot';
    const evening = { place, timeZone: 'America/New_York' };
    const { home } = await fresh(
      await freeze(({ plan }) => ({
        evening,
        plan: {
          ...plan,
          records: plan.records.map((record) => ('note' in record ? { ...record, note: secret } : record)),
        },
      })),
    );
    const answer = await home.agent.get(sharePath(home.linkId, '/night')).expect(200);
    expect(answer.headers['cache-control']).toBe('no-store');
    const night = sharedNightSchema.parse(answer.body);
    expect(night.evening).toEqual(evening);
    const { document, pictures } = await pageOf(home);
    expect(document).not.toHaveProperty('evening');
    // The page keeps a place for the evening before it is asked for.
    expect(pictures.map(({ night: shown }) => shown)).toEqual([{ zones: 1 }]);
    const [scene] = night.scenes;
    expect(scene).toMatchObject({ sheetId: job.sheetId, view: 'plan', widthPx: 2400, heightPx: 1800 });
    expect(scene!.sources.map(({ id, groupId }) => [id, groupId])).toEqual([
      [job.lights[0], null],
      [job.lights[1], null],
      [job.lights[2], 'more'],
    ]);
    expect(scene!.zones.map(({ schedule }) => schedule.off)).toEqual([{ kind: 'clock', at: '23:00' }]);
    const [light] = document.lights;
    for (const word of [String(COST), secret, light!.name, document.client.name, '"records"', '"item'])
      expect(answer.text).not.toContain(word);
    expect(answer.text).not.toMatch(/"\w*(cost|margin|price|minor|volts|note)\w*"/i);
  });

  it('of a revision from before evenings were frozen has no place, and the clocks of the company', async () => {
    const { home } = await fresh(
      await freeze(({ evening: _evening, plan: { schema: _schema, ...plan }, ...rest }) => ({
        ...rest,
        evening: undefined,
        plan: { ...plan, records: plan.records.map(inFirstForm) },
      })),
    );
    const settings = { timeZone: 'America/Denver', place };
    await company.owner.agent.patch('/api/company').send({ settings }).expect(200);
    const night = await nightOf(home);
    expect(night.evening).toEqual({ place: null, timeZone: 'America/Denver' });
    expect(night.scenes[0]?.sources).toHaveLength(3);
  });

  it('is that of the newest revision that was sent; of one that is over it is still to be seen', async () => {
    const timeZone = 'Europe/London';
    const { home, proposal } = await fresh();
    const later = await sendCopy(test, company.companyId, proposal.revisionId, { sentAt: null });
    const document = await freeze(() => ({ revision: 2, evening: { place: null, timeZone } }));
    await test.database.executeSql('UPDATE proposal_revisions SET document = $1 WHERE id = $2', [
      document.document,
      later,
    ]);
    expect((await nightOf(home)).evening.timeZone).not.toBe(timeZone);
    await test.database.executeSql('UPDATE proposal_revisions SET sent_at = now() WHERE id = $1', [later]);
    expect((await nightOf(home)).evening.timeZone).toBe(timeZone);
    await test.database.executeSql(
      'UPDATE proposal_revisions SET withdrawn_at = now() WHERE proposal_id = $1',
      [proposal.proposalId],
    );
    expect((await pageOf(home)).state).toBe('withdrawn');
    expect((await nightOf(home)).scenes).toHaveLength(1);
    const expired = await fresh({ validUntil: new Date('2020-01-01T00:00:00Z') });
    expect((await nightOf(expired.home)).scenes).toHaveLength(1);
  });

  it('has no scene where no sheet has a picture', async () => {
    const { home } = await fresh({ pictures: {} });
    expect((await nightOf(home)).scenes).toEqual([]);
  });
});

describe('questions', () => {
  const about = { recordId: null, point: null };

  it('are pinned to a light, to a place or to nothing, and told to the company by mail and timeline', async () => {
    const { home, proposal } = await fresh();
    const ask = (input: object) => post(home.agent, sharePath(home.linkId, '/questions'), input);
    const point = { sheetId: job.sheetId, x: 12.5, y: 30 };
    const light = await ask({ ...about, text: 'How high is it?', recordId: job.lights[0] }).expect(201);
    expect(light.body).toMatchObject({
      recordId: job.lights[0],
      sheetId: null,
      revision: 1,
      resolvedAt: null,
    });
    const place = await ask({ ...about, text: 'And here?', point }).expect(201);
    expect(place.body).toMatchObject({ recordId: null, ...point });
    await ask({ ...about, text: 'When can you begin?' }).expect(201);
    const { questions } = await pageOf(home);
    expect(
      questions.map(({ messages }) => messages.map(({ text, side, authorName }) => [side, authorName, text])),
    ).toEqual([
      [['homeowner', 'Ida Fairweather', 'How high is it?']],
      [['homeowner', 'Ida Fairweather', 'And here?']],
      [['homeowner', 'Ida Fairweather', 'When can you begin?']],
    ]);
    const events = await eventsOf(proposal);
    expect(events.map(({ kind, data }) => [kind, data])).toEqual([
      ['question-asked', { about: 'P1' }],
      ['question-asked', { about: 'a place in the garden' }],
      ['question-asked', { about: 'the proposal' }],
    ]);
    const [designer] = await rows<{ email: string }>(
      'SELECT email FROM users WHERE id = $1',
      company.designer.actor.userId,
    );
    expect(
      (await mails('Ida Fairweather asks about')).filter(({ to }) => to === designer?.email),
    ).toHaveLength(3);
  });

  it('are refused where they are about nothing on the page', async () => {
    const { home } = await fresh();
    const point = { sheetId: job.sheetId, x: 1, y: 1 };
    const faults = [
      [{ recordId: 'nothing' }, '/recordId'],
      [{ point: { ...point, sheetId: 'nothing' } }, '/point/sheetId'],
      [{ point: { ...point, x: -1 } }, '/point'],
      [{ point: { ...point, y: 1801 } }, '/point'],
      [{ recordId: job.lights[0], point }, '/point'],
      [{ text: '   ' }, '/text'],
    ] as const;
    for (const [edit, pointer] of faults) {
      const answer = await post(home.agent, sharePath(home.linkId, '/questions'), {
        ...about,
        text: 'Why?',
        ...edit,
      }).expect(400);
      expect(answer.body.errors[0].pointer).toBe(pointer);
    }
    expect((await pageOf(home)).questions).toEqual([]);
  });

  it('go on, and are open again when they do; those of others do not exist', async () => {
    const a = await fresh();
    const b = await fresh();
    const asked = await post(a.home.agent, sharePath(a.home.linkId, '/questions'), { ...about, text: 'One' });
    const { id } = asked.body as { id: string };
    await test.database.executeSql('UPDATE questions SET resolved_at = now() WHERE id = $1', [id]);
    const reply = (home: Homeowner) =>
      post(home.agent, sharePath(home.linkId, `/questions/${id}/messages`), { text: 'Two' });
    const answer = await reply(a.home).expect(201);
    expect(answer.body.resolvedAt).toBeNull();
    expect(answer.body.messages.map(({ text }: { text: string }) => text)).toEqual(['One', 'Two']);
    await reply(b.home).expect(404);
  });
});

const nightOf = async ({ agent, linkId }: Homeowner): Promise<SharedNight> =>
  (await agent.get(sharePath(linkId, '/night')).expect(200)).body;

/** A record as plans had it before they knew where fixtures point and when they are on. */
function inFirstForm<T extends object>(record: T): T {
  const later = ['whiteLux', 'schedule', 'aim', 'mountingHeightMeters', 'zoneId', 'lightTarget'];
  return Object.fromEntries(Object.entries(record).filter(([key]) => !later.includes(key))) as T;
}

async function proposalIdOf(revisionId: string): Promise<string> {
  const [row] = await rows<{ proposal_id: string }>(
    'SELECT proposal_id FROM proposal_revisions WHERE id = $1',
    revisionId,
  );
  return row!.proposal_id;
}

// Last: this address has to wait afterwards.
describe('guessing', () => {
  it('is stopped by address, with a page that says for how long', async () => {
    const guess = () => test.agent().get(`/p/${'C'.repeat(43)}`);
    let answer = await guess();
    for (let i = 0; i < 20 && answer.status === 404; i += 1) answer = await guess();
    expect(answer.status).toBe(429);
    expect(Number(answer.headers['retry-after'])).toBeGreaterThan(0);
    expect(answer.text).toContain('Please wait');
    expect(answer.text).not.toContain('lampwright-link');
    // Whoever has a page open keeps it.
    await pageOf(sent);
  });
});
