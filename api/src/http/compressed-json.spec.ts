import express, { type Response } from 'express';
import request from 'supertest';
import { expect, it } from 'vitest';
import { compressedJson } from './compressed-json.js';

const LARGE = { lamps: Array.from({ length: 200 }, (_, i) => ({ tag: `P${i}`, volts: 11.6 })) };

const app = express();
app.use(compressedJson);
const large = (_request: unknown, response: Response) => response.json(LARGE);
app.get('/large', large);
app.post('/large', large);
app.get('/small', (_request, response) => response.json({ lamp: 1 }));
app.get('/cookie', (_request, response) => response.cookie('session', 'x').json(LARGE));
app.get('/paper', (_request, response) => response.type('application/pdf').send(Buffer.alloc(5000, 32)));
app.get('/events', (_request, response) => {
  response.writeHead(200, { 'Content-Type': 'text/event-stream' });
  response.write(`data: ${'x'.repeat(5000)}\n\n`);
  response.end();
});

const OURS = { 'Sec-Fetch-Site': 'same-origin', 'Accept-Encoding': 'gzip, deflate, br, zstd' };
const ask = (path: string, headers: Record<string, string> = OURS) => request(app).get(path).set(headers);

it('compresses JSON of some size that our own pages ask for', async () => {
  const { headers, body } = await ask('/large').expect(200);
  expect(headers).toMatchObject({ 'content-encoding': 'br', vary: 'Accept-Encoding' });
  expect(body).toEqual(LARGE);
  const gzip = await ask('/large', { ...OURS, 'Accept-Encoding': 'gzip' }).expect(200);
  expect(gzip.headers['content-encoding']).toBe('gzip');
  expect(gzip.body).toEqual(LARGE);
  const none = await ask('/large', { ...OURS, 'Accept-Encoding': 'identity' }).expect(200);
  expect(none.headers['content-encoding']).toBeUndefined();
  expect(none.headers.vary).toBe('Accept-Encoding');
  expect(none.body).toEqual(LARGE);
});

it('tells an unchanged answer as such, and of one asked about only its head', async () => {
  const { headers } = await ask('/large').expect(200);
  await ask('/large', { ...OURS, 'If-None-Match': headers.etag! }).expect(304);
  const head = await request(app).head('/large').set(OURS).expect(200);
  expect(head.headers.etag).toBe(headers.etag);
  expect(head.headers['content-encoding']).toBeUndefined();
});

it('compresses nothing that another site, or nobody knows who, has asked for', async () => {
  for (const site of ['cross-site', 'same-site', 'none', ''])
    expect(
      (await ask('/large', { ...OURS, 'Sec-Fetch-Site': site })).headers['content-encoding'],
    ).toBeUndefined();
  const { 'Sec-Fetch-Site': _site, ...older } = OURS;
  expect((await ask('/large', older)).headers['content-encoding']).toBeUndefined();
});

it('leaves answers to actions, cookies, files, streams and small answers alone', async () => {
  const action = await request(app).post('/large').set(OURS).expect(200);
  expect(action.headers['content-encoding']).toBeUndefined();
  for (const path of ['/small', '/cookie', '/paper', '/events'])
    expect([path, (await ask(path).expect(200)).headers['content-encoding']]).toEqual([path, undefined]);
});
