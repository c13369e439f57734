import { Readable } from 'node:stream';
import { buffer } from 'node:stream/consumers';
import { ObjectStorage, type StoredObject } from '../src/ports/storage/storage.js';

/** Object storage in memory, for specs that are about something else. */
export class MemoryStorage extends ObjectStorage {
  readonly objects = new Map<string, { body: Buffer; type: string }>();

  async put(key: string, body: Buffer | Readable, type: string): Promise<void> {
    this.objects.set(key, { body: Buffer.isBuffer(body) ? body : await buffer(body), type });
  }
  async get(key: string): Promise<StoredObject | null> {
    const found = this.objects.get(key);
    return found
      ? { stream: Readable.from([found.body]), length: found.body.length, type: found.type }
      : null;
  }
  async delete(key: string): Promise<void> {
    this.objects.delete(key);
  }
  async deletePrefix(prefix: string): Promise<void> {
    for (const key of [...this.objects.keys()]) if (key.startsWith(prefix)) this.objects.delete(key);
  }
  async *list(prefix: string): AsyncIterable<string> {
    for (const key of this.objects.keys()) if (key.startsWith(prefix)) yield key;
  }
  async healthy(): Promise<void> {}
}
