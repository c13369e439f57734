import { all, create } from 'mathjs';
import { joints } from './solver.kit.mjs';

const math = create(/** @type {import('mathjs').FactoryFunctionMap} */ (all));

/** Public, but left out of the library's own types. */
const { SparseMatrix } = /** @type {{ SparseMatrix: new (data: object) => import('mathjs').Matrix }} */ (
  /** @type {unknown} */ (math)
);

/**
 * What the solver is measured against, on the same network.
 * @typedef {import('./solver.kit.mjs').Shape} Shape
 */

/**
 * mathjs' sparse LU, fill-reducing order included, on the network's equations made linear at the open volts: one
 * factorisation and one solution, the matrix being made beforehand.
 * @param {Shape} shape @param {number} count @param {number} siemens of a joint @param {number} openVolts
 * @param {number} va of a load @returns {() => unknown}
 */
export function sparseLu(shape, count, siemens, openVolts, va) {
  /** @type {Map<number, number>[]} */
  const columns = Array.from({ length: count }, () => new Map());
  const add = (/** @type {number} */ i, /** @type {number} */ j, /** @type {number} */ value) =>
    columns[j]?.set(i, (columns[j]?.get(i) ?? 0) + value);
  const right = new Array(count).fill((2 * va) / openVolts);
  for (const [from, to] of joints(shape, count)) {
    add(to - 1, to - 1, siemens);
    if (from === 0) continue;
    add(from - 1, from - 1, siemens);
    add(from - 1, to - 1, -siemens);
    add(to - 1, from - 1, -siemens);
  }
  for (let i = 0; i < count; i += 1) add(i, i, -va / openVolts ** 2);
  /** @type {number[]} */
  const values = [];
  /** @type {number[]} */
  const index = [];
  const ptr = [0];
  for (const column of columns) {
    for (const [row, value] of [...column].sort(([a], [b]) => a - b)) {
      index.push(row);
      values.push(value);
    }
    ptr.push(values.length);
  }
  const matrix = new SparseMatrix({ values, index, ptr, size: [count, count], datatype: 'number' });
  return () => math.lusolve(math.slu(matrix, 1, 1), right);
}

/**
 * The bare sweep for trees: currents from the leaves to the source, volts from the source to the leaves, until
 * nothing moves. Numbers in, numbers out: no names, leads, windings, proofs or answer.
 * @param {Shape} shape @param {number} count @param {number} siemens @param {number} openVolts @param {number} va
 * @returns {() => unknown}
 */
export function bareSweep(shape, count, siemens, openVolts, va) {
  const parent = new Int32Array(count + 1);
  for (const [from, to] of joints(shape, count)) parent[to] = from;
  const volts = new Float64Array(count + 1);
  const amps = new Float64Array(count + 1);
  return () => {
    volts.fill(openVolts);
    for (let sweep = 0; sweep < 100; sweep += 1) {
      amps.fill(0);
      for (let i = count; i > 0; i -= 1) {
        amps[i] = /** @type {number} */ (amps[i]) + va / /** @type {number} */ (volts[i]);
        const up = /** @type {number} */ (parent[i]);
        amps[up] = /** @type {number} */ (amps[up]) + /** @type {number} */ (amps[i]);
      }
      let moved = 0;
      for (let i = 1; i <= count; i += 1) {
        const up = /** @type {number} */ (volts[/** @type {number} */ (parent[i])]);
        const next = up - /** @type {number} */ (amps[i]) / siemens;
        moved = Math.max(moved, Math.abs(next - /** @type {number} */ (volts[i])));
        volts[i] = next;
      }
      if (moved < 1e-9) break;
    }
    return volts;
  };
}
