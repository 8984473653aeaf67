/** Counting passed, failed and skipped checks, and how their last line reads. */

/** @typedef {{ passed: number, failed: number, skipped: number }} Totals */

/** @returns {Totals} */
export function noTotals() {
  return { passed: 0, failed: 0, skipped: 0 };
}

/**
 * @param {readonly Totals[]} parts
 * @returns {Totals}
 */
export function addTotals(parts) {
  const sum = noTotals();
  for (const part of parts) {
    sum.passed += part.passed;
    sum.failed += part.failed;
    sum.skipped += part.skipped;
  }
  return sum;
}

/** @param {Totals} totals */
export function lastLine(totals) {
  const skipped = totals.skipped > 0 ? `, ${totals.skipped} skipped` : '';
  return `${totals.passed} passed, ${totals.failed} failed${skipped}`;
}

/**
 * 0 only when something ran and nothing failed.
 * @param {Totals} totals
 */
export function exitCode(totals) {
  return totals.failed === 0 && totals.passed > 0 ? 0 : 1;
}
