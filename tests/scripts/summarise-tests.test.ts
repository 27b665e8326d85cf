import { describe, expect, it } from 'vitest';
import { summarise } from '../../server/scripts/run-tests.ts';

const clean = { success: true, numPassedTests: 3, numFailedTests: 0, numPendingTests: 0, testResults: [] };

describe('the count at the end of a test run', () => {
  it('is what the run says when all went well', () => {
    expect(summarise(clean, 0)).toEqual({ passed: 3, failed: 0 });
  });

  it('counts a file that could not be loaded as one failure', () => {
    const results = { ...clean, success: false, testResults: [{ status: 'failed', assertionResults: [] }] };

    expect(summarise(results, 1)).toEqual({ passed: 3, failed: 1 });
  });

  it('counts a run that ended badly with no test to blame as one failure', () => {
    expect(summarise(clean, 1)).toEqual({ passed: 3, failed: 1 });
  });

  it('counts a run without a result as one failure', () => {
    expect(summarise(null, 0)).toEqual({ passed: 0, failed: 1 });
  });
});
