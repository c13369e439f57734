// npm test [-- STEP …]: every check, or the named steps only. The last line says how many passed and failed.
import { rmSync } from 'node:fs';
import { availableParallelism } from 'node:os';
import { ensurePackages } from './lib/debian.mjs';
import { afterOthers, main, report, say, since, Trouble } from './lib/log.mjs';
import { ensureNodeModules } from './lib/node-modules.mjs';
import { openCluster } from './lib/postgres.mjs';
import { scratchFolder } from './lib/scratch-folder.mjs';
import { Supervisor, stopSignal } from './lib/supervisor.mjs';
import { none, oneOf, sum, verdict } from './lib/test-counts.mjs';
import { steps } from './lib/test-steps.mjs';

/**
 * @typedef {import('./lib/test-steps.mjs').Step} Step
 * @typedef {import('./lib/test-steps.mjs').TestContext} TestContext
 * @typedef {{ title: string, counts: import('./lib/test-counts.mjs').Counts, took: string }} Result
 */

await main(async () => {
  const chosen = chooseSteps(process.argv.slice(2));
  const startedAt = performance.now();
  const signal = stopSignal();
  const supervisor = new Supervisor();
  const scratch = scratchFolder('test');
  supervisor.onStop('the reports', async () => rmSync(scratch, { recursive: true, force: true }));
  const context = { scratch, signal, testDatabase: testDatabase(scratch, supervisor) };
  /** @type {Result[]} */
  const results = [];
  try {
    await ensurePackages(['postgresql', 'poppler-utils', 'chromium', 'ngspice'], signal);
    await ensureNodeModules(signal);
    await runAll(chosen, context, results);
  } catch (error) {
    if (!signal.aborted) report(error);
    results.push({ title: signal.aborted ? 'Interrupted' : 'Preparing', counts: oneOf(false), took: '' });
  }
  await supervisor.stop();
  return conclude(results, since(startedAt));
});

/** @param {readonly string[]} names */
function chooseSteps(names) {
  for (const name of names) {
    if (steps.some((step) => step.name === name)) continue;
    throw new Trouble(
      `There is no step "${name}"; the steps are ${steps.map((step) => step.name).join(', ')}.`,
    );
  }
  return names.length === 0 ? steps : steps.filter(({ name }) => names.includes(name));
}

/**
 * One step after the other; where there is more than one core, those that may run beside the others do.
 * @param {readonly Step[]} chosen
 * @param {Omit<TestContext, 'cores'>} shared
 * @param {Result[]} results gets those of the steps that came to an end, also when it throws
 */
async function runAll(chosen, shared, results) {
  const cores = availableParallelism();
  const aside = chosen.filter((step) => step.aside);
  const others = chosen.filter((step) => !step.aside);
  if (cores === 1 || aside.length === 0 || others.length === 0) {
    return runInOrder(chosen, { ...shared, cores }, results);
  }
  say(`${aside.map(({ title }) => title).join(', ')}: run beside the others, told after them.`);
  /** @type {Result[]} */
  const later = [];
  const first = runInOrder(others, { ...shared, cores: cores - 1 }, results);
  const second = afterOthers(first, () => runInOrder(aside, { ...shared, cores: 1 }, later));
  // Both are waited for before a failure of one is passed on: nothing goes on behind an interruption.
  const ends = await Promise.allSettled([first, second]);
  results.push(...later);
  for (const end of ends) if (end.status === 'rejected') throw end.reason;
}

/**
 * @param {readonly Step[]} chosen
 * @param {TestContext} context
 * @param {Result[]} results
 */
async function runInOrder(chosen, context, results) {
  for (const step of chosen) {
    say(`\n━━ ${step.title}`);
    const from = performance.now();
    const counts = await runStep(step, context);
    results.push({ title: step.title, counts, took: since(from) });
  }
}

/**
 * A step that breaks is a failure; the others still run.
 * @param {Step} step
 * @param {TestContext} context
 */
async function runStep(step, context) {
  try {
    return await step.run(context);
  } catch (error) {
    if (context.signal.aborted) throw error;
    report(error);
    return oneOf(false);
  }
}

/**
 * @param {string} folder
 * @param {Supervisor} supervisor
 * @returns {() => Promise<string>}
 */
function testDatabase(folder, supervisor) {
  /** @type {Promise<string> | undefined} */
  let url;
  const start = async () => {
    const cluster = await openCluster(folder, { throwaway: true });
    supervisor.onStop('the test database', () => cluster.destroy());
    await cluster.start();
    return cluster.keeperUrl();
  };
  return () => {
    url ??= start();
    return url;
  };
}

/**
 * @param {readonly Result[]} results
 * @param {string} took
 */
function conclude(results, took) {
  say(`\n━━ Summary (${took})`);
  for (const { title, counts, took: time } of results) {
    const skipped = counts.skipped > 0 ? `, ${counts.skipped} skipped` : '';
    say(`${title}: ${counts.passed} passed, ${counts.failed} failed${skipped} ${time && `(${time})`}`);
  }
  const { line, code } = verdict(results.length === 0 ? none : sum(results.map(({ counts }) => counts)));
  say(line);
  return code;
}
