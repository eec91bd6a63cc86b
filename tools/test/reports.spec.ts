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

  const printed = '\n> nx run units:lint  [local cache]\n\n> eslint .\n\n\u001b[2m> \u001b[22mnx run units:typecheck\n\n> nx run geometry:lint\n';
  const expected = ['units:lint', 'units:typecheck', 'geometry:lint', 'geometry:typecheck'];

  it('takes from nx only the tasks that it ran and does not list as failed', () => {
    const output = `${printed}\n NX   Running targets lint, typecheck for 2 projects failed\n\nFailed tasks:\n\n- geometry:lint\n\n  Run duration: 1s\n`;
    expect(countTasks(output, expected)).toEqual({ passed: 2, failed: 2, skipped: 0, bad: ['geometry:lint', 'geometry:typecheck'] });
    expect(countTasks(`${printed}\n NX   Successfully ran targets lint, typecheck for 2 projects\n`, expected.slice(0, 3)).failed).toBe(0);
  });

  it('takes nothing from an nx that did not come to its end', () => {
    expect(countTasks(printed, expected).failed).toBe(4);
  });
});
