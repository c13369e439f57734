import { createHash } from 'node:crypto';
import { createServer, type IncomingMessage, type ServerResponse } from 'node:http';
import type { AddressInfo } from 'node:net';
import { buffer } from 'node:stream/consumers';
import { Bank, type RefundCourse, Refusal } from './fake/bank.js';
import { testCardOf } from './fake/cards.js';
import { Courier } from './fake/courier.js';
import { type FormTree, readForm, textAt } from './fake/form.js';
import { endPage, nothingHere, payPage } from './fake/page.js';
import { StateFile } from './fake/state.js';

const LOOPBACK = '127.0.0.1';
const LATE_MILLISECONDS = 5000;
const FIRST_WAIT_MILLISECONDS = 1000;
const ANSWERS_KEPT_MILLISECONDS = 24 * 3_600_000;

export interface FakeCardServiceOptions {
  /** 0 takes a free one. */
  readonly port: number;
  /** Where everything is kept. */
  readonly file: string;
  readonly secretKey: string;
  readonly webhookSecret: string;
  /** The product's address for words of this service; null until `deliverTo` names one. */
  readonly webhookUrl: string | null;
  /** How late words come that come late: 5 s. */
  readonly lateMilliseconds?: number;
  /** Before a word that was not taken is brought again: 1 s, doubled with each try. */
  readonly firstWaitMilliseconds?: number;
}

export interface FakeCardService {
  readonly apiBase: string;
  /** Null holds words back. */
  deliverTo(webhookUrl: string | null): void;
  /** Words that the product has not taken yet. */
  undelivered(): readonly { readonly payload: string; readonly tries: number }[];
  setNextRefund(course: RefundCourse): void;
  close(): Promise<void>;
}

interface Answer {
  readonly status: number;
  readonly body: object;
}

/**
 * A local stand-in for the card service on loopback: it takes what the SDK sends for checkouts and refunds,
 * shows a page to pay on, and brings signed words of what happened. No money moves.
 */
export async function startFakeCardService(options: FakeCardServiceOptions): Promise<FakeCardService> {
  const kept = await StateFile.open(options.file);
  let base = '';
  const bank = new Bank(kept.state, (id) => `${base}/pay/${id}`, {
    lateMilliseconds: options.lateMilliseconds ?? LATE_MILLISECONDS,
  });
  const courier = new Courier(
    kept.state,
    {
      webhookSecret: options.webhookSecret,
      firstWaitMilliseconds: options.firstWaitMilliseconds ?? FIRST_WAIT_MILLISECONDS,
    },
    () => kept.save(),
    () => bank.passTime(),
  );
  courier.address = options.webhookUrl;
  const counter = new Counter(options.secretKey, kept, bank);
  const server = createServer((request, response) => {
    counter.serve(request, response).catch(() => response.destroy());
  });
  await new Promise<void>((resolve, reject) => {
    server.once('error', reject);
    server.listen(options.port, LOOPBACK, resolve);
  });
  base = `http://${LOOPBACK}:${(server.address() as AddressInfo).port}`;
  return {
    apiBase: base,
    deliverTo: (address) => {
      courier.address = address;
    },
    undelivered: () => kept.state.deliveries,
    setNextRefund: (course) => {
      bank.nextRefund = course;
    },
    async close() {
      await courier.close();
      server.closeAllConnections();
      await new Promise((resolve) => server.close(resolve));
      await kept.save();
    },
  };
}

/** Answers the requests of the SDK and of the page. */
class Counter {
  constructor(
    private readonly secretKey: string,
    private readonly kept: StateFile,
    private readonly bank: Bank,
  ) {}

  async serve(request: IncomingMessage, response: ServerResponse): Promise<void> {
    const { pathname, search } = new URL(request.url ?? '/', `http://${LOOPBACK}`);
    const body = (await buffer(request)).toString('utf8');
    if (pathname.startsWith('/pay/'))
      await this.page(request, response, pathname.slice('/pay/'.length), body);
    else await this.call(request, response, pathname, readForm(search.slice(1)), body);
  }

  private async call(
    request: IncomingMessage,
    response: ServerResponse,
    path: string,
    query: FormTree,
    body: string,
  ): Promise<void> {
    if (request.headers.authorization !== `Bearer ${this.secretKey}`) {
      json(response, 401, errorBody(new Refusal(401, 'invalid_request_error', 'Invalid API Key provided.')));
      return;
    }
    const method = request.method ?? '';
    const key = request.headers['idempotency-key'];
    const act = () => this.act(method, path, query, readForm(body));
    const answer =
      method === 'POST' && typeof key === 'string'
        ? this.once(key, createHash('sha256').update(`${path}\n${body}`).digest('hex'), act)
        : act();
    await this.kept.save();
    json(response, answer.status, answer.body);
  }

  /** The same key gives the first answer again, refusals included; for another request it is an error. */
  private once(key: string, fingerprint: string, act: () => Answer): Answer {
    const { answers } = this.kept.state;
    for (const [old, { at }] of Object.entries(answers))
      if (at < Date.now() - ANSWERS_KEPT_MILLISECONDS) delete answers[old];
    const before = answers[key];
    if (before && before.fingerprint !== fingerprint)
      return refused(
        new Refusal(
          400,
          'idempotency_error',
          'Keys for idempotent requests can only be used with the same parameters they were first used with.',
        ),
      );
    if (before) return { status: before.status, body: before.body as object };
    const answer = act();
    answers[key] = { fingerprint, ...answer, at: Date.now() };
    return answer;
  }

  private act(method: string, path: string, query: FormTree, form: FormTree): Answer {
    try {
      return { status: 200, body: this.route(method, path, query, form) };
    } catch (error) {
      if (error instanceof Refusal) return refused(error);
      throw error;
    }
  }

  private route(method: string, path: string, query: FormTree, form: FormTree): object {
    const [, version, ...parts] = path.split('/');
    const [what, ...rest] = parts;
    const route = `${method} ${version} ${what}`;
    if (what === 'checkout' && rest[0] === 'sessions') {
      const [, id, verb] = rest;
      if (method === 'POST' && id === undefined) return this.bank.createSession(form);
      if (method === 'POST' && id !== undefined && verb === 'expire') return this.bank.expireSession(id);
      if (method === 'GET' && id !== undefined)
        return this.bank.readSession(id, textAt(query, 'expand', '0') === 'payment_intent');
    }
    const [id] = rest;
    if (route === 'POST v1 refunds' && id === undefined) return this.bank.createRefund(form);
    if (route === 'GET v1 refunds' && id !== undefined) return this.bank.readRefund(id);
    if (route === 'GET v1 payment_intents' && id !== undefined) return this.bank.readIntent(id);
    throw new Refusal(404, 'invalid_request_error', `Unrecognized request URL (${method}: ${path}).`);
  }

  private async page(
    request: IncomingMessage,
    response: ServerResponse,
    id: string,
    body: string,
  ): Promise<void> {
    const session = this.kept.state.sessions[id];
    if (!session) {
      html(response, 404, nothingHere());
      return;
    }
    // An old one ends when somebody looks.
    this.bank.session(id);
    const card = testCardOf(new URLSearchParams(body).get('card') ?? '');
    if (session.status !== 'open' || request.method !== 'POST' || card === null) {
      html(response, 200, session.status === 'open' ? payPage(session, false) : endPage(session));
      return;
    }
    const outcome = this.bank.pay(session, card);
    await this.kept.save();
    if (outcome === 'declined') html(response, 402, payPage(session, true));
    else
      response
        .writeHead(303, { Location: session.successUrl.replace('{CHECKOUT_SESSION_ID}', session.id) })
        .end();
  }
}

const errorBody = (refusal: Refusal) => ({
  error: {
    type: refusal.type,
    message: refusal.message,
    ...(refusal.code === undefined ? {} : { code: refusal.code }),
  },
});

const refused = (refusal: Refusal): Answer => ({ status: refusal.status, body: errorBody(refusal) });

function json(response: ServerResponse, status: number, body: object): void {
  response.writeHead(status, { 'Content-Type': 'application/json' }).end(JSON.stringify(body));
}

function html(response: ServerResponse, status: number, body: string): void {
  response
    .writeHead(status, {
      'Content-Type': 'text/html; charset=utf-8',
      'Cache-Control': 'no-store',
      'Content-Security-Policy': "default-src 'none'; style-src 'unsafe-inline'",
    })
    .end(body);
}
