import { Inject, Injectable, Logger, type OnApplicationShutdown } from '@nestjs/common';
import pg from 'pg';
import { ENV } from '../../config/config.module.js';
import type { Env } from '../../config/env.js';
import { PLAN_CHANNEL, type PlanKey } from './plans.repository.js';

const RECONNECT_MILLISECONDS = 1000;

/** A version heard of, or null: some may have been missed, look yourself. */
export type Heard = (version: number | null) => void;

/** Hears of new versions of plans from whichever process made them: one connection for all of this process. */
@Injectable()
export class PlanListener implements OnApplicationShutdown {
  private readonly logger = new Logger('plan-listener');
  private readonly followers = new Map<string, Set<Heard>>();
  private connecting: Promise<void> | null = null;
  private client: pg.Client | null = null;
  private retry: NodeJS.Timeout | null = null;
  private stopped = false;

  constructor(@Inject(ENV) private readonly env: Env) {}

  /** Calls back for each new version of the plan until the returned function is called. */
  async follow(key: PlanKey, heard: Heard): Promise<() => void> {
    const name = nameOf(key);
    const set = this.followers.get(name) ?? new Set();
    this.followers.set(name, set.add(heard));
    // Not listening yet is no reason to refuse: the stream is told to look once it is.
    await this.connected().catch(() => undefined);
    return () => {
      set.delete(heard);
      if (set.size === 0 && this.followers.get(name) === set) this.followers.delete(name);
    };
  }

  private connected(): Promise<void> {
    this.connecting ??= this.connect().catch((error: unknown) => {
      this.connectAgain();
      throw error;
    });
    return this.connecting;
  }

  private async connect(): Promise<void> {
    const client = new pg.Client({
      connectionString: this.env.DATABASE_URL,
      application_name: 'lampwright-listen',
      keepAlive: true,
    });
    client.on('notification', ({ payload }) => this.dispatch(payload ?? ''));
    client.on('error', () => this.lost(client));
    client.on('end', () => this.lost(client));
    await client.connect();
    await client.query(`LISTEN ${PLAN_CHANNEL}`);
    this.client = client;
  }

  private lost(client: pg.Client): void {
    if (this.client !== client) return;
    this.client = null;
    this.logger.warn('lost the connection that hears of plan versions');
    this.connectAgain();
  }

  private connectAgain(): void {
    this.connecting = null;
    if (this.stopped || this.retry) return;
    this.retry = setTimeout(() => {
      this.retry = null;
      this.connected()
        .then(() => {
          for (const set of this.followers.values()) for (const heard of set) heard(null);
        })
        .catch(() => undefined);
    }, RECONNECT_MILLISECONDS);
    this.retry.unref();
  }

  private dispatch(payload: string): void {
    const { companyId, jobId, version } = JSON.parse(payload) as PlanKey & { version: number };
    for (const heard of this.followers.get(nameOf({ companyId, jobId })) ?? []) heard(version);
  }

  async onApplicationShutdown(): Promise<void> {
    this.stopped = true;
    if (this.retry) clearTimeout(this.retry);
    const { client } = this;
    this.client = null;
    await client?.end();
  }
}

const nameOf = ({ companyId, jobId }: PlanKey) => `${companyId}/${jobId}`;
