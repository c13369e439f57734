import 'reflect-metadata';
import { randomBytes } from 'node:crypto';
import type { AddressInfo } from 'node:net';
import type { INestApplicationContext } from '@nestjs/common';
import { NestFactory } from '@nestjs/core';
import type { NestExpressApplication } from '@nestjs/platform-express';
import request from 'supertest';
import { inject } from 'vitest';
import { createApp } from '../src/app.js';
import { type Env, parseEnv } from '../src/config/env.js';
import { Database } from '../src/database/database.js';
import { WorkerModule } from '../src/worker.module.js';
import { admin, databaseUrl } from './global-setup.js';

export type Agent = ReturnType<typeof request.agent>;

export interface TestApp {
  readonly url: string;
  readonly env: Env;
  readonly app: NestExpressApplication;
  readonly database: Database;
  /** A caller with a cookie jar of its own. */
  agent(): Agent;
  /** A new company with its owner signed in. */
  signUp(overrides?: Partial<SignUp>): Promise<{ agent: Agent; email: string; password: string }>;
  /** Handles queued jobs in this process until closed. */
  startWorker(): Promise<INestApplicationContext>;
  close(): Promise<void>;
}

interface SignUp {
  companyName: string;
  name: string;
  email: string;
  password: string;
}

/** Makes a database of the spec's own from the migrated template. */
export async function createTestDatabase(): Promise<{ url: string; drop: () => Promise<void> }> {
  const adminUrl = inject('adminUrl');
  const name = `spec_${randomBytes(6).toString('hex')}`;
  await admin(adminUrl, `CREATE DATABASE ${name} TEMPLATE ${inject('templateDatabase')}`);
  return {
    url: databaseUrl(adminUrl, name),
    drop: () => admin(adminUrl, `DROP DATABASE IF EXISTS ${name} WITH (FORCE)`),
  };
}

/** Boots the whole application on a database of its own and a free port of loopback. */
export async function startTestApp(settings: Record<string, string> = {}): Promise<TestApp> {
  const test = await createTestDatabase();
  const env = parseEnv({
    LAMPWRIGHT_MODE: 'local',
    PUBLIC_URL: 'http://127.0.0.1:3000',
    DATABASE_URL: test.url,
    SESSION_SECRET: 'a secret that only the tests of this folder use',
    S3_BUCKET: 'lampwright',
    S3_ACCESS_KEY_ID: 'test',
    S3_SECRET_ACCESS_KEY: 'test',
    S3_ENDPOINT: 'http://127.0.0.1:9',
    SMTP_URL: 'smtp://127.0.0.1:9',
    MAIL_FROM: 'Lampwright <post@example.com>',
    LOG_LEVEL: process.env.TEST_LOG_LEVEL ?? 'silent',
    ...settings,
  });
  const app = await createApp(env);
  await app.listen(0, '127.0.0.1');
  const { port } = app.getHttpServer().address() as AddressInfo;
  const url = `http://127.0.0.1:${port}`;
  const workers: INestApplicationContext[] = [];
  let people = 0;
  return {
    url,
    env,
    app,
    database: app.get(Database),
    agent: () => request.agent(url),
    async signUp(overrides = {}) {
      people += 1;
      const person: SignUp = {
        companyName: `Company ${people}`,
        name: `Person ${people}`,
        email: `person-${people}@example.com`,
        password: 'a long enough password',
        ...overrides,
      };
      const agent = request.agent(url);
      await agent.post('/api/auth/sign-up').send(person).expect(201);
      return { agent, email: person.email, password: person.password };
    },
    async startWorker() {
      const worker = await NestFactory.createApplicationContext(WorkerModule.with(env), { logger: false });
      workers.push(worker);
      return worker;
    },
    async close() {
      for (const worker of workers) await worker.close();
      await app.close();
      await test.drop();
    },
  };
}
