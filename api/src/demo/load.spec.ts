import { NestFactory } from '@nestjs/core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Agent } from '../../test/harness.js';
import { type SheetTest, startSheetTest } from '../modules/sheets/sheets.testkit.js';
import { DemoModule } from './demo.module.js';
import { DemoService } from './demo.service.js';
import { DEMO_PASSWORD, demoPeople } from './scenario.js';

const NOW = new Date('2026-05-20T15:00:00Z');

describe('the demo company', () => {
  let test: SheetTest;
  let owner: Agent;

  const load = async () => {
    const context = await NestFactory.createApplicationContext(DemoModule.with(test.env), { logger: false });
    try {
      await context.get(DemoService).load(NOW);
    } finally {
      await context.close();
    }
  };
  const signIn = async (email: string): Promise<Agent> => {
    const agent = test.agent();
    await agent.post('/api/auth/sign-in').send({ email, password: DEMO_PASSWORD }).expect(200);
    return agent;
  };
  const jobs = async () => (await owner.get('/api/jobs').expect(200)).body.items;

  beforeAll(async () => {
    test = await startSheetTest();
    await load();
    owner = await signIn('owner@fernhollow.example');
  });
  afterAll(() => test?.close());

  it('lets its three people in', async () => {
    for (const { email, name } of demoPeople) {
      const me = await (await signIn(email)).get('/api/auth/me').expect(200);
      expect(JSON.stringify(me.body)).toContain(name);
    }
  });

  it('has three jobs, two of them with a plan and its faults, and one empty', async () => {
    const list = await jobs();
    const told = list.map(({ name, faults, cautions, fixtures, thumbnailUrl }: Record<string, unknown>) => ({
      name,
      faults,
      cautions,
      fixtures,
      pictured: thumbnailUrl !== null,
    }));
    expect(told).toHaveLength(3);
    expect(told).toContainEqual({
      name: 'Harrow Bank, rear garden',
      faults: 3,
      cautions: 0,
      fixtures: 14,
      pictured: true,
    });
    expect(told).toContainEqual({
      name: 'Sandpiper Row, whole lot',
      faults: 2,
      cautions: 0,
      fixtures: 21,
      pictured: true,
    });
    expect(told).toContainEqual({
      name: 'Weir Cottage, front walk',
      faults: null,
      cautions: null,
      fixtures: null,
      pictured: false,
    });
  });

  it('stores its sheets at the size that the plans were drawn for', async () => {
    for (const [name, size] of [
      ['Harrow Bank, rear garden', { widthPx: 2400, heightPx: 1600 }],
      ['Sandpiper Row, whole lot', { widthPx: 2200, heightPx: 3400 }],
    ] as const) {
      const job = (await jobs()).find((item: { name: string }) => item.name === name);
      const { body } = await owner.get(`/api/jobs/${job.id}`).expect(200);
      expect(body.siteWalk).not.toBeNull();
      expect(body.sheets).toMatchObject([{ status: 'ready', ...size }]);
      await owner.get(body.sheets[0].imageUrl).expect(200);
    }
  });

  it('is loaded once, however often it is asked for, and keeps what people changed', async () => {
    const before = await jobs();
    const job = before.find((item: { name: string }) => item.name.startsWith('Harrow'));
    await owner.patch(`/api/jobs/${job.id}`).send({ notes: 'Changed by hand.' }).expect(200);
    const plan = async () => (await owner.get(`/api/jobs/${job.id}/plan`).expect(200)).body;
    const drawn = await plan();
    const stored = await test.stored();
    await load();
    expect(await plan()).toEqual(drawn);
    expect(await jobs()).toHaveLength(3);
    expect((await owner.get(`/api/jobs/${job.id}`).expect(200)).body.notes).toBe('Changed by hand.');
    expect((await test.stored()).filter((key) => key.endsWith('original'))).toEqual(
      stored.filter((key) => key.endsWith('original')),
    );
  });

  it('completes a load that was broken off', async () => {
    await test.database.executeSql(`DELETE FROM sheets WHERE name = 'Plot plan'`);
    await test.database.executeSql(
      `DELETE FROM plans WHERE job_id = (SELECT id FROM jobs WHERE name LIKE 'Sandpiper%')`,
    );
    await load();
    const job = (await jobs()).find((item: { name: string }) => item.name.startsWith('Sandpiper'));
    expect(job).toMatchObject({ faults: 2, fixtures: 21 });
  });
});
