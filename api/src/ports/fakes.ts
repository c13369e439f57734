import { z } from 'zod';
import { startMailCatcher } from './mail/catcher.js';
import { startFakeCardService } from './payments/fake-card-service.js';
import { startFakeS3 } from './storage/fake-s3.js';

/** Runs the local stand-ins for object storage, mail and the card service until told to stop. */
const port = z.coerce.number().int().min(0).max(65_535);
const text = z.string().min(1);
const settings = z
  .object({
    FAKE_S3_PORT: port,
    FAKE_S3_DIR: text,
    FAKE_SMTP_PORT: port,
    FAKE_MAIL_HTTP_PORT: port,
    FAKE_MAIL_DIR: text,
    S3_BUCKET: text,
    S3_ACCESS_KEY_ID: text,
    S3_SECRET_ACCESS_KEY: text,
    FAKE_CARDS_PORT: port,
    FAKE_CARDS_FILE: text,
    FAKE_CARDS_WEBHOOK_URL: z.url(),
    STRIPE_SECRET_KEY: text,
    STRIPE_WEBHOOK_SECRET: text,
  })
  .safeParse(process.env);
if (!settings.success) {
  const lines = settings.error.issues.map((issue) => `  ${issue.path.join('.')}: ${issue.message}`);
  console.error(`The local services can't start; these settings need attention:\n${lines.join('\n')}`);
  process.exit(1);
}

const env = settings.data;
const running = await Promise.all([
  startFakeS3({
    port: env.FAKE_S3_PORT,
    dir: env.FAKE_S3_DIR,
    bucket: env.S3_BUCKET,
    accessKeyId: env.S3_ACCESS_KEY_ID,
    secretAccessKey: env.S3_SECRET_ACCESS_KEY,
  }),
  startMailCatcher({
    smtpPort: env.FAKE_SMTP_PORT,
    httpPort: env.FAKE_MAIL_HTTP_PORT,
    dir: env.FAKE_MAIL_DIR,
  }),
  startFakeCardService({
    port: env.FAKE_CARDS_PORT,
    file: env.FAKE_CARDS_FILE,
    secretKey: env.STRIPE_SECRET_KEY,
    webhookSecret: env.STRIPE_WEBHOOK_SECRET,
    webhookUrl: env.FAKE_CARDS_WEBHOOK_URL,
  }),
]);
console.log('Local storage, mail and card service are listening on loopback.');

let stopping = false;
const stop = async () => {
  if (stopping) return;
  stopping = true;
  await Promise.all(running.map((fake) => fake.close()));
  process.exit(0);
};
process.on('SIGTERM', stop);
process.on('SIGINT', stop);
