import { randomBytes } from 'node:crypto';
import { mkdtemp, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { setTimeout as sleep } from 'node:timers/promises';
import { type Agent, startTestApp, type TestApp } from '../../../test/harness.js';
import { buildDecodingChild } from '../../media/media.testkit.js';
import { startFakeS3 } from '../../ports/storage/fake-s3.js';
import { ObjectStorage } from '../../ports/storage/storage.js';
import type { Sheet } from './sheets.dto.js';

export interface SheetTest extends TestApp {
  /** The keys of all stored objects. */
  stored(): Promise<string[]>;
}

/** The application with object storage beside it, and a decoding child as the product has it. */
export async function startSheetTest(): Promise<SheetTest> {
  await buildDecodingChild();
  const folder = await mkdtemp(join(tmpdir(), 'lampwright-objects-'));
  const key = {
    accessKeyId: randomBytes(6).toString('hex'),
    secretAccessKey: randomBytes(12).toString('hex'),
  };
  const fake = await startFakeS3({ port: 0, dir: folder, bucket: 'spec', ...key });
  const test = await startTestApp({
    S3_ENDPOINT: fake.endpoint,
    S3_BUCKET: 'spec',
    S3_ACCESS_KEY_ID: key.accessKeyId,
    S3_SECRET_ACCESS_KEY: key.secretAccessKey,
  });
  const storage = test.app.get(ObjectStorage, { strict: false });
  return {
    ...test,
    async stored() {
      const keys: string[] = [];
      for await (const stored of storage.list('')) keys.push(stored);
      return keys.sort();
    },
    async close() {
      await test.close();
      await fake.close();
      await rm(folder, { recursive: true, force: true });
    },
  };
}

export async function newJob(agent: Agent): Promise<string> {
  const answer = await agent
    .post('/api/jobs')
    .send({ name: 'Job', client: { name: 'Client' }, property: { name: 'Garden', address: '' } })
    .expect(201);
  return answer.body.id;
}

/** The sheet once it no longer waits for the worker. */
export async function settled(agent: Agent, id: string): Promise<Sheet> {
  return until(async () => {
    const { body } = await agent.get(`/api/sheets/${id}`).expect(200);
    return body.status === 'uploaded' || body.status === 'processing' ? null : body;
  });
}

/** Asks again and again until there is an answer. */
export async function until<T>(ask: () => Promise<T | null | false>, patienceMs = 25_000): Promise<T> {
  const end = Date.now() + patienceMs;
  for (;;) {
    const answer = await ask();
    if (answer !== null && answer !== false) return answer;
    if (Date.now() > end) throw new Error(`Nothing came within ${patienceMs} ms.`);
    await sleep(50);
  }
}
