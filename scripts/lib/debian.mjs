import { existsSync, mkdirSync, rmSync, writeFileSync } from 'node:fs';
import { setTimeout as sleep } from 'node:timers/promises';
import { say, Trouble } from './log.mjs';
import { findInstallations } from './postgres-programs.mjs';
import { run } from './processes.mjs';

/**
 * What the commands need from Debian: the package, and how to see that it is there.
 * @type {Record<string, { isThere: () => boolean, purpose: string }>}
 */
const packages = {
  postgresql: { isThere: () => findInstallations().length > 0, purpose: 'the database' },
  'poppler-utils': {
    isThere: () => existsSync('/usr/bin/pdftoppm') && existsSync('/usr/bin/pdfinfo'),
    purpose: 'reading PDF plans',
  },
  chromium: { isThere: () => existsSync('/usr/bin/chromium'), purpose: 'the end-to-end tests' },
  ngspice: { isThere: () => existsSync('/usr/bin/ngspice'), purpose: 'checking the solver' },
};

/** @typedef {'postgresql' | 'poppler-utils' | 'chromium' | 'ngspice'} DebianPackage */

/** @param {readonly DebianPackage[]} wanted */
export const missingPackages = (wanted) => wanted.filter((name) => !packages[name]?.isThere());

/**
 * Installs the packages that are missing.
 * @param {readonly DebianPackage[]} wanted
 * @param {AbortSignal} [signal]
 * @throws {Trouble} when they are missing and can't be installed
 */
export async function ensurePackages(wanted, signal) {
  const missing = missingPackages(wanted);
  if (missing.length === 0) return;
  const names = missing.join(' ');
  if (process.getuid?.() !== 0 || !existsSync('/usr/bin/apt-get')) throw cannotInstall(missing);
  say(`Installing ${names} from Debian's packages …`);
  const keepClusters = missing.includes('postgresql') ? declineMainCluster() : () => {};
  try {
    await apt(['update'], signal);
    await apt(['install', '--yes', '--no-install-recommends', ...missing], signal);
  } finally {
    keepClusters();
  }
  const still = missingPackages(wanted);
  if (still.length > 0)
    throw new Trouble(`apt-get installed ${names}, yet ${still.join(' ')} can't be found.`);
}

/**
 * What to tell a person without the right to install packages.
 * @param {readonly DebianPackage[]} missing
 */
export function cannotInstall(missing) {
  const names = missing.join(' ');
  const purposes = missing.map((name) => packages[name]?.purpose).join(' and ');
  return new Trouble(
    `Lampwright needs ${names} for ${purposes}: run "apt-get install ${names}" as root, then try again.`,
  );
}

/**
 * Keeps the postgresql package from making and starting a system-wide cluster during its installation.
 * @returns {() => void} takes the setting away again
 */
function declineMainCluster() {
  const folder = '/etc/postgresql-common/createcluster.d';
  const file = `${folder}/lampwright.conf`;
  mkdirSync(folder, { recursive: true });
  writeFileSync(file, 'create_main_cluster = false\n');
  return () => rmSync(file, { force: true });
}

/**
 * Waits for another apt at work: dpkg's lock by apt's own option, the lists' lock by asking again.
 * @param {readonly string[]} args
 * @param {AbortSignal} [signal]
 */
async function apt(args, signal) {
  const env = { ...process.env, DEBIAN_FRONTEND: 'noninteractive', LC_ALL: 'C' };
  for (let attempt = 1; ; attempt += 1) {
    const result = await run('apt-get', ['-q', '-o', 'DPkg::Lock::Timeout=300', ...args], { env, signal });
    if (result.code === 0) return;
    if (attempt < 150 && /Could not get lock|Unable to lock/.test(result.stderr)) {
      await sleep(2000, undefined, { signal });
      continue;
    }
    throw new Trouble(`apt-get ${args.join(' ')} failed:\n${result.stderr.trim() || result.stdout.trim()}`);
  }
}
