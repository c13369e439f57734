// npm run build: builds what changed.
import { build } from './lib/build.mjs';
import { main, say } from './lib/log.mjs';
import { ensureNodeModules } from './lib/node-modules.mjs';

await main(async () => {
  await ensureNodeModules();
  const built = await build();
  if (built.length === 0) say('Everything is built already.');
});
