import type { Readable } from 'node:stream';
import {
  DeleteObjectCommand,
  DeleteObjectsCommand,
  GetObjectCommand,
  HeadBucketCommand,
  ListObjectsV2Command,
  NoSuchKey,
  PutObjectCommand,
  S3Client,
} from '@aws-sdk/client-s3';
import type { Env } from '../../config/env.js';
import { ObjectStorage, type StoredObject } from './storage.js';

/** Any S3-compatible service, the local stand-in included. */
export class S3Storage extends ObjectStorage {
  private readonly client: S3Client;
  private readonly bucket: string;

  constructor(env: Env) {
    super();
    this.bucket = env.S3_BUCKET;
    this.client = new S3Client({
      region: env.S3_REGION,
      credentials: { accessKeyId: env.S3_ACCESS_KEY_ID, secretAccessKey: env.S3_SECRET_ACCESS_KEY },
      // A named endpoint (the local stand-in, a self-hosted service) is addressed by path.
      ...(env.S3_ENDPOINT ? { endpoint: env.S3_ENDPOINT, forcePathStyle: true } : {}),
      // Checksummed streams arrive corrupted at services that don't know them.
      requestChecksumCalculation: 'WHEN_REQUIRED',
      responseChecksumValidation: 'WHEN_REQUIRED',
    });
  }

  async put(key: string, body: Buffer | Readable, type: string): Promise<void> {
    const command = new PutObjectCommand({ Bucket: this.bucket, Key: key, Body: body, ContentType: type });
    if (Buffer.isBuffer(body)) {
      await this.client.send(command);
      return;
    }
    // The client does not listen for a source that fails: nobody listening would end the process.
    const stop = new AbortController();
    let failure: Error | null = null;
    body.on('error', (error) => {
      failure = error;
      stop.abort();
    });
    try {
      await this.client.send(command, { abortSignal: stop.signal });
    } catch (error) {
      throw failure ?? error;
    }
  }

  async get(key: string): Promise<StoredObject | null> {
    try {
      const found = await this.client.send(new GetObjectCommand({ Bucket: this.bucket, Key: key }));
      if (!found.Body) return null;
      return {
        stream: found.Body as Readable,
        length: found.ContentLength ?? 0,
        type: found.ContentType ?? 'application/octet-stream',
      };
    } catch (error) {
      if (error instanceof NoSuchKey) return null;
      throw error;
    }
  }

  async delete(key: string): Promise<void> {
    await this.client.send(new DeleteObjectCommand({ Bucket: this.bucket, Key: key }));
  }

  async deletePrefix(prefix: string): Promise<void> {
    let batch: string[] = [];
    const flush = async () => {
      if (batch.length === 0) return;
      await this.client.send(
        new DeleteObjectsCommand({
          Bucket: this.bucket,
          Delete: { Objects: batch.map((Key) => ({ Key })), Quiet: true },
        }),
      );
      batch = [];
    };
    for await (const key of this.list(prefix)) {
      batch.push(key);
      if (batch.length === 1000) await flush();
    }
    await flush();
  }

  async *list(prefix: string): AsyncIterable<string> {
    let token: string | undefined;
    do {
      const page = await this.client.send(
        new ListObjectsV2Command({ Bucket: this.bucket, Prefix: prefix, ContinuationToken: token }),
      );
      for (const object of page.Contents ?? []) if (object.Key) yield object.Key;
      token = page.NextContinuationToken;
    } while (token);
  }

  async healthy(): Promise<void> {
    await this.client.send(new HeadBucketCommand({ Bucket: this.bucket }));
  }
}
