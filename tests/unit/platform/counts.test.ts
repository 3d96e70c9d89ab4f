import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { afterEach, beforeEach, expect, it } from 'vitest';
import { countPlaywright, countVitest } from '../../../src/cli/lib/counts.mjs';

let folder: string;
beforeEach(() => {
  folder = mkdtempSync(path.join(tmpdir(), 'echotide-counts-'));
});
afterEach(() => {
  rmSync(folder, { recursive: true, force: true });
});

function report(content: unknown): string {
  const file = path.join(folder, 'report.json');
  writeFileSync(file, typeof content === 'string' ? content : JSON.stringify(content));
  return file;
}

it('counts tests, and a file that could not be loaded as one failure', () => {
  const file = report({
    numPassedTests: 7,
    numFailedTests: 1,
    testResults: [
      { status: 'failed', assertionResults: [{ status: 'failed' }, { status: 'passed' }] },
      { status: 'failed', assertionResults: [] },
      { status: 'passed', assertionResults: [{ status: 'passed' }] },
    ],
  });
  expect(countVitest(file)).toEqual({ passed: 7, failed: 2 });
});

it('counts browser tests; a flaky one and an error outside of tests are failures', () => {
  const stats = { expected: 5, unexpected: 1, flaky: 1, skipped: 2 };
  const file = report({ stats, errors: [{ message: 'no build' }] });
  expect(countPlaywright(file)).toEqual({ passed: 5, failed: 3 });
});

it.each(['missing', 'cut off'])('never takes a %s report for a success', (state) => {
  const file = state === 'missing' ? path.join(folder, 'nothing.json') : report('{"stats":');
  expect(countVitest(file)).toEqual({ passed: 0, failed: 1 });
  expect(countPlaywright(file)).toEqual({ passed: 0, failed: 1 });
});
