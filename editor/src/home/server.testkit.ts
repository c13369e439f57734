import { vi } from 'vitest';
import { sampleNight } from './night/night.testkit';
import type { SharedPage } from './share';

export interface Sent {
  readonly path: string;
  readonly body: unknown;
  readonly key: string | null;
}

type Answer = { readonly status?: number; readonly body?: unknown } | 'no-network';

/** A server of one page: what it has is what it answers, and what it was sent is written down. */
export function fakeServer(page: SharedPage) {
  const posts: Sent[] = [];
  const answers = new Map<string, Answer[]>();
  const server = {
    page,
    night: sampleNight(),
    posts,
    /** Addresses that were asked for. */
    gets: [] as string[],
    /** What the page itself is answered with in place of it, once. */
    pageAnswers: [] as Answer[],
    /** The same of its night. */
    nightAnswers: [] as Answer[],
    /** The next answer to a POST whose path ends so. */
    willAnswer(path: string, ...next: Answer[]) {
      answers.set(path, [...(answers.get(path) ?? []), ...next]);
    },
  };
  const respond = (answer: Answer): Response => {
    if (answer === 'no-network') throw new TypeError('Failed to fetch');
    const { status = 200, body = null } = answer;
    return new Response(status === 204 ? null : JSON.stringify(body), { status });
  };
  vi.stubGlobal(
    'fetch',
    vi.fn(async (address: string, init: RequestInit = {}) => {
      if (init.method !== 'POST') {
        server.gets.push(address);
        return address.endsWith('/night')
          ? respond(server.nightAnswers.shift() ?? { body: server.night })
          : respond(server.pageAnswers.shift() ?? { body: server.page });
      }
      const path = address.split('/').slice(4).join('/');
      const body: unknown = typeof init.body === 'string' ? JSON.parse(init.body) : null;
      posts.push({ path, body, key: new Headers(init.headers).get('Idempotency-Key') });
      for (const [end, list] of answers) {
        const next = path.endsWith(end) ? list.shift() : undefined;
        if (next) return respond(next);
      }
      throw new Error(`Nothing was said about POST ${path}.`);
    }),
  );
  return server;
}
