/** Something that the person at the terminal can put right; its message is one sentence and needs no stack. */
export class Trouble extends Error {}

/** @param {string} line */
export const say = (line) => process.stdout.write(`${line}\n`);

/** @param {string} line */
export const warn = (line) => process.stderr.write(`${line}\n`);

/** @param {unknown} error */
export function report(error) {
  if (error instanceof Trouble) warn(error.message);
  else warn(error instanceof Error ? (error.stack ?? error.message) : String(error));
}

/**
 * Runs a command's body; a failure is told and becomes exit code 1.
 * @param {() => Promise<number | undefined>} body gives the exit code, 0 when undefined
 */
export async function main(body) {
  try {
    process.exitCode = (await body()) ?? 0;
  } catch (error) {
    report(error);
    process.exitCode = 1;
  }
}

/** @param {number} startedAt from performance.now() */
export function since(startedAt) {
  const seconds = (performance.now() - startedAt) / 1000;
  return seconds < 10 ? `${seconds.toFixed(1)} s` : `${Math.round(seconds)} s`;
}
