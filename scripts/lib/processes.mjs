import { spawn } from 'node:child_process';
import { readFileSync } from 'node:fs';
import { keeper } from './log.mjs';

/**
 * @typedef {object} RunOptions
 * @property {string} [cwd]
 * @property {NodeJS.ProcessEnv} [env]
 * @property {string} [input] written to its standard input
 * @property {'capture' | 'show' | 'ignore'} [output] capture (default), show in the terminal (in its turn), or neither
 * @property {AbortSignal} [signal] ends the process with SIGTERM
 *
 * @typedef {{ code: number, stdout: string, stderr: string }} RunResult code is 128 when a signal ended it
 */

/**
 * Runs a program to its end; a non-zero exit is a result, not an error.
 * @param {string} command
 * @param {readonly string[]} args
 * @param {RunOptions} [options]
 * @returns {Promise<RunResult>}
 */
export function run(command, args, { cwd, env, input, output = 'capture', signal } = {}) {
  const keep = output === 'show' ? keeper() : null;
  const stream = output === 'capture' || keep ? 'pipe' : output === 'show' ? 'inherit' : 'ignore';
  return new Promise((done, fail) => {
    const child = spawn(command, args, {
      cwd,
      env: env ?? process.env,
      stdio: [input === undefined ? 'ignore' : 'pipe', stream, stream],
      signal,
      killSignal: 'SIGTERM',
    });
    let stdout = '';
    let stderr = '';
    child.stdout?.setEncoding('utf8').on('data', (chunk) => {
      if (keep) keep('stdout', chunk);
      else stdout += chunk;
    });
    child.stderr?.setEncoding('utf8').on('data', (chunk) => {
      if (keep) keep('stderr', chunk);
      else stderr += chunk;
    });
    // A program that ends before reading its input is judged by its exit code, not by the broken pipe.
    child.stdin?.on('error', () => {});
    child.stdin?.end(input);
    child.once('error', fail);
    child.once('close', (code) => done({ code: code ?? 128, stdout, stderr }));
  });
}

/**
 * Like {@link run}, but a non-zero exit throws with what the program said.
 * @param {string} command
 * @param {readonly string[]} args
 * @param {RunOptions} [options]
 */
export async function mustRun(command, args, options) {
  const result = await run(command, args, options);
  if (result.code !== 0) {
    const said = (result.stderr || result.stdout).trim();
    throw new Error(`${command} ${args.join(' ')} ended with ${result.code}${said ? `:\n${said}` : '.'}`);
  }
  return result;
}

/** @param {number} pid */
export function isAlive(pid) {
  try {
    process.kill(pid, 0);
    return true;
  } catch (error) {
    return /** @type {NodeJS.ErrnoException} */ (error).code === 'EPERM';
  }
}

/**
 * When a process was started, in clock ticks since boot: with the pid it names a process for good,
 * which a pid alone does not (they are used again).
 * @param {number} pid
 * @returns {string | null} null when there is no such process
 */
export function birthOf(pid) {
  try {
    const stat = readFileSync(`/proc/${pid}/stat`, 'utf8');
    // The name in parentheses may hold spaces; the 22nd field of the line is the 20th after it.
    return stat.slice(stat.lastIndexOf(')') + 2).split(' ')[19] ?? null;
  } catch {
    return null;
  }
}
