import { Controller, Get, type INestApplication, Module } from '@nestjs/common';
import { NestFactory } from '@nestjs/core';
import request from 'supertest';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { createTestDatabase } from '../../test/harness.js';
import { ConfigModule } from '../config/config.module.js';
import { parseEnv } from '../config/env.js';
import { DatabaseModule } from '../database/database.module.js';
import { ProblemFilter } from '../http/problem.filter.js';
import { AccessModule } from './access.module.js';
import { Public } from './decorators.js';
import { allows, permissions, roles } from './permissions.js';

@Controller()
class Routes {
  @Get('forgotten')
  forgotten(): string {
    return 'a secret';
  }

  @Get('open')
  @Public()
  open(): string {
    return 'no secret';
  }
}

describe('the access guard', () => {
  let app: INestApplication;
  let drop: () => Promise<void>;
  beforeAll(async () => {
    const database = await createTestDatabase();
    drop = database.drop;
    const env = parseEnv({
      LAMPWRIGHT_MODE: 'local',
      PUBLIC_URL: 'http://127.0.0.1:3000',
      DATABASE_URL: database.url,
      SESSION_SECRET: 'a secret that only the tests of this folder use',
      S3_BUCKET: 'none',
      S3_ACCESS_KEY_ID: 'none',
      S3_SECRET_ACCESS_KEY: 'none',
      SMTP_URL: 'smtp://127.0.0.1:9',
      MAIL_FROM: 'post@example.com',
    });
    @Module({ imports: [ConfigModule.with(env), DatabaseModule, AccessModule], controllers: [Routes] })
    class Root {}
    app = await NestFactory.create(Root, { logger: false });
    app.useGlobalFilters(new ProblemFilter());
    await app.listen(0, '127.0.0.1');
  });
  afterAll(async () => {
    await app.close();
    await drop();
  });

  it('denies a route that says nothing about access', async () => {
    const answer = await request(app.getHttpServer()).get('/forgotten').expect(403);
    expect(answer.text).not.toContain('a secret');
    await request(app.getHttpServer()).get('/open').expect(200, 'no secret');
  });
});

describe('the permission table', () => {
  it('gives the owner everything, and each role no more than the one before it', () => {
    for (const permission of Object.keys(permissions) as (keyof typeof permissions)[]) {
      const granted = roles.map((role) => allows(role, permission));
      expect(granted[0], permission).toBe(true);
      // In the order owner, designer, crew: once denied, denied for the rest.
      expect(granted, permission).toEqual([...granted].sort((a, b) => Number(b) - Number(a)));
    }
  });
});
