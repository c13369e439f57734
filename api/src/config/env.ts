import { z } from 'zod';

const port = z.coerce.number().int().min(1).max(65_535);
const text = z.string().min(1);

const common = {
  HOST: text.default('127.0.0.1'),
  PORT: port.default(3000),
  /** Where people reach the product: links in mail start with it. */
  PUBLIC_URL: z.url(),
  DATABASE_URL: z.string().regex(/^postgres(ql)?:\/\//, { error: 'must be a postgres:// address' }),
  /** Signs the session cookie. */
  SESSION_SECRET: z.string().min(32, { error: 'must have at least 32 characters' }),
  S3_ENDPOINT: z.url().optional(),
  S3_REGION: text.default('us-east-1'),
  S3_BUCKET: text,
  S3_ACCESS_KEY_ID: text,
  S3_SECRET_ACCESS_KEY: text,
  SMTP_URL: z.string().regex(/^smtps?:\/\//, { error: 'must be an smtp:// or smtps:// address' }),
  MAIL_FROM: text,
  /** The card service. Without its keys homeowners are not offered to pay by card. */
  STRIPE_SECRET_KEY: text.optional(),
  /** Signs what the card service reports. */
  STRIPE_WEBHOOK_SECRET: text.optional(),
  /** Another address than the service's own: that of the local stand-in. */
  STRIPE_API_BASE: z.url().optional(),
  /** How many proxies stand in front: 0 when reached directly. */
  TRUST_PROXY_HOPS: z.coerce.number().int().min(0).max(10).default(0),
  LOG_LEVEL: z.enum(['fatal', 'error', 'warn', 'info', 'debug', 'silent']).default('info'),
};

const modes = z.discriminatedUnion('LAMPWRIGHT_MODE', [
  z.object({
    LAMPWRIGHT_MODE: z.literal('local'),
    ...common,
    /** The local mail catcher, shown at /dev/mail. */
    MAIL_VIEWER_URL: z.url().optional(),
    /** The folder of another build of the editor; tests serve one of their own. */
    EDITOR_FILES: text.optional(),
  }),
  z.object({
    LAMPWRIGHT_MODE: z.literal('production'),
    ...common,
    PUBLIC_URL: z.url({ protocol: /^https$/, error: 'must be an https:// address' }),
  }),
]);

const envSchema = modes.superRefine((env, ctx) => {
  const keys = ['STRIPE_SECRET_KEY', 'STRIPE_WEBHOOK_SECRET'] as const;
  const given = keys.filter((key) => env[key] !== undefined);
  if (given.length !== 1) return;
  for (const key of keys)
    if (env[key] === undefined)
      ctx.addIssue({ code: 'custom', path: [key], message: `is missing, and ${given[0]} is there` });
});

export type Env = z.infer<typeof envSchema>;

export class EnvError extends Error {}

/**
 * Reads the settings from the environment, once.
 * @throws EnvError naming every setting that is missing or wrong.
 */
export function parseEnv(source: NodeJS.ProcessEnv): Env {
  const filled = Object.fromEntries(Object.entries(source).filter(([, value]) => value !== ''));
  const parsed = envSchema.safeParse(filled);
  if (parsed.success) return parsed.data;
  const lines = parsed.error.issues.map((issue) => {
    const key = issue.path.join('.');
    const missing = filled[key] === undefined;
    return `  ${key}: ${missing ? 'is missing' : issue.message}`;
  });
  throw new EnvError(`Lampwright can't start; these settings need attention:\n${lines.join('\n')}`);
}

export const isLocal = (env: Env): env is Extract<Env, { LAMPWRIGHT_MODE: 'local' }> =>
  env.LAMPWRIGHT_MODE === 'local';
