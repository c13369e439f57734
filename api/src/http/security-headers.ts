import type { RequestHandler } from 'express';
import helmet from 'helmet';
import { type Env, isLocal } from '../config/env.js';

export function securityHeaders(env: Env): RequestHandler {
  return helmet({
    contentSecurityPolicy: {
      directives: {
        defaultSrc: ["'self'"],
        scriptSrc: ["'self'", "'wasm-unsafe-eval'"],
        // Component libraries position with style attributes.
        styleSrc: ["'self'", "'unsafe-inline'"],
        imgSrc: ["'self'", 'data:', 'blob:'],
        fontSrc: ["'self'", 'data:'],
        connectSrc: ["'self'"],
        workerSrc: ["'self'", 'blob:'],
        objectSrc: ["'none'"],
        baseUri: ["'self'"],
        frameAncestors: ["'none'"],
        formAction: ["'self'"],
        // Over http on loopback it would turn every request into https.
        upgradeInsecureRequests: isLocal(env) ? null : [],
      },
    },
    referrerPolicy: { policy: 'no-referrer' },
    strictTransportSecurity: isLocal(env) ? false : { maxAge: 31_536_000 },
  });
}
