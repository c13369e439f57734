import { randomBytes } from 'node:crypto';
import { createReadStream } from 'node:fs';
import { mkdtemp, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { Readable } from 'node:stream';
import { buffer } from 'node:stream/consumers';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { type Env, parseEnv } from '../../config/env.js';
import { type FakeS3, startFakeS3 } from './fake-s3.js';
import { S3Storage } from './s3-storage.js';

/**
 * One set of promises for the local stand-in and for the real thing: set TEST_S3_ENDPOINT, TEST_S3_BUCKET,
 * TEST_S3_ACCESS_KEY_ID and TEST_S3_SECRET_ACCESS_KEY (and TEST_S3_REGION) to run it against a service.
 */
const real = process.env.TEST_S3_BUCKET !== undefined;

describe(`object storage (${real ? 'a real service' : 'the local stand-in'})`, () => {
  let folder: string;
  let fake: FakeS3 | null = null;
  let env: Env;
  let storage: S3Storage;
  const prefix = `test-${randomBytes(6).toString('hex')}/`;
  const envWith = (s3: Record<string, string | undefined>) =>
    parseEnv({
      LAMPWRIGHT_MODE: 'local',
      PUBLIC_URL: 'http://127.0.0.1',
      DATABASE_URL: 'postgres://127.0.0.1/none',
      SESSION_SECRET: 'a secret that only this test of storage uses',
      SMTP_URL: 'smtp://127.0.0.1',
      MAIL_FROM: 'post@example.com',
      ...s3,
    });

  beforeAll(async () => {
    folder = await mkdtemp(join(tmpdir(), 'lampwright-storage-'));
    if (real) {
      env = envWith({
        S3_ENDPOINT: process.env.TEST_S3_ENDPOINT,
        S3_REGION: process.env.TEST_S3_REGION,
        S3_BUCKET: process.env.TEST_S3_BUCKET,
        S3_ACCESS_KEY_ID: process.env.TEST_S3_ACCESS_KEY_ID,
        S3_SECRET_ACCESS_KEY: process.env.TEST_S3_SECRET_ACCESS_KEY,
      });
    } else {
      const key = { accessKeyId: 'storage-spec', secretAccessKey: randomBytes(12).toString('hex') };
      fake = await startFakeS3({ port: 0, dir: join(folder, 'objects'), bucket: 'spec', ...key });
      env = envWith({
        S3_ENDPOINT: fake.endpoint,
        S3_BUCKET: 'spec',
        S3_ACCESS_KEY_ID: key.accessKeyId,
        S3_SECRET_ACCESS_KEY: key.secretAccessKey,
      });
    }
    storage = new S3Storage(env);
  });
  afterAll(async () => {
    await storage.deletePrefix(prefix);
    await fake?.close();
    await rm(folder, { recursive: true, force: true });
  });

  const keys = async (under: string) => {
    const found: string[] = [];
    for await (const key of storage.list(under)) found.push(key);
    return found.sort();
  };
  const read = async (key: string) => {
    const found = await storage.get(key);
    return found && { type: found.type, length: found.length, bytes: await buffer(found.stream) };
  };

  it('gives back what it was given, byte by byte, with its type', async () => {
    const bytes = randomBytes(300_000);
    await storage.put(`${prefix}a/buffer`, bytes, 'image/png');
    expect(await read(`${prefix}a/buffer`)).toEqual({ type: 'image/png', length: bytes.length, bytes });
  });

  it('takes the stream of a file whole', async () => {
    const bytes = randomBytes(3_000_000);
    const path = join(folder, 'file');
    await writeFile(path, bytes);
    await storage.put(`${prefix}a/stream`, createReadStream(path), 'application/pdf');
    expect((await read(`${prefix}a/stream`))?.bytes.equals(bytes)).toBe(true);
  });

  it('overwrites', async () => {
    await storage.put(`${prefix}a/again`, Buffer.from('first'), 'text/plain');
    await storage.put(`${prefix}a/again`, Buffer.from('2nd'), 'text/plain');
    expect((await read(`${prefix}a/again`))?.bytes.toString()).toBe('2nd');
  });

  it('knows nothing of what is not there, and deletes it without complaint', async () => {
    expect(await storage.get(`${prefix}nothing`)).toBeNull();
    await storage.delete(`${prefix}nothing`);
    await storage.deletePrefix(`${prefix}nothing/`);
  });

  it('lists and deletes by prefix, and nothing beside it', async () => {
    for (const name of ['x/1', 'x/2/3', 'xy/1'])
      await storage.put(`${prefix}${name}`, Buffer.from(name), 'text/plain');
    expect(await keys(`${prefix}x/`)).toEqual([`${prefix}x/1`, `${prefix}x/2/3`]);
    await storage.delete(`${prefix}x/1`);
    expect(await keys(`${prefix}x/`)).toEqual([`${prefix}x/2/3`]);
    await storage.deletePrefix(`${prefix}x/`);
    expect(await keys(`${prefix}x`)).toEqual([`${prefix}xy/1`]);
  });

  it('is healthy where the bucket is, and only there', async () => {
    await storage.healthy();
    const elsewhere = new S3Storage({ ...env, S3_BUCKET: `${env.S3_BUCKET}-not-there` });
    await expect(elsewhere.healthy()).rejects.toThrow();
  });

  it('refuses a wrong key', async () => {
    const stranger = new S3Storage({ ...env, S3_ACCESS_KEY_ID: 'somebody-else' });
    await expect(stranger.put(`${prefix}stranger`, Buffer.from('x'), 'text/plain')).rejects.toThrow();
    expect(await storage.get(`${prefix}stranger`)).toBeNull();
  });

  it('refuses a stream that breaks off', async () => {
    const broken = new Readable({
      read() {
        this.destroy(new Error('cut off'));
      },
    });
    await expect(storage.put(`${prefix}broken`, broken, 'text/plain')).rejects.toThrow('cut off');
    expect(await storage.get(`${prefix}broken`)).toBeNull();
  });
});
