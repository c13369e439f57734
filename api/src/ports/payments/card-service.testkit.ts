import { mkdtemp, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import type { TestCard } from './fake/cards.js';
import { type FakeCardService, startFakeCardService } from './fake-card-service.js';

export const CARD_KEYS = { secretKey: 'sk_test_of_specs', webhookSecret: 'whsec_of_specs' };

export interface TestCardService extends FakeCardService {
  /** For the product's environment. */
  readonly settings: Record<string, string>;
  /** Stops it and starts it again, over the same file and port. */
  restart(): Promise<void>;
}

/** The stand-in on a free port, quicker than people need it. */
export async function startTestCardService(lateMilliseconds = 300): Promise<TestCardService> {
  const folder = await mkdtemp(join(tmpdir(), 'lampwright-cards-'));
  let webhookUrl: string | null = null;
  const start = (port: number) =>
    startFakeCardService({
      port,
      file: join(folder, 'cards.json'),
      ...CARD_KEYS,
      webhookUrl,
      lateMilliseconds,
      firstWaitMilliseconds: 100,
    });
  let fake = await start(0);
  const { apiBase } = fake;
  return {
    apiBase,
    settings: {
      STRIPE_SECRET_KEY: CARD_KEYS.secretKey,
      STRIPE_WEBHOOK_SECRET: CARD_KEYS.webhookSecret,
      STRIPE_API_BASE: apiBase,
    },
    deliverTo: (address) => {
      webhookUrl = address;
      fake.deliverTo(address);
    },
    undelivered: () => fake.undelivered(),
    setNextRefund: (course) => fake.setNextRefund(course),
    async restart() {
      await fake.close();
      fake = await start(Number(new URL(apiBase).port));
    },
    async close() {
      await fake.close();
      await rm(folder, { recursive: true, force: true });
    },
  };
}

/** Presses the button of a card on a checkout's page. Gives the status, and where it leads. */
export async function payWith(url: string, card: TestCard): Promise<{ status: number; to: string | null }> {
  const answer = await fetch(url, {
    method: 'POST',
    body: new URLSearchParams({ card }),
    redirect: 'manual',
  });
  await answer.arrayBuffer();
  return { status: answer.status, to: answer.headers.get('location') };
}
