import type { Readable } from 'node:stream';

export interface StoredObject {
  readonly stream: Readable;
  readonly length: number;
  readonly type: string;
}

/** Where files live. Keys start with the company's id, so that a tenant's files are one prefix. */
export abstract class ObjectStorage {
  abstract put(key: string, body: Buffer | Readable, type: string): Promise<void>;
  /** Null when there is no such object. */
  abstract get(key: string): Promise<StoredObject | null>;
  abstract delete(key: string): Promise<void>;
  abstract deletePrefix(prefix: string): Promise<void>;
  abstract list(prefix: string): AsyncIterable<string>;
  /** Throws when storage can't be reached. */
  abstract healthy(): Promise<void>;
}
