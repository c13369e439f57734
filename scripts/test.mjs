// npm test [-- STEP …]: every check, or the named steps only. The last line says how many passed and failed.
import { rmSync } from 'node:fs';
import { ensurePackages } from './lib/debian.mjs';
import { main, report, say, since, Trouble } from './lib/log.mjs';
import { ensureNodeModules } from './lib/node-modules.mjs';
import { openCluster } from './lib/postgres.mjs';
import { scratchFolder } from './lib/scratch-folder.mjs';
import { Supervisor, stopSignal } from './lib/supervisor.mjs';
import { none, oneOf, sum, verdict } from './lib/test-counts.mjs';
import { steps } from './lib/test-steps.mjs';

await main(async () => {
  const chosen = chooseSteps(process.argv.slice(2));
  const startedAt = performance.now();
  const signal = stopSignal();
  const supervisor = new Supervisor();
  const scratch = scratchFolder('test');
  supervisor.onStop('the reports', async () => rmSync(scratch, { recursive: true, force: true }));
  const context = { scratch, signal, testDatabase: testDatabase(scratch, supervisor) };
  /** @type {{ title: string, counts: import('./lib/test-counts.mjs').Counts, took: string }[]} */
  const results = [];
  try {
    await ensurePackages(['postgresql', 'poppler-utils', 'chromium', 'ngspice'], signal);
    await ensureNodeModules(signal);
    for (const step of chosen) {
      say(`\n━━ ${step.title}`);
      const from = performance.now();
      const counts = await runStep(step, context);
      results.push({ title: step.title, counts, took: since(from) });
    }
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
 * A step that breaks is a failure; the others still run.
 * @param {import('./lib/test-steps.mjs').Step} step
 * @param {import('./lib/test-steps.mjs').TestContext} context
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
    const cluster = await openCluster(folder);
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
 * @param {{ title: string, counts: import('./lib/test-counts.mjs').Counts, took: string }[]} results
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
