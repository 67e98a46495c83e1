import * as fs from 'node:fs';
import * as os from 'node:os';
import * as path from 'node:path';
import { afterAll, describe, expect, it } from 'vitest';
import { countCheck, countLine, countRunner, sumCounts } from './test-counts.mjs';

const folder = fs.mkdtempSync(path.join(os.tmpdir(), 'stayledger-counts-'));
afterAll(() => fs.rmSync(folder, { recursive: true, force: true }));

let reports = 0;
function count(report, exitCode = 0) {
  reports += 1;
  const reportFile = path.join(folder, `${reports}.json`);
  if (report !== undefined)
    fs.writeFileSync(reportFile, typeof report === 'string' ? report : JSON.stringify(report));
  return countRunner({ name: 'jobs', reportFile, exitCode });
}

function file(outcomes, status = outcomes.includes('failed') ? 'failed' : 'passed', message = '') {
  const assertionResults = outcomes.map((outcome, index) => ({ status: outcome, fullName: `test ${index}` }));
  return { name: 'a.spec.ts', status, message, assertionResults };
}

describe('counts of a runner', () => {
  it('come from the single tests', () => {
    const report = {
      testResults: [file(['passed', 'passed', 'failed']), file(['pending', 'todo', 'skipped', 'passed'])],
    };
    expect(count(report, 1)).toEqual({ passed: 3, failed: 1, skipped: 3, failures: ['a.spec.ts › test 2'] });
  });

  it('take a file that does not load for a failure', () => {
    const report = { testResults: [file([], 'failed', 'Cannot find module x\nat y'), file(['passed'])] };
    expect(count(report, 1)).toMatchObject({
      passed: 1,
      failed: 1,
      failures: ['a.spec.ts: Cannot find module x'],
    });
  });

  it('take a failed hook for a failure although its tests are reported as passed', () => {
    expect(count({ testResults: [file(['passed'], 'failed', 'afterAll')] }, 1)).toMatchObject({
      passed: 1,
      failed: 1,
    });
  });

  it.each([
    ['no report', undefined, 0],
    ['a cut report', '{"testResults": [', 0],
    ['something else', '{}', 0],
    ['no test', { testResults: [] }, 0],
    ['a file without tests', { testResults: [file([])] }, 0],
  ])('take %s for one failure', (_what, report, exitCode) => {
    expect(count(report, exitCode)).toMatchObject({ passed: 0, failed: 1 });
  });

  it('take an exit status that no test explains for a failure', () => {
    expect(count({ testResults: [file(['passed'])] }, 1)).toMatchObject({ passed: 1, failed: 1 });
    expect(count({ testResults: [file(['passed'])] }, 0)).toMatchObject({ passed: 1, failed: 0 });
  });
});

describe('the last line', () => {
  it('names skipped tests only when there are some', () => {
    expect(countLine({ passed: 12, failed: 0, skipped: 0 })).toBe('12 passed, 0 failed');
    expect(countLine({ passed: 1, failed: 2, skipped: 3 })).toBe('1 passed, 2 failed, 3 skipped');
  });

  it('sums runners and checks', () => {
    const jobs = count({ testResults: [file(['passed', 'skipped'])] });
    const lint = countCheck({ name: 'lint', exitCode: 1 });
    const types = countCheck({ name: 'types', exitCode: 0 });
    expect(sumCounts([jobs, lint, types])).toEqual({
      passed: 1,
      failed: 1,
      skipped: 1,
      failures: ['lint: exit status 1'],
    });
    expect(jobs.failed).toBe(0);
  });
});
