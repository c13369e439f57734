import { type ChildProcess, spawn } from 'node:child_process';
import { fileURLToPath } from 'node:url';
import { Injectable } from '@nestjs/common';
import { CHILD_RSS_LIMIT_BYTES, CHILD_WALL_LIMIT_MS } from './limits.js';
import { memoryOf } from './memory-of.js';
import { type Decoded, DecodeRefusal, type DecodeTask, decodeResultSchema } from './task.js';

/** The built child, whether this file runs built or from source. */
const CHILD = fileURLToPath(new URL('../../dist/media/child/main.js', import.meta.url));
/** A child that allocates as fast as it can gains some 50 MB between two looks. */
const LOOK_EVERY_MS = 40;
const MOST_OUTPUT_BYTES = 1024 * 1024;
/** The pictures themselves live outside of V8's heap. */
const HEAP_MB = 192;

export interface DecodeLimits {
  readonly wallMs: number;
  readonly rssBytes: number;
}
const STANDARD: DecodeLimits = { wallMs: CHILD_WALL_LIMIT_MS, rssBytes: CHILD_RSS_LIMIT_BYTES };

export class DecodeAborted extends Error {}

/** Opens uploaded files in a child process of their own, with limits of time and memory. */
@Injectable()
export class Decoder {
  /**
   * @throws DecodeRefusal with a sentence when the file can't be used or passes a limit
   * @throws DecodeAborted when the signal says so
   * @throws Error when the child itself fails
   */
  async run<T extends DecodeTask>(
    task: T,
    signal: AbortSignal,
    limits: DecodeLimits = STANDARD,
  ): Promise<Decoded<T['kind']> & { peakBytes: number }> {
    if (signal.aborted) throw new DecodeAborted();
    const child = spawn(process.execPath, [`--max-old-space-size=${HEAP_MB}`, CHILD], {
      // Only what it needs to find its programs: neither secrets nor settings.
      env: { PATH: process.env.PATH, MALLOC_ARENA_MAX: '2', VIPS_CONCURRENCY: '1' },
      cwd: task.folder,
      stdio: ['pipe', 'pipe', 'ignore'],
      // A group of its own, so that it can be ended with all that it started.
      detached: true,
    });
    let reason: Error | null = null;
    let peakBytes = 0;
    const end = (why: Error) => {
      reason ??= why;
      killGroup(child);
    };
    const onAbort = () => end(new DecodeAborted());
    signal.addEventListener('abort', onAbort, { once: true });
    const tooLong = setTimeout(() => end(tookTooLong(limits)), limits.wallMs);
    const watch = setInterval(async () => {
      peakBytes = Math.max(peakBytes, await memoryOf(child.pid ?? 0));
      if (peakBytes > limits.rssBytes) end(tookTooMuch());
    }, LOOK_EVERY_MS);
    try {
      const { output, code, killedBy } = await outcome(child, JSON.stringify(task), end);
      if (reason) throw reason;
      // A crash of the native libraries is the file's doing.
      if (killedBy !== null)
        throw new DecodeRefusal('file-damaged', 'This file is damaged and could not be read.');
      if (code !== 0) throw new Error(`The decoding child ended with code ${code}.`);
      const result = decodeResultSchema.parse(JSON.parse(output));
      if (result.kind === 'refused') throw new DecodeRefusal(result.code, result.message);
      if (result.kind !== task.kind) throw new Error(`A task ${task.kind} was answered with ${result.kind}.`);
      return { ...(result as Decoded<T['kind']>), peakBytes: Math.max(peakBytes, result.maxRssBytes) };
    } finally {
      clearTimeout(tooLong);
      clearInterval(watch);
      signal.removeEventListener('abort', onAbort);
      killGroup(child);
    }
  }
}

const tookTooLong = ({ wallMs }: DecodeLimits) =>
  new DecodeRefusal(
    'too-slow',
    `Reading this file took longer than ${wallMs / 1000} seconds. Try again, or save it simpler or smaller.`,
    true,
  );

const tookTooMuch = () =>
  new DecodeRefusal(
    'too-much-memory',
    'Reading this file takes more memory than one file may have. Save it smaller and send it again.',
  );

function outcome(
  child: ChildProcess,
  task: string,
  end: (why: Error) => void,
): Promise<{ output: string; code: number | null; killedBy: string | null }> {
  return new Promise((resolve, reject) => {
    const chunks: Buffer[] = [];
    let bytes = 0;
    child.stdout?.on('data', (chunk: Buffer) => {
      bytes += chunk.length;
      if (bytes > MOST_OUTPUT_BYTES) end(new Error('The decoding child talks too much.'));
      else chunks.push(chunk);
    });
    child.once('error', reject);
    child.once('close', (code, killedBy) =>
      resolve({ output: Buffer.concat(chunks).toString(), code, killedBy }),
    );
    // A child that ends at once leaves a broken pipe behind; its exit code says the rest.
    child.stdin?.on('error', () => undefined);
    child.stdin?.write(`${task}\n`);
  });
}

function killGroup(child: ChildProcess): void {
  if (child.pid === undefined) return;
  try {
    process.kill(-child.pid, 'SIGKILL');
  } catch {
    // All of it is gone already.
  }
}
