import { Body, Controller, Get, Inject, Module, Post } from '@nestjs/common';
import { NestFactory } from '@nestjs/core';
import type { NestExpressApplication } from '@nestjs/platform-express';
import cookieParser from 'cookie-parser';
import request from 'supertest';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { type Agent, startTestApp, type TestApp } from '../../test/harness.js';
import { addCompany, addPerson, type TestPerson } from '../../test/people.js';
import { AccessModule } from '../access/access.module.js';
import { SignedIn } from '../access/decorators.js';
import { ConfigModule } from '../config/config.module.js';
import { Database } from '../database/database.js';
import { DatabaseModule } from '../database/database.module.js';
import { conflict } from './app-error.js';
import { jsonBodies } from './bodies.js';
import { Once } from './once.js';
import { OnceModule } from './once.module.js';
import { ProblemFilter } from './problem.filter.js';

/** What the handlers under test do next. */
let then: () => Promise<void> = async () => undefined;
let done = 0;

@Controller()
class Deeds {
  constructor(@Inject(Database) private readonly database: Database) {}

  private async deed(what: string) {
    done += 1;
    const count = done;
    await this.database.executeSql('INSERT INTO deeds VALUES ($1, $2)', [what, count]);
    await then();
    return { what, count };
  }

  @Post('whole')
  @SignedIn()
  @Once()
  whole(@Body() { what = '' }: { what?: string } = {}) {
    return this.deed(what);
  }

  @Post('steps')
  @SignedIn()
  @Once('in-steps')
  steps(@Body() { what = '' }: { what?: string } = {}) {
    return this.deed(what);
  }

  @Post('often')
  @SignedIn()
  often() {
    return this.deed('often');
  }

  @Get('nothing')
  @SignedIn()
  nothing() {
    return {};
  }
}

describe('requests that happen once', () => {
  let test: TestApp;
  let app: NestExpressApplication;
  let one: TestPerson;
  let agent: Agent;

  beforeAll(async () => {
    test = await startTestApp();
    await test.database.executeSql('CREATE TABLE deeds (what text, count int)');
    @Module({
      imports: [ConfigModule.with(test.env), DatabaseModule, AccessModule, OnceModule],
      controllers: [Deeds],
    })
    class Root {}
    app = await NestFactory.create<NestExpressApplication>(Root, { logger: false, bodyParser: false });
    app.use(cookieParser());
    app.use(jsonBodies);
    app.useGlobalFilters(new ProblemFilter());
    await app.listen(0, '127.0.0.1');
    const companyId = await addCompany(test);
    one = await addPerson(test, companyId, 'owner');
  });
  afterAll(async () => {
    await app.close();
    await test.close();
  });
  beforeEach(async () => {
    then = async () => undefined;
    agent = request.agent(app.getHttpServer());
    agent.set('Cookie', one.cookie);
    await test.database.executeSql('DELETE FROM deeds');
    await test.database.executeSql('DELETE FROM idempotency_keys');
  });

  const post = (path: string, key: string, body: object = { what: 'lamp' }, by = agent) =>
    by.post(path).set('Idempotency-Key', key).send(body);
  const deeds = async () => (await test.database.executeSql('SELECT * FROM deeds')).rows.length;
  /** A handler that waits to be let go on, and the moment it is at work. */
  const pausing = () => {
    let letGo: () => void = () => undefined;
    let began: () => void = () => undefined;
    const atWork = new Promise<void>((resolve) => {
      began = resolve;
    });
    const gate = new Promise<void>((resolve) => {
      letGo = resolve;
    });
    then = () => {
      began();
      return gate;
    };
    return { atWork, letGo };
  };

  describe.each(['/whole', '/steps'])('%s', (path) => {
    it('needs a key of 1 to 200 printable characters', async () => {
      for (const key of [undefined, 'ü', 'x'.repeat(201)]) {
        const call = agent.post(path).send({});
        if (key !== undefined) call.set('Idempotency-Key', key);
        expect((await call.expect(400)).body.code).toBe('no-idempotency-key');
      }
      expect(await deeds()).toBe(0);
    });

    it('gives the first answer and its status again, and acts no second time', async () => {
      const first = await post(path, 'a', { what: 'lamp', more: { x: 1, y: 2 } }).expect(201);
      const second = await post(path, 'a', { more: { y: 2, x: 1 }, what: 'lamp' }).expect(201);
      expect(second.body).toEqual(first.body);
      expect(await deeds()).toBe(1);
      const other = await post(path, 'b').expect(201);
      expect(other.body.count).toBe(first.body.count + 1);
    });

    it('refuses the key for another body, and for another route', async () => {
      await post(path, 'a').expect(201);
      expect((await post(path, 'a', { what: 'other' }).expect(422)).body.code).toBe('key-reused');
      await post(path === '/whole' ? '/steps' : '/whole', 'a').expect(422);
      expect(await deeds()).toBe(1);
    });

    it('knows a key by who gave it', async () => {
      const two = await addPerson(test, one.actor.companyId, 'owner');
      const other = request.agent(app.getHttpServer());
      other.set('Cookie', two.cookie);
      const first = await post(path, 'a').expect(201);
      const second = await post(path, 'a', { what: 'theirs' }, other).expect(201);
      expect(second.body.count).not.toBe(first.body.count);
    });

    it('refuses a second while the first is at work, which is answered', async () => {
      const { atWork, letGo } = pausing();
      const first = post(path, 'a').then((answer) => answer);
      await atWork;
      expect((await post(path, 'a').expect(409)).body.code).toBe('in-flight');
      letGo();
      const { status, body } = await first;
      expect(status).toBe(201);
      expect((await post(path, 'a').expect(201)).body).toEqual(body);
      expect(await deeds()).toBe(1);
    });

    it('does not remember a refusal: the same key is judged anew', async () => {
      then = async () => {
        throw conflict('not-now', 'Not now.');
      };
      await post(path, 'a').expect(409);
      then = async () => undefined;
      await post(path, 'a').expect(201);
    });
  });

  it('undoes a whole request that was refused', async () => {
    then = async () => {
      throw conflict('not-now', 'Not now.');
    };
    await post('/whole', 'a').expect(409);
    expect(await deeds()).toBe(0);
  });

  it('commits a whole request and its answer together, or neither', async () => {
    // The answer cannot be kept, so the deed is undone.
    await test.database.executeSql(
      'ALTER TABLE idempotency_keys ADD CONSTRAINT full_up CHECK (key <> $$z$$)',
    );
    await post('/whole', 'z').expect(500);
    await test.database.executeSql('ALTER TABLE idempotency_keys DROP CONSTRAINT full_up');
    expect(await deeds()).toBe(0);
    await post('/whole', 'z').expect(201);
    expect(await deeds()).toBe(1);
  });

  it('takes up a request in steps whose process died, after two minutes and not before', async () => {
    const { atWork, letGo } = pausing();
    const dying = post('/steps', 'a').then((answer) => answer);
    await atWork;
    const age = (seconds: number) =>
      test.database.executeSql(`UPDATE idempotency_keys SET created_at = now() - make_interval(secs => $1)`, [
        seconds,
      ]);
    await age(110);
    await post('/steps', 'a').expect(409);
    await age(130);
    then = async () => undefined;
    expect((await post('/steps', 'a', { what: 'other' })).status).toBe(422);
    await post('/steps', 'a').expect(201);
    letGo();
    await dying;
  });

  it('forgets answers after thirty days', async () => {
    await post('/whole', 'old').expect(201);
    await post('/whole', 'young').expect(201);
    await test.database.executeSql(
      `UPDATE idempotency_keys SET created_at = now() - CASE key WHEN 'old' THEN interval '31 days' ELSE interval '29 days' END`,
    );
    await post('/whole', 'next').expect(201);
    const { rows } = await test.database.executeSql('SELECT key FROM idempotency_keys ORDER BY key');
    expect(rows).toEqual([{ key: 'next' }, { key: 'young' }]);
  });

  it('leaves all other routes alone', async () => {
    await agent.post('/often').send({}).expect(201);
    await agent.get('/nothing').expect(200);
  });
});
