import { createHash, randomBytes } from 'node:crypto';

const TOKEN_BYTES = 32;

/** A link's secret, and the hash of it that is kept. */
export interface OneTimeToken {
  readonly token: string;
  readonly tokenHash: string;
}

export const hashToken = (token: string): string => createHash('sha256').update(token).digest('hex');

export function newToken(): OneTimeToken {
  const token = randomBytes(TOKEN_BYTES).toString('base64url');
  return { token, tokenHash: hashToken(token) };
}
