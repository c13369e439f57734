// npm run backup FILE: the database and the stored files of the local data folder in one file.
import { statSync } from 'node:fs';
import { fileArgument, writeBackup } from './lib/backup.mjs';
import { main, say } from './lib/log.mjs';
import { dataFolder } from './lib/paths.mjs';
import { Supervisor } from './lib/supervisor.mjs';

await main(async () => {
  const file = fileArgument(process.argv[2], 'Use: npm run backup FILE, with the file to write.');
  const supervisor = new Supervisor();
  try {
    await writeBackup(dataFolder(), file, supervisor);
  } finally {
    await supervisor.stop();
  }
  say(`Wrote ${file} (${(statSync(file).size / 1e6).toFixed(1)} MB).`);
  return 0;
});
