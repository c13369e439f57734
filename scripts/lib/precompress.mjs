import { readFileSync, statSync, writeFileSync } from 'node:fs';
import { promisify } from 'node:util';
import { brotliCompress, constants, gzip } from 'node:zlib';
import { listFiles } from './files.mjs';

/** Text. Pictures and fonts are compressed already. */
const TEXT = /\.(js|css|svg|html)$/;
/** Smaller files fit in the first packets anyway. */
const LEAST_BYTES = 1024;

const brotli = promisify(brotliCompress);
const gzipped = promisify(gzip);

/**
 * Lays compressed copies, `<file>.br` and `<file>.gz`, beside the text files of a built folder: made once at
 * leisure, they are smaller than what a server can make while somebody waits.
 * @param {string} folder
 * @returns {Promise<number>} how many files have copies
 */
export async function precompress(folder) {
  const files = listFiles([folder]).filter((file) => TEXT.test(file) && statSync(file).size > LEAST_BYTES);
  await Promise.all(
    files.map(async (file) => {
      const content = readFileSync(file);
      const [br, gz] = await Promise.all([
        brotli(content, {
          params: {
            [constants.BROTLI_PARAM_QUALITY]: constants.BROTLI_MAX_QUALITY,
            [constants.BROTLI_PARAM_SIZE_HINT]: content.length,
          },
        }),
        gzipped(content, { level: constants.Z_BEST_COMPRESSION }),
      ]);
      writeFileSync(`${file}.br`, br);
      writeFileSync(`${file}.gz`, gz);
    }),
  );
  return files.length;
}
