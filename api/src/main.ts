import { createApp } from './app.js';
import { EnvError, parseEnv } from './config/env.js';

try {
  const env = parseEnv(process.env);
  const app = await createApp(env);
  await app.listen(env.PORT, env.HOST);
} catch (error) {
  console.error(error instanceof EnvError ? error.message : error);
  process.exit(1);
}
