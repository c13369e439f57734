import { Inject, Injectable } from '@nestjs/common';
import { Database } from '../../database/database.js';
import { Queue } from '../../ports/queue/queue.js';
import { ObjectStorage } from '../../ports/storage/storage.js';
import type { Health } from './health.dto.js';

/** A part that does not answer by then counts as failing. */
const PATIENCE_MS = 3000;

@Injectable()
export class HealthService {
  constructor(
    @Inject(Database) private readonly database: Database,
    @Inject(ObjectStorage) private readonly storage: ObjectStorage,
    @Inject(Queue) private readonly queue: Queue,
  ) {}

  async check(): Promise<Health> {
    const [database, storage, queue] = await Promise.all([
      answers(this.database.executeSql('SELECT 1')),
      answers(this.storage.healthy()),
      answers(this.queue.check()),
    ]);
    const all = [database, storage, queue].every((part) => part === 'ok');
    return { status: all ? 'ok' : 'failing', database, storage, queue };
  }
}

async function answers(asked: Promise<unknown>): Promise<'ok' | 'failing'> {
  let timer: NodeJS.Timeout | undefined;
  const late = new Promise<'failing'>((resolve) => {
    timer = setTimeout(() => resolve('failing'), PATIENCE_MS);
  });
  try {
    return await Promise.race([
      asked.then(
        () => 'ok' as const,
        () => 'failing' as const,
      ),
      late,
    ]);
  } finally {
    clearTimeout(timer);
  }
}
