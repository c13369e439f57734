import { monitorEventLoopDelay } from 'node:perf_hooks';
import { emptyPricing, type JobPricing } from '@lampwright/geometry/price';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { startTestApp, type TestApp } from '../../../test/harness.js';
import { addJob } from '../plans/plans.testkit.js';
import {
  addPricedCompany,
  draw,
  group,
  type PricedCompany,
  quoteFor,
  savePricing,
} from './pricing.testkit.js';

const RUNS = 10;
const LIGHTS_PER_RUN = 50;
const GROUPS = 6;
/** A busy machine is no failure. */
const TIME_LIMIT_MS = 180_000;

/** Printed, not asserted: it depends on the machine and on what else it does. */
describe('the speed of a quote', () => {
  let test: TestApp;
  let company: PricedCompany;
  beforeAll(async () => {
    test = await startTestApp();
    company = await addPricedCompany(test);
  });
  afterAll(() => test?.close());

  it(
    `of ${RUNS * LIGHTS_PER_RUN} fixtures in ${GROUPS} groups`,
    async () => {
      const { agent } = company.owner;
      const jobId = await addJob(company.designer);
      const members: Record<string, string> = {};
      await draw(test, company, jobId, (plan) => {
        plan.area(
          'building',
          'House',
          [
            [1500, 20],
            [2500, 20],
            [2500, 80],
            [1500, 80],
          ],
          3,
        );
        plan.area('water', 'Pond', [
          [3800, 2000],
          [3950, 2000],
          [3950, 2800],
          [3800, 2800],
        ]);
        for (let i = 0; i < 6; i++)
          plan.area('paved', `Path ${i}`, [
            [600 * i + 200, 300],
            [600 * i + 300, 300],
            [600 * i + 300, 2900],
            [600 * i + 200, 2900],
          ]);
        for (let run = 0; run < RUNS; run++) {
          const y = 120 + 270 * run;
          const box = plan.transformer('Multi-tap transformer, 300 VA', [60, y], `Box ${run}`);
          const lights = plan.fixtures(
            'Low spread light, 2 W',
            Array.from({ length: LIGHTS_PER_RUN }, (_, i) => [120 + 70 * i, y + (i % 5) * 20] as const),
          );
          plan.cable('8 AWG landscape cable, 2-core', [box, ...lights]);
          lights.forEach((id, i) => {
            members[id] = `g${(run + Math.floor(i / 25)) % GROUPS}`;
          });
        }
      });
      const groups = Array.from({ length: GROUPS }, (_, i) => group(`g${i}`, i < 3));
      const pricing: JobPricing = { ...emptyPricing, groups, members };
      await savePricing(agent, jobId, pricing);
      const timed = async () => {
        const delay = monitorEventLoopDelay({ resolution: 1 });
        delay.enable();
        const start = performance.now();
        const answer = await quoteFor(agent, jobId);
        delay.disable();
        return { ms: performance.now() - start, blockedMs: delay.max / 1e6, answer };
      };
      const first = await timed();
      const again = await timed();
      expect(again.answer).toEqual(first.answer);
      expect(first.answer.checks).toHaveLength(2 ** GROUPS);
      const told = (it: typeof first) =>
        `${it.ms.toFixed(0)} ms, others waited ${it.blockedMs.toFixed(0)} ms at most`;
      console.info(
        `Quote of ${Object.keys(members).length} fixtures, ${2 ** GROUPS} combinations: ${told(first)}; again: ${told(again)}`,
      );
    },
    TIME_LIMIT_MS,
  );
});
