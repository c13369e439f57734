import type { z } from 'zod';
import { type Fault, FaultList, shown } from './fault.js';
import { findReferenceFaults } from './references.js';
import { type EstimateRequest, estimateRequestSchema } from './request.js';
import { childOf, itemsOf } from './untrusted.js';

export type EstimateParse =
  | { readonly ok: true; readonly request: EstimateRequest }
  | { readonly ok: false; readonly errors: Fault[] };

export const MAX_FIXTURES = 5_000;

/**
 * Faults are made one object each, so a list of millions of nonsense items would cost gigabytes before the cap on
 * listed faults helped. No honest request of 8 MB comes near this many items.
 */
const MAX_ITEMS = 100_000;

/**
 * Checks a request whole: its shape, its numbers, and what names what. Every fault is named by an RFC 6901 pointer;
 * beyond the first LISTED_FAULTS a last entry counts the rest. Never throws on anything that JSON can hold.
 */
export function parseEstimateRequest(value: unknown): EstimateParse {
  const faults = new FaultList();
  const items = countItems(value);
  if (items > MAX_ITEMS) {
    faults.add([], `A request may hold ${MAX_ITEMS} items in all its lists together; got ${items}.`);
    return { ok: false, errors: faults.listed() };
  }
  findTooManyFixtures(value, faults);
  const parsed = estimateRequestSchema.safeParse(value);
  if (!parsed.success) for (const issue of parsed.error.issues) addIssue(value, [], issue, faults);
  findReferenceFaults(value, faults);
  if (parsed.success && faults.isEmpty) return { ok: true, request: parsed.data };
  return { ok: false, errors: faults.listed() };
}

function countItems(value: unknown): number {
  const transformers = itemsOf(childOf(value, 'transformers'));
  const runs = itemsOf(childOf(value, 'runs'));
  let count = transformers.length + runs.length;
  for (const transformer of transformers) {
    for (const key of ['windings', 'taps', 'commons']) count += itemsOf(childOf(transformer, key)).length;
  }
  for (const run of runs) {
    for (const key of ['cables', 'fixtures']) count += itemsOf(childOf(run, key)).length;
  }
  return count;
}

/** Says it once, at the list with which the count passes the limit. */
function findTooManyFixtures(value: unknown, faults: FaultList): void {
  let count = 0;
  let passedAt = -1;
  itemsOf(childOf(value, 'runs')).forEach((run, index) => {
    count += itemsOf(childOf(run, 'fixtures')).length;
    if (passedAt < 0 && count > MAX_FIXTURES) passedAt = index;
  });
  if (passedAt < 0) return;
  faults.add(
    ['runs', passedAt, 'fixtures'],
    `A request may hold 5,000 fixtures over all its runs; got ${count}.`,
  );
}

type Issue = z.core.$ZodIssue;

/** One of zod's issues as faults: one per unknown key, and for a union those of the branch that was meant. */
function addIssue(value: unknown, base: readonly PropertyKey[], issue: Issue, faults: FaultList): void {
  const path = [...base, ...issue.path];
  if (issue.code === 'unrecognized_keys') {
    for (const key of issue.keys) faults.add([...path, key], `${shown(key)} is not a known name here.`);
    return;
  }
  if (issue.code === 'invalid_union' && issue.errors.length > 0) {
    addConductorIssues(value, path, issue.errors, faults);
    return;
  }
  faults.add(path, issue.message);
}

/** The order is that of `conductorSchema`'s branches; the conductor is the only union without a discriminator. */
const CONDUCTOR_KEYS = ['awg', 'mm2', 'ohmsPerKm'];

function addConductorIssues(
  value: unknown,
  path: readonly PropertyKey[],
  branches: readonly (readonly Issue[])[],
  faults: FaultList,
): void {
  let conductor = value;
  for (const part of path) conductor = childOf(conductor, part);
  const meant = CONDUCTOR_KEYS.findIndex((key) => childOf(conductor, key) !== undefined);
  const branch = branches[meant];
  if (branch) {
    for (const issue of branch) addIssue(value, path, issue, faults);
    return;
  }
  const accepted = '{ "awg": … }, { "mm2": … } or { "ohmsPerKm": … }';
  faults.add(
    path,
    conductor === undefined
      ? `Conductor is missing; it must be ${accepted}.`
      : `Conductor must be ${accepted}; got ${shown(conductor)} without any of them.`,
  );
}
