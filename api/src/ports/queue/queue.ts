import { Inject, Injectable, Logger, type OnApplicationShutdown, type OnModuleInit } from '@nestjs/common';
import PgBoss from 'pg-boss';
import { ENV } from '../../config/config.module.js';
import type { Env } from '../../config/env.js';
import { Database } from '../../database/database.js';
import { type QueueName, type QueuePayloads, queues } from './queues.js';

/** How often a worker looks for new jobs: the shortest that the queue offers. */
const POLL_SECONDS = 0.5;

export interface SendOptions {
  /** With a `short` queue: at most one waiting job with this key. */
  readonly singletonKey?: string;
  readonly startAfterSeconds?: number;
}

/**
 * The job queue, kept in PostgreSQL. Sent inside a transaction, a job exists only if the transaction commits.
 * A handler of a `short` queue must lock what it reads (FOR SHARE on the row that writers lock): a sender
 * whose job was dropped as already waiting may commit only after that job has started.
 */
@Injectable()
export class Queue implements OnModuleInit, OnApplicationShutdown {
  private readonly boss: PgBoss;
  private readonly logger = new Logger('queue');
  private stopped = false;

  constructor(
    @Inject(ENV) env: Env,
    @Inject(Database) private readonly database: Database,
  ) {
    this.boss = new PgBoss({
      connectionString: env.DATABASE_URL,
      application_name: 'lampwright-queue',
      max: 4,
      archiveCompletedAfterSeconds: 3600,
      deleteAfterDays: 7,
    });
    this.boss.on('error', (error) => this.logger.warn({ name: error.name }, 'queue is not reachable'));
  }

  async onModuleInit(): Promise<void> {
    await this.boss.start();
    for (const name of Object.keys(queues) as QueueName[]) {
      if (!(await this.boss.getQueue(name))) await this.boss.createQueue(name, { name, ...queues[name] });
    }
  }

  async send<N extends QueueName>(name: N, data: QueuePayloads[N], options: SendOptions = {}): Promise<void> {
    const { policy: _, ...settings } = queues[name];
    await this.boss.send(name, data, {
      ...settings,
      ...(options.singletonKey === undefined ? {} : { singletonKey: options.singletonKey }),
      ...(options.startAfterSeconds === undefined ? {} : { startAfter: options.startAfterSeconds }),
      db: { executeSql: (text, values) => this.database.executeSql(text, values) },
    });
  }

  /** Handles jobs of a queue one at a time; a thrown error is retried as the queue's settings say. */
  async work<N extends QueueName>(
    name: N,
    handle: (data: QueuePayloads[N], jobId: string) => Promise<void>,
  ): Promise<void> {
    await this.boss.work<QueuePayloads[N]>(name, { pollingIntervalSeconds: POLL_SECONDS }, async (jobs) => {
      for (const job of jobs) {
        try {
          await handle(job.data, job.id);
        } catch (error) {
          throw withoutParameters(error);
        }
      }
    });
  }

  /** Throws when the queue can't be asked. */
  async check(): Promise<void> {
    await this.boss.getQueue('mail.send');
  }

  async onApplicationShutdown(): Promise<void> {
    if (this.stopped) return;
    this.stopped = true;
    await this.boss.stop({ graceful: true, wait: true, timeout: 8000 });
  }
}

/** The queue stores what a handler threw; messages of database errors hold parameters, maybe personal ones. */
function withoutParameters(error: unknown): Error {
  if (!(error instanceof Error)) return new Error('The handler threw something that is no error.');
  if (!(error.cause instanceof Error)) return error;
  const code = 'code' in error.cause ? ` (${String(error.cause.code)})` : '';
  const told = new Error(`${error.name}${code}`);
  told.stack = (error.stack ?? '')
    .split('\n')
    .filter((line) => line.trimStart().startsWith('at '))
    .join('\n');
  return told;
}
