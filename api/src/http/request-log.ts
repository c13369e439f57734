import { randomUUID } from 'node:crypto';
import type { RequestHandler } from 'express';
import type { Logger } from 'pino';
import { pinoHttp } from 'pino-http';

/** A homeowner's link: whoever reads the log could open the page by it. */
const LINK = /^\/+p\/.*/is;

/** What is logged of an address: its path, without query and without secrets. */
export const loggedPath = (url: string): string => (url.split('?')[0] ?? '').replace(LINK, '/p/…');

/** Gives each request an id (also in the answer) and logs one line for it: path without its query. */
export function requestLog(logger: Logger): RequestHandler {
  return pinoHttp({
    logger,
    genReqId: (_request, response) => {
      const id = randomUUID();
      response.setHeader('X-Request-Id', id);
      return id;
    },
    autoLogging: { ignore: (request) => request.url?.startsWith('/assets/') ?? false },
    customLogLevel: (_request, response, error) =>
      error || response.statusCode >= 500 ? 'error' : response.statusCode >= 400 ? 'warn' : 'info',
    serializers: {
      req: (request: { id: string; method: string; url: string }) => ({
        id: request.id,
        method: request.method,
        path: loggedPath(request.url),
      }),
      res: (response: { statusCode: number }) => ({ status: response.statusCode }),
      err: (error: { type?: string }) => ({ type: error.type }),
    },
  });
}
