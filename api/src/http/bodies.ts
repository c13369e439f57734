import express, { type RequestHandler } from 'express';
import { AppError } from './app-error.js';

const SMALL = '256kb';
/** Estimates, saves of a large plan, and tables of catalogue items. */
const LARGE = '8mb';
const LARGE_PATHS = [
  /^\/api\/estimates\/?$/,
  /^\/api\/jobs\/[^/]+\/plan\/changes\/?$/,
  /^\/api\/catalogue\/imports(\/preview)?\/?$/,
];

const receivedAt = new WeakMap<object, number>();
const parsedIn = new WeakMap<object, number>();

/** Called with the raw body, just before it is parsed. */
const verify = (request: object) => {
  receivedAt.set(request, performance.now());
};

const small = express.json({ limit: SMALL, verify });
const large = express.json({ limit: LARGE, verify });

/** Signed over their very bytes: left as they came. */
const SIGNED_PATH = /^\/api\/webhooks\/[^/]+\/?$/;
const signed = express.raw({ limit: SMALL, type: () => true, inflate: false });

/** How long a request's JSON took to parse, without the wait for its bytes; 0 where there was none. */
export const jsonParseMilliseconds = (request: object): number => parsedIn.get(request) ?? 0;

/** The body parser's errors carry a `type`. */
function bodyError(error: unknown): AppError {
  const type = typeof error === 'object' && error !== null && 'type' in error ? error.type : '';
  switch (type) {
    case 'entity.too.large':
      return new AppError(413, 'too-large', 'The request is larger than this address accepts.');
    case 'encoding.unsupported':
    case 'charset.unsupported':
      return new AppError(415, 'wrong-encoding', 'The body must be JSON in UTF-8.');
    case 'request.aborted':
    case 'request.size.invalid':
      return new AppError(400, 'aborted', 'The request was cut off.');
    default:
      return new AppError(400, 'not-json', 'The body could not be read as JSON.');
  }
}

function parserOf(path: string): RequestHandler {
  if (SIGNED_PATH.test(path)) return signed;
  return LARGE_PATHS.some((large) => large.test(path)) ? large : small;
}

/** JSON bodies with a limit chosen by address; other kinds of body are left to the route (uploads). */
export const jsonBodies: RequestHandler = (request, response, next) => {
  parserOf(request.path)(request, response, (error?: unknown) => {
    const received = receivedAt.get(request);
    if (received !== undefined) parsedIn.set(request, performance.now() - received);
    next(error === undefined ? undefined : bodyError(error));
  });
};
