// npm run restore FILE: replaces the database and files of the local data folder by those of a backup.
import { fileArgument } from './lib/backup.mjs';
import { ensurePackages } from './lib/debian.mjs';
import { main } from './lib/log.mjs';
import { dataFolder } from './lib/paths.mjs';
import { restoreBackup } from './lib/restore.mjs';
import { Supervisor } from './lib/supervisor.mjs';

await main(async () => {
  const file = fileArgument(
    process.argv[2],
    'Use: npm run restore FILE, with a file made by npm run backup.',
  );
  const supervisor = new Supervisor();
  try {
    await ensurePackages(['postgresql']);
    await restoreBackup(dataFolder(), file, supervisor);
  } finally {
    await supervisor.stop();
  }
  return 0;
});
