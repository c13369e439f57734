import Stripe from 'stripe';
import type { FakeDelivery, FakeState } from './state.js';

const LOOK_EVERY_MILLISECONDS = 50;
const ANSWER_WITHIN_MILLISECONDS = 10_000;
const LONGEST_WAIT_MILLISECONDS = 60_000;

export interface CourierOptions {
  readonly webhookSecret: string;
  /** Before the second try; doubled with each further one. */
  readonly firstWaitMilliseconds: number;
}

/** Brings words to the product, again and again until it takes them. */
export class Courier {
  /** Where words go; null holds them back. */
  address: string | null = null;
  private readonly timer: NodeJS.Timeout;
  private readonly underWay = new Map<string, Promise<void>>();

  constructor(
    private readonly state: FakeState,
    private readonly options: CourierOptions,
    private readonly changed: () => Promise<void>,
    /** Called before each look, for what happens by time alone. */
    private readonly passTime: () => boolean,
  ) {
    this.timer = setInterval(() => this.look(), LOOK_EVERY_MILLISECONDS);
  }

  async close(): Promise<void> {
    clearInterval(this.timer);
    await Promise.all(this.underWay.values());
  }

  private look(): void {
    if (this.passTime()) void this.changed();
    const { address } = this;
    if (address === null) return;
    for (const delivery of this.state.deliveries) {
      if (delivery.dueAt > Date.now() || this.underWay.has(delivery.id)) continue;
      const bringing = this.bring(delivery, address).finally(() => this.underWay.delete(delivery.id));
      this.underWay.set(delivery.id, bringing);
    }
  }

  private async bring(delivery: FakeDelivery, address: string): Promise<void> {
    if (await this.taken(delivery.payload, address)) {
      this.state.deliveries = this.state.deliveries.filter(({ id }) => id !== delivery.id);
    } else {
      const wait = this.options.firstWaitMilliseconds * 2 ** delivery.tries;
      delivery.tries += 1;
      delivery.dueAt = Date.now() + Math.min(wait, LONGEST_WAIT_MILLISECONDS);
    }
    await this.changed();
  }

  private async taken(payload: string, address: string): Promise<boolean> {
    try {
      const answer = await fetch(address, {
        method: 'POST',
        headers: {
          'Content-Type': 'application/json; charset=utf-8',
          'Stripe-Signature': signatureOf(payload, this.options.webhookSecret),
        },
        body: payload,
        signal: AbortSignal.timeout(ANSWER_WITHIN_MILLISECONDS),
      });
      await answer.arrayBuffer();
      return answer.ok;
    } catch {
      return false;
    }
  }
}

export const signatureOf = (payload: string, secret: string): string =>
  Stripe.webhooks.generateTestHeaderString({ payload, secret });
