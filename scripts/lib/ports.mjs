import { connect, createServer } from 'node:net';
import { setTimeout as sleep } from 'node:timers/promises';
import { Trouble } from './log.mjs';

const loopback = '127.0.0.1';

/**
 * Listens for a moment to learn whether a port can be had.
 * @param {number} port 0 lets the system choose
 * @returns {Promise<number | null>} the port, or null when it is taken
 */
function probe(port) {
  return new Promise((done, fail) => {
    const server = createServer();
    server.once('error', (/** @type {NodeJS.ErrnoException} */ error) =>
      error.code === 'EADDRINUSE' || error.code === 'EACCES' ? done(null) : fail(error),
    );
    server.listen({ port, host: loopback, exclusive: true }, () => {
      const address = server.address();
      server.close(() => done(typeof address === 'object' && address ? address.port : null));
    });
  });
}

/** @param {number} port */
export const isPortFree = async (port) => (await probe(port)) !== null;

/**
 * A free port on loopback; the preferred one when that can be had.
 * @param {number} [preferred]
 */
export async function freePort(preferred) {
  if (preferred && (await isPortFree(preferred))) return preferred;
  const port = await probe(0);
  if (port === null) throw new Error('The system gave no free port on 127.0.0.1.');
  return port;
}

/** @param {number} port @returns {Promise<boolean>} whether something answers there */
function answers(port) {
  return new Promise((done) => {
    const socket = connect({ port, host: loopback });
    socket.once('connect', () => {
      socket.destroy();
      done(true);
    });
    socket.once('error', () => done(false));
  });
}

/**
 * Waits until something listens on the port.
 * @param {number} port
 * @param {{ signal?: AbortSignal, timeoutMs?: number }} [options]
 * @returns {Promise<boolean>} false when the time was up
 */
export async function waitForPort(port, { signal, timeoutMs = 30_000 } = {}) {
  const end = performance.now() + timeoutMs;
  while (performance.now() < end) {
    signal?.throwIfAborted();
    if (await answers(port)) return true;
    await sleep(50);
  }
  return false;
}

/** The port that the product is asked to serve on: PORT, or 3000. @throws {Trouble} */
export function readPort() {
  const given = process.env.PORT || '3000';
  const port = Number(given);
  if (Number.isInteger(port) && port >= 1 && port <= 65_535) return port;
  throw new Trouble(`PORT must be a whole number from 1 to 65535, not "${given}".`);
}
