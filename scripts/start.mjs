// npm start: the whole product on this machine, over one data folder.
import { build } from './lib/build.mjs';
import { claimDataFolder, requirePort } from './lib/data-folder.mjs';
import { ensurePackages } from './lib/debian.mjs';
import { main, report, say, Trouble } from './lib/log.mjs';
import { ensureNodeModules } from './lib/node-modules.mjs';
import { dataFolder } from './lib/paths.mjs';
import { readPort } from './lib/ports.mjs';
import { startProduct } from './lib/product.mjs';
import { aborted, Supervisor, stopSignal } from './lib/supervisor.mjs';

await main(async () => {
  refuseProduction();
  const port = readPort();
  const folder = dataFolder();
  const signal = stopSignal();
  const supervisor = new Supervisor();
  let code = 0;
  try {
    claimDataFolder(folder, supervisor, 'npm start');
    await requirePort(port);
    await ensurePackages(['postgresql', 'poppler-utils'], signal);
    await ensureNodeModules(signal);
    await build({ signal });
    const { url } = await startProduct({ folder, port, supervisor, signal });
    say(`Lampwright is ready at ${url}`);
    await Promise.race([aborted(signal), supervisor.failed]);
  } catch (error) {
    if (!signal.aborted) {
      report(error);
      code = 1;
    }
  }
  await supervisor.stop();
  return code;
});

function refuseProduction() {
  if (process.env.LAMPWRIGHT_MODE !== 'production') return;
  throw new Trouble(
    '"npm start" runs Lampwright locally with a database and fakes of its own; in production run "node api/dist/main.js" and "node api/dist/worker.js" with the settings of .env.example.',
  );
}
