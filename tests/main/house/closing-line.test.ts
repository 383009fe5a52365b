import { spawnSync } from 'node:child_process';
import { chmodSync, cpSync, mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';

// .ci/run is read by its last line and its exit code: neither may ever speak of a run that was not.

const root = path.resolve(import.meta.dirname, '../../..');
let folder = '';
beforeEach(() => {
  folder = mkdtempSync(path.join(tmpdir(), 'monobis-ci-'));
  mkdirSync(path.join(folder, '.ci'));
  cpSync(path.join(root, '.ci/run'), path.join(folder, '.ci/run'));
});
afterEach(() => rmSync(folder, { recursive: true, force: true }));

/** Runs .ci/run with a stand-in for npm: a shell script that sees the verb as $1. */
function closing(npm: string): { line: string | undefined; code: number | null } {
  mkdirSync(path.join(folder, 'bin'), { recursive: true });
  writeFileSync(path.join(folder, 'bin/npm'), `#!/bin/sh\n${npm}\n`);
  chmodSync(path.join(folder, 'bin/npm'), 0o755);
  const { stdout, status } = spawnSync(path.join(folder, '.ci/run'), {
    env: {
      ...process.env,
      PATH: `${path.join(folder, 'bin')}:${path.dirname(process.execPath)}:/usr/bin:/bin`,
    },
    encoding: 'utf8',
  });
  return { line: stdout.trimEnd().split('\n').at(-1), code: status };
}

const passed = { status: 'passed', assertionResults: [{ status: 'passed' }] };

/** `npm test` that leaves this report and exits so. */
function testing(report: object | string, code: number): string {
  const text = typeof report === 'string' ? report : JSON.stringify(report);
  writeFileSync(path.join(folder, 'report'), text);
  return `if [ "$1" = test ]; then mkdir -p .test-results; cp report .test-results/vitest.json; exit ${code}; fi`;
}

const counts = (good: number, bad: number, ...testResults: object[]) => ({
  numPassedTests: good,
  numFailedTests: bad,
  testResults,
});

describe.skipIf(process.platform === 'win32')('the closing line of CI', () => {
  it('is the counts, and all is well, where all passed', () => {
    expect(closing(testing(counts(12, 0, passed), 0))).toEqual({
      line: '12 passed, 0 failed',
      code: 0,
    });
  });

  it('counts failures, and files that did not load', () => {
    const failed = {
      status: 'failed',
      assertionResults: [{ status: 'passed' }, { status: 'failed' }],
    };
    const unloaded = { status: 'failed', assertionResults: [] };
    expect(closing(testing(counts(12, 1, passed, failed, unloaded), 1))).toEqual({
      line: '12 passed, 2 failed',
      code: 1,
    });
  });

  it.each([
    ['nothing passed', counts(0, 0), 0, '0 passed, 0 failed'],
    ['the tests failed by something that no test shows', counts(12, 0), 1, '12 passed, 1 failed'],
    ['the report is half written', '{"numPassedTests": 12', 1, '0 passed, 1 failed'],
    ['the report is not one', '{}', 1, '0 passed, 1 failed'],
  ])('is there and not well where %s', (_, report, status, line) => {
    expect(closing(testing(report, status))).toEqual({ line, code: 1 });
  });

  it('is there and not well where the checks before the tests fail, or the install', () => {
    const none = { line: '0 passed, 1 failed', code: 1 };
    expect(closing('[ "$1" != test ]')).toEqual(none);
    expect(closing('[ "$1" != ci ]')).toEqual(none);
  });

  it('does not take the counts of an earlier run for its own', () => {
    mkdirSync(path.join(folder, '.test-results'));
    const file = path.join(folder, '.test-results/vitest.json');
    writeFileSync(file, JSON.stringify(counts(99, 0, passed)));
    expect(closing('[ "$1" != test ]').line).toBe('0 passed, 1 failed');
  });
});
