import { createHash } from 'node:crypto';
import { existsSync, readdirSync, readFileSync, statSync } from 'node:fs';
import { join, relative } from 'node:path';

/**
 * Every file under the paths (files or folders), sorted.
 * @param {readonly string[]} paths
 * @param {(path: string) => boolean} [keep] asked for files and folders
 * @returns {string[]}
 */
export function listFiles(paths, keep = () => true) {
  /** @type {string[]} */
  const files = [];
  /** @param {string} path */
  const visit = (path) => {
    if (!keep(path)) return;
    if (!statSync(path).isDirectory()) files.push(path);
    else for (const name of readdirSync(path)) visit(join(path, name));
  };
  for (const path of paths) if (existsSync(path)) visit(path);
  return files.sort();
}

/**
 * A hash of the files' names and contents.
 * @param {string} base names are taken relative to it
 * @param {readonly string[]} files
 */
export function hashFiles(base, files) {
  const hash = createHash('sha256');
  for (const file of files) {
    const content = readFileSync(file);
    hash.update(`${relative(base, file)}\0${content.length}\0`).update(content);
  }
  return hash.digest('hex');
}
