import { createServer, type Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import { simpleParser } from 'mailparser';
import { SMTPServer } from 'smtp-server';
import { CaughtMailStore } from './caught-mail-store.js';

const LOOPBACK = '127.0.0.1';
const MOST_BYTES = 40 * 1024 * 1024;

export interface MailCatcherOptions {
  /** 0 takes a free one. */
  readonly smtpPort: number;
  readonly httpPort: number;
  /** Where the messages are kept. */
  readonly dir: string;
}

export interface MailCatcher {
  readonly smtpUrl: string;
  /** Lists the messages as JSON at /messages, one at /messages/:id, its files at /messages/:id/attachments/:index. */
  readonly httpUrl: string;
  close(): Promise<void>;
}

/** A mail server on loopback that delivers nothing: it takes every message and shows it. */
export async function startMailCatcher(options: MailCatcherOptions): Promise<MailCatcher> {
  const store = await CaughtMailStore.open(options.dir);
  const smtp = smtpServer(store);
  const http = listing(store);
  // Either may fail to listen; what the other took is given back then.
  try {
    await listen(smtp.server, options.smtpPort);
    await listen(http, options.httpPort);
  } catch (error) {
    await Promise.all([close(smtp.server), close(http)]);
    throw error;
  }
  return {
    smtpUrl: `smtp://${LOOPBACK}:${portOf(smtp.server)}`,
    httpUrl: `http://${LOOPBACK}:${portOf(http)}`,
    async close() {
      http.closeAllConnections();
      await Promise.all([new Promise<void>((resolve) => smtp.close(resolve)), close(http)]);
    },
  };
}

function smtpServer(store: CaughtMailStore): SMTPServer {
  const server = new SMTPServer({
    banner: 'Lampwright local mail catcher',
    authOptional: true,
    // Nothing leaves the machine, so there is nothing to encrypt.
    disabledCommands: ['STARTTLS', 'AUTH'],
    disableReverseLookup: true,
    size: MOST_BYTES,
    onData(stream, session, done) {
      simpleParser(stream)
        .then(async (parsed) => {
          if (stream.sizeExceeded) throw new Error('The message is too large.');
          await store.add(
            parsed,
            session.envelope.rcptTo.map(({ address }) => address),
          );
        })
        .then(
          () => done(),
          (error: unknown) => done(error instanceof Error ? error : new Error(String(error))),
        );
    },
  });
  // A client that breaks off is no reason to stop.
  server.on('error', () => undefined);
  return server;
}

function listing(store: CaughtMailStore): Server {
  return createServer(async (request, response) => {
    const { pathname } = new URL(request.url ?? '/', `http://${LOOPBACK}`);
    const file = /^\/messages\/([\w-]+)\/attachments\/(\d{1,4})$/.exec(pathname);
    const attachment = file && (await store.attachment(file[1]!, Number(file[2])).catch(() => undefined));
    if (attachment) {
      response
        .writeHead(200, { 'Content-Type': attachment.type, 'Cache-Control': 'no-store' })
        .end(attachment.body);
      return;
    }
    const id = /^\/messages\/([\w-]+)$/.exec(pathname)?.[1];
    const found = pathname === '/messages' ? { items: store.list() } : id && store.get(id);
    response
      .writeHead(found ? 200 : 404, { 'Content-Type': 'application/json', 'Cache-Control': 'no-store' })
      .end(JSON.stringify(found || { detail: 'There is no such message.' }));
  });
}

interface Listening {
  listen(port: number, host: string): unknown;
  once(event: 'listening' | 'error', handler: (error?: Error) => void): unknown;
  close(done: () => void): unknown;
  address(): AddressInfo | string | null;
}

const listen = (server: Listening, port: number) =>
  new Promise<void>((resolve, reject) => {
    server.once('listening', () => resolve());
    server.once('error', (error) => reject(error));
    server.listen(port, LOOPBACK);
  });

const close = (server: Listening) => new Promise<void>((resolve) => server.close(() => resolve()));

const portOf = (server: Listening): number => (server.address() as AddressInfo).port;
