import { AsyncLocalStorage } from 'node:async_hooks';

/** Something that the person at the terminal can put right; its message is one sentence and needs no stack. */
export class Trouble extends Error {}

/** @typedef {'stdout' | 'stderr'} Stream */

/** Words that wait for their turn. */
class Kept {
  /** @type {{ stream: Stream, text: string }[]} */
  #words = [];
  #isTheirTurn = false;

  /** @param {Stream} stream @param {string} text */
  put(stream, text) {
    if (this.#isTheirTurn) process[stream].write(text);
    else this.#words.push({ stream, text });
  }

  release() {
    this.#isTheirTurn = true;
    for (const { stream, text } of this.#words.splice(0)) process[stream].write(text);
  }
}

/** @type {AsyncLocalStorage<Kept>} */
const keeping = new AsyncLocalStorage();

/**
 * Where output from elsewhere goes, such as a child's, that arrives after this was asked.
 * @returns {((stream: Stream, text: string) => void) | null} null when it may go to the terminal as it comes
 */
export function keeper() {
  const kept = keeping.getStore();
  return kept ? (stream, text) => kept.put(stream, text) : null;
}

/**
 * Does something beside others that speak at once: what it says before `othersAreDone` comes in one piece
 * after them, and from then on as it is said.
 * @template T
 * @param {Promise<unknown>} othersAreDone
 * @param {() => Promise<T>} body
 * @returns {Promise<T>} settled when both are done
 */
export async function afterOthers(othersAreDone, body) {
  const kept = new Kept();
  const turn = othersAreDone.then(
    () => kept.release(),
    () => kept.release(),
  );
  try {
    return await keeping.run(kept, body);
  } finally {
    await turn;
  }
}

/** @param {Stream} stream @param {string} line */
function put(stream, line) {
  const kept = keeping.getStore();
  if (kept) kept.put(stream, `${line}\n`);
  else process[stream].write(`${line}\n`);
}

/** @param {string} line */
export const say = (line) => put('stdout', line);

/** @param {string} line */
export const warn = (line) => put('stderr', line);

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
