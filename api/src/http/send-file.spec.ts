import { Readable } from 'node:stream';
import express from 'express';
import helmet from 'helmet';
import request from 'supertest';
import { expect, it } from 'vitest';
import { sendFile } from './send-file.js';

const app = express();
app.use(helmet());
const serve = (path: string, type: string) =>
  app.get(path, (asked, answer) =>
    sendFile(
      {
        etag: '"tag"',
        open: async () => ({ stream: Readable.from([Buffer.from('bytes')]), length: 5, type }),
      },
      asked,
      answer,
    ),
  );
serve('/picture', 'image/jpeg');
serve('/drawing', 'image/svg+xml');
serve('/paper', 'application/pdf');

it('locks files up in a sandbox, but for papers, whose viewer does not open in one', async () => {
  for (const [path, policy] of [
    ['/picture', "default-src 'none'; sandbox"],
    ['/drawing', "default-src 'none'; sandbox"],
    ['/paper', "default-src 'none'"],
  ] as const) {
    const { headers } = await request(app).get(path).expect(200);
    expect(headers).toMatchObject({
      'content-security-policy': policy,
      'x-content-type-options': 'nosniff',
      'cache-control': 'private, no-cache',
      vary: 'Cookie',
    });
    // The browser goes on with the policy that came with the file.
    const { headers: unchanged } = await request(app).get(path).set('If-None-Match', '"tag"').expect(304);
    expect(unchanged['content-security-policy']).toBeUndefined();
  }
});
