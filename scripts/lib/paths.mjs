import { createHash } from 'node:crypto';
import { resolve } from 'node:path';
import { fileURLToPath } from 'node:url';

/** The checkout, wherever the command was called from. */
export const root = fileURLToPath(new URL('../../', import.meta.url)).replace(/\/$/, '');

/** @param {string[]} parts relative to the checkout */
export const inRoot = (...parts) => resolve(root, ...parts);

/** The one folder that holds all local state: LAMPWRIGHT_DATA (relative to the checkout) or `.data`. */
export const dataFolder = () => inRoot(process.env.LAMPWRIGHT_DATA || '.data');

/**
 * A short stable name for a folder, for things that must live elsewhere on its behalf.
 * @param {string} folder
 */
export const folderHash = (folder) => createHash('sha256').update(folder).digest('hex').slice(0, 12);
