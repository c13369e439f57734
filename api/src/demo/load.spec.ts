import { NestFactory } from '@nestjs/core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Agent } from '../../test/harness.js';
import type { QuoteAnswer } from '../modules/pricing/pricing.dto.js';
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

  const jobNamed = async (name: string) =>
    (await jobs()).find((job: { name: string }) => job.name.startsWith(name)) as { id: string };
  const quote = async (name: string, agent: Agent = owner): Promise<QuoteAnswer> => {
    const { id } = await jobNamed(name);
    return (await agent.get(`/api/jobs/${id}/quote`).expect(200)).body;
  };

  it('has its plans priced to the last line, in groups, with their faults in the way', async () => {
    const harrow = await quote('Harrow');
    expect(harrow.quote.groups.map(({ name, fixtures, on }) => [name, fixtures, on])).toEqual([
      ['Base', 0, true],
      ['Path to the patio', 5, true],
      ['Shrub bed', 4, true],
      ['Wall and tree', 5, false],
    ]);
    expect(harrow.obstacles.map(({ mend }) => mend)).toEqual(['faults']);
    expect(harrow.faults).toHaveLength(3);
    const sandpiper = await quote('Sandpiper');
    expect(sandpiper.quote.groups.map(({ name, fixtures, on }) => [name, fixtures, on])).toEqual([
      ['Base', 7, true],
      ['West bed', 4, true],
      ['North bed', 4, true],
      ['Patio and maple', 6, false],
    ]);
    expect(sandpiper.obstacles.map(({ mend }) => mend)).toEqual(['faults']);
    for (const { quote } of [harrow, sandpiper]) {
      expect(quote.warnings).toEqual([]);
      expect(quote.currency).toBe('USD');
      expect(quote.tax).toEqual({ name: 'Sales tax', jurisdiction: 'Marlow Bend', percent: 6 });
      expect(quote.lines.filter(({ section }) => section === 'controls')).toMatchObject([
        { name: 'Sunset timer', quantity: 1, groupId: null },
      ]);
      for (const line of quote.lines) expect(line.priceMinor, line.name).toBeGreaterThan(0);
      expect(quote.margin?.profitPercent).toBeGreaterThan(10);
      const [offered] = quote.combinations;
      expect(offered?.stages.map(({ name, percent, capped }) => [name, percent, capped])).toEqual([
        ['Deposit', 30, false],
        ['Start of work', 40, false],
        ['Balance', null, false],
      ]);
    }
    const designer = await signIn('designer@fernhollow.example');
    expect((await quote('Harrow', designer)).quote.margin).toBeNull();
  });

  it('can be offered in every combination that has a light, once its faults are answered for', async () => {
    const { id } = await jobNamed('Harrow');
    const accepted: string[] = [];
    for (const { key, message } of (await quote('Harrow')).faults) {
      const answer = await owner
        .post(`/api/jobs/${id}/fault-acceptances`)
        .send({ faultKey: key, message, reason: 'For now.' })
        .expect(201);
      accepted.push(answer.body.id);
    }
    const { checks, obstacles } = await quote('Harrow');
    expect(obstacles).toEqual([]);
    expect(checks).toHaveLength(8);
    for (const { groups, offerable } of checks) expect(offerable, groups.join()).toBe(groups.length > 0);
    for (const acceptance of accepted)
      await owner.delete(`/api/jobs/${id}/fault-acceptances/${acceptance}`).expect(204);
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
    const path = `/api/jobs/${job.id}/pricing`;
    const { version, pricing } = (await owner.get(path).expect(200)).body;
    await owner
      .put(path)
      .send({ baseVersion: version, pricing: { ...pricing, aimingVisits: 3 } })
      .expect(200);
    const prices = (await owner.get('/api/catalogue-prices').expect(200)).body;
    const stored = await test.stored();
    await load();
    expect(await plan()).toEqual(drawn);
    expect((await owner.get(path).expect(200)).body.pricing.aimingVisits).toBe(3);
    expect((await owner.get('/api/catalogue-prices').expect(200)).body).toEqual(prices);
    expect((await owner.get('/api/price-book').expect(200)).body.version).toBe(1);
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

  it('gets its prices when it was loaded before there were any, and keeps those that people set', async () => {
    await test.database.executeSql(`DELETE FROM price_books`);
    await test.database.executeSql(`DELETE FROM job_pricings`);
    await test.database.executeSql(`DELETE FROM catalogue_items WHERE category = 'part'`);
    await test.database.executeSql(`DELETE FROM catalogue_prices`);
    const { items } = (await owner.get('/api/catalogue?search=sunset').expect(200)).body;
    const price = { costMinor: 1, priceMinor: 99, per: 1, unit: 'each', increment: 1, taxable: true };
    await owner
      .put(`/api/catalogue/${items[0].id}/price`)
      .send({ price: { ...price, supplier: '', orderNumber: '' } })
      .expect(200);
    await load();
    const { lines, warnings } = (await quote('Harrow')).quote;
    expect(warnings).toEqual([]);
    expect(lines.find(({ name }) => name === 'Sunset timer')?.priceMinor).toBe(99);
    expect(lines.filter(({ section }) => section === 'mounting').length).toBeGreaterThan(1);
  });
});
