import { existsSync, readFileSync } from 'node:fs';

/** @typedef {{ passed: number, failed: number, skipped: number }} Tally */
/** @typedef {{ status: string, assertionResults: { status: string }[] }} FileReport */
/** @typedef {{ success: boolean, numPassedTests: number, numFailedTests: number, numPendingTests: number, numTodoTests?: number, testResults: FileReport[] }} Report */

/** What a terminal takes for a colour. */
const colour = `${String.fromCharCode(27)}\\[[0-9;]*m`;

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
 * Which of the expected tasks nx says it finished well: those it printed and does not list as failed.
 * What it does not mention failed, and so does everything when it did not come to its summary.
 * @param {string} output
 * @param {string[]} expected such as `units:lint`
 * @returns {Tally & { bad: string[] }}
 */
export function countTasks(output, expected) {
  const plain = output.replaceAll(new RegExp(colour, 'g'), '');
  const printed = new Set([...plain.matchAll(/^> nx run ([\w-]+:[\w-]+)/gm)].map((match) => match[1]));
  const [, listed] = /^Failed tasks:\s*\n((?:\s*- .*\n)+)/m.exec(plain) ?? [];
  const failed = new Set([...(listed ?? '').matchAll(/^\s*- ([\w-]+:[\w-]+)/gm)].map((match) => match[1]));
  const concluded = listed !== undefined || /^ NX\s+Successfully ran targets? /m.test(plain);
  const bad = expected.filter((task) => !concluded || failed.has(task) || !printed.has(task));
  return { passed: expected.length - bad.length, failed: bad.length, skipped: 0, bad };
}

/**
 * What nx printed for some tasks, without that of all the others.
 * @param {string} output
 * @param {string[]} tasks
 */
export function pickTasks(output, tasks) {
  const sections = output.split(new RegExp(`(?=^(?:${colour})*> (?:${colour})*nx run )`, 'm'));
  const picked = sections.filter((section) => tasks.some((task) => section.slice(0, 200).includes(`nx run ${task}`)));
  // What it says before the first task and after none, where there is nothing else to show.
  return picked.length > 0 ? picked.join('').trimEnd() : output;
}
