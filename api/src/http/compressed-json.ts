import compression from 'compression';
import type { Request, RequestHandler, Response } from 'express';

/** Smaller answers fit in the first packets anyway. */
const LEAST_BYTES = 1024;

const compress = compression({ threshold: LEAST_BYTES, filter: isPlainAnswer });

/**
 * Compresses JSON that our own pages have asked for: plans and proposals are large, and text.
 *
 * Whoever sees how long a compressed answer is can guess a secret in it, if they also choose a part of it and
 * can have it asked for again and again with its owner's cookie. So what another site may make a browser ask
 * for is never compressed: of requests with a cookie that is a link or a form, which say so in
 * `Sec-Fetch-Site`. A browser that does not send that header gets its answers as they are. Answers to actions
 * may hold an address that opens a door, such as that of a payment, and are left alone as well; no answer
 * to a GET holds one.
 */
export const compressedJson: RequestHandler = (request, response, next) => {
  const ours = request.get('sec-fetch-site') === 'same-origin';
  if (!ours || (request.method !== 'GET' && request.method !== 'HEAD')) next();
  else compress(request, response, next);
};

/** Not streams and files, which have types of their own, and nothing that sets a cookie. */
function isPlainAnswer(_request: Request, response: Response): boolean {
  const [type = ''] = String(response.getHeader('Content-Type') ?? '').split(';');
  return type === 'application/json' && !response.hasHeader('Set-Cookie');
}
