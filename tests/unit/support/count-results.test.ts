import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { afterAll, describe, expect, it } from 'vitest';
import { countVitest } from '../../support/count-results.mjs';

const folder = mkdtempSync(path.join(tmpdir(), 'firstpull-count-'));
afterAll(() => rmSync(folder, { recursive: true, force: true }));

function count(report: object, exitCode: number) {
  const file = path.join(folder, 'report.json');
  const none = {
    numPassedTests: 0,
    numFailedTests: 0,
    numPendingTests: 0,
    numTodoTests: 0,
    numTotalTests: 0,
  };
  writeFileSync(file, JSON.stringify({ ...none, testResults: [], ...report }));
  return countVitest(file, exitCode);
}
const file = (status: string, ...tests: string[]) => ({
  name: 'a.test.ts',
  status,
  assertionResults: tests.map((one) => ({ status: one })),
});

describe('countVitest', () => {
  it('counts what passed and what failed', () => {
    expect(count({ numPassedTests: 7, numTotalTests: 7 }, 0)).toEqual({ passed: 7, failed: 0, problems: [] });
    const mixed = { numPassedTests: 5, numFailedTests: 2, numTotalTests: 7 };
    const testResults = [file('failed', 'passed', 'failed')];
    expect(count({ ...mixed, testResults }, 1)).toEqual({ passed: 5, failed: 2, problems: [] });
  });

  it('counts a file that could not be loaded', () => {
    const result = count({ numPassedTests: 3, numTotalTests: 3, testResults: [file('failed')] }, 1);
    expect(result).toMatchObject({ passed: 3, failed: 1 });
    expect(result.problems[0]).toContain('a.test.ts');
  });

  it('counts an error outside any test', () => {
    expect(count({ numPassedTests: 3, numTotalTests: 3 }, 1)).toMatchObject({ passed: 3, failed: 1 });
  });

  it('counts skipped tests, and a run without tests', () => {
    expect(
      count({ numPassedTests: 3, numPendingTests: 1, numTodoTests: 1, numTotalTests: 5 }, 0).failed,
    ).toBe(2);
    expect(count({}, 0)).toEqual({ passed: 0, failed: 1, problems: ['no test ran'] });
  });

  it('counts a missing report', () => {
    expect(countVitest(path.join(folder, 'none.json'), 0)).toMatchObject({ passed: 0, failed: 1 });
  });
});
