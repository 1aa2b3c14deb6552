import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { afterAll, describe, expect, it } from 'vitest';
import { countVitest } from './vitest-count.mjs';

const folder = mkdtempSync(path.join(os.tmpdir(), 'scruple-count-'));
afterAll(() => rmSync(folder, { recursive: true }));

function report(content: unknown) {
  const file = path.join(folder, 'report.json');
  writeFileSync(file, typeof content === 'string' ? content : JSON.stringify(content));
  return file;
}

const loaded = { status: 'passed', assertionResults: [{ status: 'passed' }] };
const broken = { status: 'failed', assertionResults: [] };
const oneFailed = { status: 'failed', assertionResults: [{ status: 'failed' }] };

describe('counting a report', () => {
  it.each([
    ['counts what passed', { numPassedTests: 5, numFailedTests: 0, testResults: [loaded] }, true, [5, 0]],
    ['counts what failed', { numPassedTests: 4, numFailedTests: 1, testResults: [oneFailed] }, false, [4, 1]],
    [
      'counts a file that could not be loaded',
      { numPassedTests: 4, numFailedTests: 0, testResults: [broken] },
      false,
      [4, 1],
    ],
    [
      'counts a failure outside of tests',
      { numPassedTests: 4, numFailedTests: 0, testResults: [loaded] },
      false,
      [4, 1],
    ],
    [
      'counts a run without tests as failed',
      { numPassedTests: 0, numFailedTests: 0, testResults: [] },
      false,
      [0, 1],
    ],
    ['counts a broken report as failed', '{"numPassed', true, [0, 1]],
  ])('%s', (_title, content, hasWorked, [passed, failed]) => {
    expect(countVitest(report(content), hasWorked)).toEqual({ passed, failed });
  });

  it('counts a missing report as failed', () => {
    expect(countVitest(path.join(folder, 'none.json'), true)).toEqual({ passed: 0, failed: 1 });
  });
});
