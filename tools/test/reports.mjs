import { existsSync, readFileSync } from 'node:fs';

/** @typedef {{ passed: number, failed: number, skipped: number }} Tally */
/** @typedef {{ status: string, assertionResults: { status: string }[] }} FileReport */
/** @typedef {{ success: boolean, numPassedTests: number, numFailedTests: number, numPendingTests: number, numTodoTests?: number, testResults: FileReport[] }} Report */

/** @returns {Tally} */
export const emptyTally = () => ({ passed: 0, failed: 0, skipped: 0 });

/** @param {Tally} sum @param {Tally} more */
export function add(sum, more) {
  sum.passed += more.passed;
  sum.failed += more.failed;
  sum.skipped += more.skipped;
}

/** @param {Tally} tally */
export const describeTally = ({ passed, failed, skipped }) => `${passed} passed, ${failed} failed, ${skipped} skipped`;

/**
 * What a report of vitest says. A file that could not be loaded has no tests in it and counts as one that failed,
 * and so does a run that failed for a reason outside its tests.
 * @param {Report} report
 * @returns {Tally}
 */
export function countReport(report) {
  const unloaded = report.testResults.filter((file) => file.status === 'failed' && !file.assertionResults.some((test) => test.status === 'failed')).length;
  const failed = report.numFailedTests + unloaded;
  return {
    passed: report.numPassedTests,
    failed: failed === 0 && !report.success ? 1 : failed,
    skipped: report.numPendingTests + (report.numTodoTests ?? 0),
  };
}

/**
 * The tally of one suite from its report file. A report that is missing or broken is a failure.
 * @param {string} file
 * @returns {Tally & { missing: boolean }}
 */
export function readReport(file) {
  if (!existsSync(file)) return { passed: 0, failed: 1, skipped: 0, missing: true };
  try {
    return { ...countReport(JSON.parse(readFileSync(file, 'utf8'))), missing: false };
  } catch {
    return { passed: 0, failed: 1, skipped: 0, missing: true };
  }
}

/**
 * Which of the expected tasks nx says it finished well. What it does not mention failed.
 * @param {string} output
 * @param {string[]} expected such as `units:lint`
 * @returns {Tally & { bad: string[] }}
 */
export function countTasks(output, expected) {
  const plain = output.replaceAll(new RegExp(`${String.fromCharCode(27)}\\[[0-9;]*m`, 'g'), '');
  const done = new Set([...plain.matchAll(/✔\s+nx run ([\w-]+:[\w-]+)/g)].map((match) => match[1]));
  const failed = new Set([...plain.matchAll(/✖\s+nx run ([\w-]+:[\w-]+)/g)].map((match) => match[1]));
  const bad = expected.filter((task) => failed.has(task) || !done.has(task));
  return { passed: expected.length - bad.length, failed: bad.length, skipped: 0, bad };
}
