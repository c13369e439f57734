import { type BeforeApplicationShutdown, Inject, Injectable } from '@nestjs/common';
import type { Request, Response } from 'express';
import { PlanListener } from './plan-listener.js';
import type { PlanKey } from './plans.repository.js';

/** Below the half minute after which proxies drop a silent connection. */
const KEEP_ALIVE_MILLISECONDS = 20_000;
/** Then the browser connects again, and is asked again who it is. */
const LONGEST_STREAM_MILLISECONDS = 10 * 60_000;
const RECONNECT_MILLISECONDS = 2000;

/** Streams the versions of a plan to those who have it open. */
@Injectable()
export class PlanEvents implements BeforeApplicationShutdown {
  private readonly open = new Set<() => void>();
  private stopping = false;

  constructor(@Inject(PlanListener) private readonly listener: PlanListener) {}

  /** Answers the request with a stream; `present` tells the version, and throws for who may not see it. */
  async stream(
    key: PlanKey,
    present: () => Promise<number>,
    request: Request,
    response: Response,
  ): Promise<void> {
    const first = await present();
    if (this.stopping || request.destroyed) {
      response.end();
      return;
    }
    response.writeHead(200, {
      'Content-Type': 'text/event-stream',
      'Cache-Control': 'no-store',
      // Proxies that buffer would hold events back.
      'X-Accel-Buffering': 'no',
      Connection: 'keep-alive',
    });
    response.write(`retry: ${RECONNECT_MILLISECONDS}\n\n`);
    let newest = -1;
    const tell = (version: number) => {
      if (version <= newest) return;
      newest = version;
      response.write(`data: ${JSON.stringify({ version })}\n\n`);
    };
    let unfollow: (() => void) | null = null;
    const keepAlive = setInterval(() => response.write(': still here\n\n'), KEEP_ALIVE_MILLISECONDS);
    const end = setTimeout(() => close(), LONGEST_STREAM_MILLISECONDS);
    const close = () => {
      if (!this.open.delete(close)) return;
      clearInterval(keepAlive);
      clearTimeout(end);
      unfollow?.();
      response.end();
    };
    const look = () => {
      present().then(tell, close);
    };
    this.open.add(close);
    request.on('close', close);
    response.on('error', close);
    tell(first);
    unfollow = await this.listener.follow(key, (version) => (version === null ? look() : tell(version)));
    if (!this.open.has(close)) unfollow();
    // What was saved between the first look and the listening would else be missed.
    else look();
  }

  /** Streams never end by themselves: the server could not close with one open. */
  beforeApplicationShutdown(): void {
    this.stopping = true;
    for (const close of [...this.open]) close();
  }
}
