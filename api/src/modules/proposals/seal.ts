import { createCipheriv, createDecipheriv, hkdfSync, randomBytes } from 'node:crypto';
import { Inject, Injectable } from '@nestjs/common';
import { ENV } from '../../config/config.module.js';
import type { Env } from '../../config/env.js';

const CIPHER = 'aes-256-gcm';
const NONCE_BYTES = 12;
const TAG_BYTES = 16;

/**
 * Keeps the tokens of links readable for reminders, but not for whoever gets hold of the database: sealed
 * with a key made of the application's secret (AES-256-GCM; HKDF, RFC 5869), each bound to its link.
 */
@Injectable()
export class Seal {
  private readonly key: Buffer;

  constructor(@Inject(ENV) env: Env) {
    this.key = Buffer.from(hkdfSync('sha256', env.SESSION_SECRET, '', 'lampwright proposal links', 32));
  }

  close(text: string, boundTo: string): string {
    const nonce = randomBytes(NONCE_BYTES);
    const cipher = createCipheriv(CIPHER, this.key, nonce);
    cipher.setAAD(Buffer.from(boundTo));
    const sealed = Buffer.concat([cipher.update(text, 'utf8'), cipher.final()]);
    return Buffer.concat([nonce, cipher.getAuthTag(), sealed]).toString('base64url');
  }

  /** @throws Error for what was sealed with another secret, for something else, or changed since */
  open(sealed: string, boundTo: string): string {
    const bytes = Buffer.from(sealed, 'base64url');
    const decipher = createDecipheriv(CIPHER, this.key, bytes.subarray(0, NONCE_BYTES));
    decipher.setAAD(Buffer.from(boundTo));
    decipher.setAuthTag(bytes.subarray(NONCE_BYTES, NONCE_BYTES + TAG_BYTES));
    return (
      decipher.update(bytes.subarray(NONCE_BYTES + TAG_BYTES), undefined, 'utf8') + decipher.final('utf8')
    );
  }
}
