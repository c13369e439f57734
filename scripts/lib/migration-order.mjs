import { readFileSync } from 'node:fs';

/** @typedef {{ idx: number, when: number, tag: string }} JournalEntry */

/**
 * Drizzle skips a migration that is dated before the newest applied one, and says nothing.
 * @param {readonly JournalEntry[]} entries
 * @returns {string[]} what is wrong, a sentence each
 */
export function orderFaults(entries) {
  const faults = entries.length === 0 ? ['The journal names no migration.'] : [];
  entries.forEach((entry, place) => {
    const before = entries[place - 1];
    if (entry.idx !== place) faults.push(`${entry.tag} has number ${entry.idx} in place ${place}.`);
    if (before && entry.when <= before.when) {
      faults.push(`${entry.tag} is dated ${entry.when}, not after ${before.tag} (${before.when}).`);
    }
  });
  return faults;
}

/** @param {string} journal path of drizzle/meta/_journal.json */
export function journalFaults(journal) {
  return orderFaults(JSON.parse(readFileSync(journal, 'utf8')).entries);
}
