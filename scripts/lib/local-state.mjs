import { randomBytes } from 'node:crypto';
import { existsSync, mkdirSync, readFileSync, renameSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { freePort } from './ports.mjs';

/**
 * What local mode makes up once and remembers.
 * @typedef {object} LocalState
 * @property {string} sessionSecret
 * @property {string} storageKeyId
 * @property {string} storageSecret
 * @property {string} cardsSecretKey of the local card service
 * @property {string} cardsWebhookSecret signs what it reports
 * @property {{ storage: number, smtp: number, mailViewer: number, cards: number }} ports
 * @property {boolean} demoLoaded false until the demo company is in a new database
 */

/** @param {string} folder */
const fileOf = (folder) => join(folder, 'state.json');

/** @param {string} folder the data folder @param {LocalState} state */
export function writeState(folder, state) {
  const file = fileOf(folder);
  writeFileSync(`${file}.new`, `${JSON.stringify(state, null, 2)}\n`, { mode: 0o600 });
  renameSync(`${file}.new`, file);
}

/**
 * The state of a data folder, made up when it is new, with ports that are free now.
 * @param {string} folder
 * @returns {Promise<LocalState>}
 */
export async function readState(folder) {
  mkdirSync(folder, { recursive: true });
  /** @type {Partial<LocalState>} */
  const old = existsSync(fileOf(folder)) ? JSON.parse(readFileSync(fileOf(folder), 'utf8')) : {};
  /** @type {LocalState} */
  const state = {
    sessionSecret: old.sessionSecret ?? randomBytes(48).toString('base64url'),
    storageKeyId: old.storageKeyId ?? `local-${randomBytes(6).toString('hex')}`,
    storageSecret: old.storageSecret ?? randomBytes(24).toString('base64url'),
    cardsSecretKey: old.cardsSecretKey ?? `sk_test_${randomBytes(24).toString('hex')}`,
    cardsWebhookSecret: old.cardsWebhookSecret ?? `whsec_${randomBytes(24).toString('hex')}`,
    ports: {
      storage: await freePort(old.ports?.storage),
      smtp: await freePort(old.ports?.smtp),
      mailViewer: await freePort(old.ports?.mailViewer),
      cards: await freePort(old.ports?.cards),
    },
    demoLoaded: old.demoLoaded ?? false,
  };
  writeState(folder, state);
  return state;
}
