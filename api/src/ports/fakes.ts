import { z } from 'zod';
import { startMailCatcher } from './mail/catcher.js';
import { startFakeS3 } from './storage/fake-s3.js';

/** Runs the local stand-ins for object storage and mail until told to stop. */
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
  })
  .safeParse(process.env);
if (!settings.success) {
  const lines = settings.error.issues.map((issue) => `  ${issue.path.join('.')}: ${issue.message}`);
  console.error(
    `The local storage and mail can't start; these settings need attention:\n${lines.join('\n')}`,
  );
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
]);
console.log('Local storage and mail are listening on loopback.');

let stopping = false;
const stop = async () => {
  if (stopping) return;
  stopping = true;
  await Promise.all(running.map((fake) => fake.close()));
  process.exit(0);
};
process.on('SIGTERM', stop);
process.on('SIGINT', stop);
