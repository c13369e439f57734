import { existsSync, readFileSync } from 'node:fs';

/** @typedef {{ passed: number, failed: number, skipped: number }} Counts */

/** @type {Counts} */
export const none = { passed: 0, failed: 0, skipped: 0 };

/** @param {readonly Counts[]} all @returns {Counts} */
export function sum(all) {
  return all.reduce(
    (total, one) => ({
      passed: total.passed + one.passed,
      failed: total.failed + one.failed,
      skipped: total.skipped + one.skipped,
    }),
    none,
  );
}

/** A step that either holds or not. @param {boolean} ok @returns {Counts} */
export const oneOf = (ok) => (ok ? { ...none, passed: 1 } : { ...none, failed: 1 });

/**
 * The last line of a test run and its exit code: nothing run is no success.
 * @param {Counts} counts
 */
export function verdict({ passed, failed }) {
  return { line: `${passed} passed, ${failed} failed`, code: failed > 0 || passed === 0 ? 1 : 0 };
}

/**
 * A runner that ends badly without a failed test (a crash, an error outside tests, no report, no tests)
 * has failed all the same.
 * @param {Counts} counts
 * @param {number} code its exit code
 * @returns {Counts}
 */
function held(counts, code) {
  const silent = counts.failed === 0 && (code !== 0 || counts.passed === 0);
  return silent ? { ...counts, failed: 1 } : counts;
}

/** @param {string} file */
const readJson = (file) => (existsSync(file) ? JSON.parse(readFileSync(file, 'utf8')) : null);

/**
 * Vitest's JSON report. A spec file that can't be loaded has no tests in it and counts as one failure.
 * @param {string} file
 * @param {number} code
 */
export function vitestCounts(file, code) {
  /** @type {{ testResults: { status: string, assertionResults: { status: string }[] }[] } | null} */
  const report = readJson(file);
  const perFile = (report?.testResults ?? []).map(({ status, assertionResults }) => {
    const of = (/** @type {string} */ wanted) =>
      assertionResults.filter((one) => one.status === wanted).length;
    const failed = of('failed');
    const passed = of('passed');
    const skipped = assertionResults.length - failed - passed;
    return { passed, skipped, failed: failed === 0 && status === 'failed' ? 1 : failed };
  });
  return held(sum(perFile), code);
}

/**
 * Playwright's JSON report. A flaky test passed only on a retry, which is a failure here.
 * @param {string} file
 * @param {number} code
 */
export function playwrightCounts(file, code) {
  /** @type {{ stats: { expected: number, unexpected: number, flaky: number, skipped: number } } | null} */
  const report = readJson(file);
  const { expected = 0, unexpected = 0, flaky = 0, skipped = 0 } = report?.stats ?? {};
  return held({ passed: expected, failed: unexpected + flaky, skipped }, code);
}

/**
 * The TAP report of Node's own test runner.
 * @param {string} file
 * @param {number} code
 */
export function nodeTestCounts(file, code) {
  const report = existsSync(file) ? readFileSync(file, 'utf8') : '';
  const of = (/** @type {string} */ what) =>
    Number(report.match(new RegExp(`^# ${what} (\\d+)$`, 'm'))?.[1] ?? 0);
  const failed = of('fail') + of('cancelled');
  return held({ passed: of('pass'), failed, skipped: of('skipped') + of('todo') }, code);
}
