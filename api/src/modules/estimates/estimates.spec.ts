import { type EstimateRequest, estimateAnswerSchema } from '@lampwright/geometry/estimate';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { startTestApp, type TestApp } from '../../../test/harness.js';
import { addCompany, addPerson, type TestPerson } from '../../../test/people.js';
import { RequestBudget } from './request-budget.js';

function requestOf(fixtures: number): EstimateRequest {
  const node = (i: number) => (i === 0 ? 's' : `n${i}`);
  return {
    transformers: [
      { id: 'T', ratedVA: 900, taps: [{ id: '14V', volts: 14 }], commons: [{ id: 'C', limitAmps: 75 }] },
    ],
    runs: [
      {
        id: 'R',
        transformerId: 'T',
        tapId: '14V',
        commonId: 'C',
        source: 's',
        cables: Array.from({ length: fixtures }, (_, i) => ({
          id: `k${i}`,
          from: node(Math.floor(i / 2)),
          to: node(i + 1),
          lengthMeters: 1 + (i % 5),
          conductor: { awg: 10 },
        })),
        fixtures: Array.from({ length: fixtures }, (_, i) => ({
          id: `f${i}`,
          at: node(i + 1),
          load: { kind: 'driver', watts: 3, powerFactor: 0.9, minVolts: 9 },
          lead: { conductor: { awg: 18 }, lengthMeters: 1 },
          window: { minVolts: 9, maxVolts: 15 },
        })),
      },
    ],
  };
}

describe('POST /api/estimates', () => {
  let test: TestApp;
  let crew: TestPerson;
  let designer: TestPerson;
  beforeAll(async () => {
    test = await startTestApp();
    const company = await addCompany(test);
    crew = await addPerson(test, company, 'crew');
    designer = await addPerson(test, company, 'designer');
  });
  afterAll(() => test?.close());

  const ask = (body: object | string, person = designer) =>
    person.agent.post('/api/estimates').set('Content-Type', 'application/json').send(body);

  it('answers 200 with the contract, and tells where the time went', async () => {
    const answer = await ask(requestOf(200), crew).expect(200);
    expect(answer.headers['content-type']).toMatch(/^application\/json/);
    expect(estimateAnswerSchema.parse(answer.body)).toEqual(answer.body);
    expect(answer.body.fixtures).toHaveLength(200);
    const timing = [...String(answer.headers['server-timing']).matchAll(/(\w+);dur=([\d.]+)/g)];
    expect(timing.map(([, name]) => name)).toEqual(['parse', 'validate', 'solve', 'write']);
    for (const [, , took] of timing) expect(Number(took)).toBeGreaterThan(0);
  });

  it('answers 400 with a pointer to every fault', async () => {
    const request = requestOf(3);
    request.runs[0]!.cables[2]!.lengthMeters = -3;
    request.runs[0]!.tapId = 'X';
    const { body, headers } = await ask({ ...request, colour: 'red' }).expect(400);
    expect(headers['content-type']).toMatch(/^application\/problem\+json/);
    expect(body).toMatchObject({ status: 400, code: 'bad-input' });
    expect(body.errors.map(({ pointer }: { pointer: string }) => pointer).sort()).toEqual([
      '/colour',
      '/runs/0/cables/2/lengthMeters',
      '/runs/0/tapId',
    ]);
  });

  it.each([
    ['no body', ''],
    ['no JSON', '{"runs": ['],
    ['no object', '[1, 2]'],
    ['a number past doubles', JSON.stringify(requestOf(1)).replace('"volts":14', '"volts":1e999')],
    ['prototype names', '{"__proto__": {"runs": []}, "transformers": [], "runs": [{"constructor": null}]}'],
    ['a hundred thousand brackets', `${'['.repeat(1e5)}${']'.repeat(1e5)}`],
  ])('answers 400 to %s', async (_, text) => {
    const { body } = await ask(text).expect(400);
    expect(body.detail).toMatch(/\.$/);
  });

  it('takes bodies above the common limit, up to 8 MB, and answers 413 beyond', async () => {
    const big = requestOf(5000);
    expect(JSON.stringify(big).length).toBeGreaterThan(1_000_000);
    await ask(big).expect(200);
    const { body } = await ask(`${JSON.stringify(requestOf(1))}${' '.repeat(8.5 * 2 ** 20)}`).expect(413);
    expect(body).toMatchObject({ status: 413, code: 'too-large' });
  });

  it('answers 422 in words where no answer exists that it could stand by', async () => {
    const request = requestOf(1);
    request.transformers[0]!.lineVolts = 1e308;
    const { body } = await ask(request).expect(422);
    expect(body).toMatchObject({ status: 422, code: 'no-convergence', runIds: ['R'] });
    expect(body.detail).toMatch(/^No steady voltage/);
  });

  it('lets a person ask fifty times at once, and refuses a flood with Retry-After', async () => {
    const company = await addCompany(test, 'Another company');
    const eager = await addPerson(test, company, 'owner');
    const budget = test.app.get(RequestBudget, { strict: false });
    const { clock } = budget;
    const stopped = clock();
    budget.clock = () => stopped;
    try {
      const atOnce = await Promise.all(Array.from({ length: 50 }, () => ask(requestOf(1), eager)));
      expect(atOnce.map(({ status }) => status)).toEqual(atOnce.map(() => 200));
      const flood = await Promise.all(Array.from({ length: 100 }, () => ask(requestOf(1), eager)));
      const refused = flood.filter(({ status }) => status === 429);
      expect(refused).toHaveLength(30);
      expect(refused[0]!.headers['retry-after']).toBe('1');
      expect(refused[0]!.body).toMatchObject({ status: 429, code: 'too-many-requests' });
      await ask(requestOf(1), crew).expect(200);
    } finally {
      budget.clock = clock;
    }
  });

  it('is in the OpenAPI document, request and answer', async () => {
    const { body } = await test.agent().get('/api/openapi.json').expect(200);
    const operation = body.paths['/api/estimates'].post;
    const request = operation.requestBody.content['application/json'].schema;
    expect(request.required).toEqual(['transformers', 'runs']);
    expect(request.additionalProperties).toBe(false);
    expect(JSON.stringify(operation.responses['200'])).toContain('dropPercent');
  });
});
