/** The last line of `npm test` and its exit code. */
import assert from 'node:assert/strict';
import { test } from 'node:test';
import { addTotals, exitCode, lastLine } from './totals.mjs';

test('parts are summed', () => {
  assert.deepEqual(addTotals([{ passed: 1, failed: 0, skipped: 2 }, { passed: 3, failed: 4, skipped: 0 }]), { passed: 4, failed: 4, skipped: 2 });
});

test('the line names skipped tests only when there are any', () => {
  assert.equal(lastLine({ passed: 12, failed: 0, skipped: 0 }), '12 passed, 0 failed');
  assert.equal(lastLine({ passed: 12, failed: 1, skipped: 3 }), '12 passed, 1 failed, 3 skipped');
});

test('the code is 0 only when something ran and nothing failed', () => {
  assert.equal(exitCode({ passed: 1, failed: 0, skipped: 0 }), 0);
  assert.equal(exitCode({ passed: 9, failed: 1, skipped: 0 }), 1);
  assert.equal(exitCode({ passed: 0, failed: 0, skipped: 5 }), 1);
});
