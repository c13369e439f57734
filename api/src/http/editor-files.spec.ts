import { once } from 'node:events';
import { mkdir, mkdtemp, rm, writeFile } from 'node:fs/promises';
import {
  type IncomingHttpHeaders,
  type IncomingMessage,
  type OutgoingHttpHeaders,
  request,
  type Server,
} from 'node:http';
import type { AddressInfo } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { buffer } from 'node:stream/consumers';
import { brotliCompressSync, brotliDecompressSync, gunzipSync, gzipSync } from 'node:zlib';
import express from 'express';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { editorFiles } from './editor-files.js';

const SCRIPT = 'export const words = "Wörter";\n'.repeat(100);
const PAGE = `<!doctype html><title>Lampwright</title>${'<p>lamp</p>'.repeat(200)}`;
const FONT = Buffer.alloc(3000, 7);

let folder: string;
let server: Server;

beforeAll(async () => {
  folder = await mkdtemp(join(tmpdir(), 'lampwright-files-'));
  await mkdir(join(folder, 'assets'));
  for (const [name, content] of [
    ['index.html', PAGE],
    ['assets/page-abc.js', SCRIPT],
  ] as const) {
    await writeFile(join(folder, name), content);
    await writeFile(join(folder, `${name}.br`), brotliCompressSync(content));
    await writeFile(join(folder, `${name}.gz`), gzipSync(content));
  }
  await writeFile(join(folder, 'assets/small-abc.js'), 'export {};');
  await writeFile(join(folder, 'assets/face-abc.woff2'), FONT);
  const app = express();
  app.use(editorFiles(folder));
  server = app.listen(0, '127.0.0.1');
  await once(server, 'listening');
});
afterAll(async () => {
  server.close();
  await rm(folder, { recursive: true, force: true });
});

interface Sent {
  readonly status: number;
  readonly headers: IncomingHttpHeaders;
  /** As they were sent, not unpacked. */
  readonly bytes: Buffer;
}

async function ask(path: string, headers: OutgoingHttpHeaders = {}, method = 'GET'): Promise<Sent> {
  const { port } = server.address() as AddressInfo;
  const asked = request({ host: '127.0.0.1', port, path, headers, method, agent: false });
  asked.end();
  const [answer] = (await once(asked, 'response')) as [IncomingMessage];
  return { status: answer.statusCode ?? 0, headers: answer.headers, bytes: await buffer(answer) };
}

const BROWSER = { 'Accept-Encoding': 'gzip, deflate, br, zstd' };

const unpacked = ({ headers, bytes }: Sent): string => {
  const encoding = headers['content-encoding'];
  if (encoding === 'br') return brotliDecompressSync(bytes).toString();
  return (encoding === 'gzip' ? gunzipSync(bytes) : bytes).toString();
};

describe.each([
  ['/assets/page-abc.js', SCRIPT, 'text/javascript; charset=utf-8', 'public, max-age=31536000, immutable'],
  ['/', PAGE, 'text/html; charset=utf-8', 'no-cache'],
  ['/jobs/some-job', PAGE, 'text/html; charset=utf-8', 'no-cache'],
])('%s', (path, content, type, caching) => {
  it.each([
    ['gzip, deflate, br, zstd', 'br'],
    ['gzip, deflate', 'gzip'],
    ['br;q=0, gzip', 'gzip'],
    ['*', 'br'],
    ['identity', undefined],
    [undefined, undefined],
  ])('for a caller that takes %s is sent as %s', async (accept, encoding) => {
    const headers = accept === undefined ? {} : { 'Accept-Encoding': accept };
    const sent = await ask(path, headers);
    expect(sent.status).toBe(200);
    expect(sent.headers['content-encoding']).toBe(encoding);
    expect(sent.headers).toMatchObject({
      'content-type': type,
      'cache-control': caching,
      vary: 'Accept-Encoding',
      'content-length': String(sent.bytes.length),
    });
    expect(unpacked(sent)).toBe(content);
    const head = await ask(path, headers, 'HEAD');
    expect(head.bytes).toHaveLength(0);
    const { date: _then, ...asked } = sent.headers;
    const { date: _now, ...told } = head.headers;
    expect(told).toEqual(asked);
  });

  it('has a tag for each encoding, by which an unchanged one is not sent again', async () => {
    const tags: string[] = [];
    for (const accept of ['br', 'gzip', 'identity']) {
      const headers = { 'Accept-Encoding': accept };
      const { headers: sent } = await ask(path, headers);
      tags.push(sent.etag ?? '');
      const again = await ask(path, { ...headers, 'If-None-Match': sent.etag });
      expect([again.status, again.bytes.length, again.headers.vary]).toEqual([304, 0, 'Accept-Encoding']);
    }
    expect(new Set(tags).size).toBe(3);
    expect((await ask(path, { ...BROWSER, 'If-None-Match': tags[2] })).status).toBe(200);
  });

  it('is sent in ranges of the bytes that are sent whole', async () => {
    const whole = await ask(path, BROWSER);
    const part = await ask(path, { ...BROWSER, Range: 'bytes=10-19' });
    expect(part.status).toBe(206);
    expect(part.headers['content-encoding']).toBe('br');
    expect(part.headers['content-range']).toBe(`bytes 10-19/${whole.bytes.length}`);
    expect(part.bytes).toEqual(whole.bytes.subarray(10, 20));
    const beyond = await ask(path, { ...BROWSER, Range: `bytes=${whole.bytes.length}-` });
    expect(beyond.status).toBe(416);
  });
});

it('sends what has no copies as it is', async () => {
  for (const [path, content] of [
    ['/assets/small-abc.js', Buffer.from('export {};')],
    ['/assets/face-abc.woff2', FONT],
  ] as const) {
    const sent = await ask(path, BROWSER);
    expect(sent.headers['content-encoding']).toBeUndefined();
    expect(sent.bytes).toEqual(content);
  }
});

it('does not know a file that is not there, whatever its name leads to', async () => {
  for (const [path, refusal] of [
    ['/assets/none.js', 404],
    ['/assets/../index.html', 403],
    ['/assets/%2e%2e/index.html', 403],
  ] as const) {
    const { status, headers } = await ask(path, BROWSER);
    expect([path, status, headers['content-encoding']]).toEqual([path, refusal, undefined]);
  }
});
