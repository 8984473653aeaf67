/** What a count says about the expected number behind it. */
import { chiSquareQuantile } from './gamma.ts';

/**
 * Exact two-sided interval of the expected number when `seen` events were counted (F. Garwood,
 * Biometrika 28, 437, 1936): χ²(α/2, 2n)/2 to χ²(1−α/2, 2n+2)/2, 0 at the low end for none.
 * NaN for counts that are not whole and at least 0.
 */
export function poissonInterval(seen: number, confidence = 0.95): { low: number; high: number } {
  if (!Number.isInteger(seen) || seen < 0) return { low: Number.NaN, high: Number.NaN };
  const tail = (1 - confidence) / 2;
  return { low: seen === 0 ? 0 : chiSquareQuantile(tail, 2 * seen) / 2, high: chiSquareQuantile(1 - tail, 2 * seen + 2) / 2 };
}

/** One-sided upper bound of the expected number: the value at which `seen` or fewer events have the chance 1 − confidence; −ln(1 − confidence) for none. */
export function poissonUpperBound(seen: number, confidence = 0.95): number {
  if (!Number.isInteger(seen) || seen < 0) return Number.NaN;
  return chiSquareQuantile(confidence, 2 * seen + 2) / 2;
}
