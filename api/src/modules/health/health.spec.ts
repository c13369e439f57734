import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { startTestApp, type TestApp } from '../../../test/harness.js';

describe('GET /api/health', () => {
  let test: TestApp;
  beforeAll(async () => {
    test = await startTestApp();
  });
  afterAll(() => test.close());

  it('names the part that does not answer', async () => {
    // Nothing listens where this application's storage should be.
    const answer = await test.agent().get('/api/health').expect(503);
    expect(answer.body).toEqual({ status: 'failing', database: 'ok', storage: 'failing', queue: 'ok' });
    expect(answer.headers['x-request-id']).toMatch(/^[0-9a-f-]{36}$/);
  });

  it('answers an unknown address with problem details', async () => {
    const answer = await test.agent().get('/api/nothing-here').expect(404);
    expect(answer.headers['content-type']).toContain('application/problem+json');
    expect(answer.body).toMatchObject({ status: 404, code: 'not-found' });
  });

  it('answers a body that is not JSON, or too large, in words', async () => {
    const post = () => test.agent().post('/api/auth/sign-in').set('Content-Type', 'application/json');
    expect((await post().send('{"email":').expect(400)).body.code).toBe('not-json');
    expect(
      (
        await post()
          .send(`{"email":"${'a'.repeat(300_000)}"}`)
          .expect(413)
      ).body.code,
    ).toBe('too-large');
  });
});
