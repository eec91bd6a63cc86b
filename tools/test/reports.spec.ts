import { describe, expect, it } from 'vitest';
import { countReport, countTasks, readReport } from './reports.mjs';

const file = (status: string, ...tests: string[]) => ({ status, assertionResults: tests.map((test) => ({ status: test })) });
const report = { success: true, numPassedTests: 3, numFailedTests: 0, numPendingTests: 1, numTodoTests: 1, testResults: [file('passed', 'passed', 'passed', 'passed')] };

describe('the tally', () => {
  it('counts what a report says', () => {
    expect(countReport(report)).toEqual({ passed: 3, failed: 0, skipped: 2 });
  });

  it('counts a file that could not be loaded as one failure', () => {
    const broken = { ...report, success: false, numFailedTests: 1, testResults: [file('failed', 'failed', 'passed'), file('failed')] };
    expect(countReport(broken)).toEqual({ passed: 3, failed: 2, skipped: 2 });
  });

  it('counts a run that failed outside its tests as one failure', () => {
    expect(countReport({ ...report, success: false }).failed).toBe(1);
  });

  it('counts a missing report as one failure', () => {
    expect(readReport('/nowhere/at-all.json')).toEqual({ passed: 0, failed: 1, skipped: 0, missing: true });
  });

  it('takes from nx only the tasks that it says went well', () => {
    const output = '✔  nx run units:lint  [local cache]\n\u001b[32m✔\u001b[39m  nx run units:typecheck (2s)\n✖  nx run geometry:lint\n';
    const tally = countTasks(output, ['units:lint', 'units:typecheck', 'geometry:lint', 'geometry:typecheck']);
    expect(tally).toEqual({ passed: 2, failed: 2, skipped: 0, bad: ['geometry:lint', 'geometry:typecheck'] });
  });
});
