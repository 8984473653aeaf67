/** Offsets between scan lines, and the slow drift of a multiplicative quantity, from differences that terraces survive. */
import { rowDifferenceMedians } from '../kernels/row-difference-medians.ts';
import type { RowMedians } from '../kernels/row-difference-medians.ts';
import { solveBand } from '../stats/cholesky.ts';
import { medianInPlace } from '../stats/median.ts';

/** Distances between compared lines. Short ones keep terraces out of the median, long ones stop errors from adding up. */
const lags = [1, 2, 4, 8, 16] as const;
/** Fewer differences between two lines say nothing. */
const leastDifferences = 8;

/**
 * Offset of every row against the others, from medians of differences between rows 1, 2, 4, 8 and 16 apart, over the
 * pixels that `use` admits in both rows, reconciled by weighted least squares. A terrace edge crosses few columns
 * between two nearby rows, so it does not move their median difference; a mean of the row would follow it.
 *
 * @returns one offset per row with mean and linear trend removed (those belong to the form), NaN-free.
 */
export function lineOffsets(values: Float32Array, columns: number, rows: number, use: (index: number) => boolean): Float64Array {
  const offsets = lineDifferencesSolved(values, columns, rows, use);
  removeTrend(offsets);
  return offsets;
}

/**
 * The same without removing mean and trend, so that a steady drift from row to row remains. Differences beyond `limit` are
 * left out: where the steps between terraces are known to be larger, none of them can leak into the medians. Medians are computed by the
 * kernel where one is installed, with the same result.
 */
export function lineDifferencesSolved(values: Float32Array, columns: number, rows: number, use: (index: number) => boolean, limit = Number.POSITIVE_INFINITY): Float64Array {
  const width = Math.min(lags[lags.length - 1]!, rows - 1);
  const stride = width + 1;
  const band = new Float64Array(rows * stride);
  const right = new Float64Array(rows);
  const step = Math.max(1, Math.floor(columns / 512));
  const { counts, medians } = rowDifferenceMedians(values, columns, rows, lags, step, limit, leastDifferences, use)
    ?? mediansPlainly(values, columns, rows, step, limit, use);
  for (const [k, lag] of lags.entries()) {
    for (let r = lag; r < rows; r++) {
      const count = counts[k * rows + r]!;
      if (count < leastDifferences) continue;
      const median = medians[k * rows + r]!;
      // A median over n pixels has variance ∝ 1/n; terraces bias long lags in proportion to the lag.
      const weight = count / lag;
      band[r * stride]! += weight;
      band[(r - lag) * stride]! += weight;
      band[r * stride + lag]! -= weight;
      right[r]! += weight * median;
      right[r - lag]! -= weight * median;
    }
  }
  // Only differences are known: a weak tie to zero fixes the common level and rows that nothing reached.
  for (let r = 0; r < rows; r++) band[r * stride]! += 1e-9 * columns;
  return solveBand(band, width, right);
}

/** The medians in plain TypeScript. */
function mediansPlainly(values: Float32Array, columns: number, rows: number, step: number, limit: number, use: (index: number) => boolean): RowMedians {
  const counts = new Int32Array(rows * lags.length);
  const medians = new Float64Array(rows * lags.length);
  const differences = new Float64Array(columns);
  for (const [k, lag] of lags.entries()) {
    for (let r = lag; r < rows; r++) {
      let count = 0;
      for (let c = r % step; c < columns; c += step) {
        const here = r * columns + c;
        const there = here - lag * columns;
        const difference = values[here]! - values[there]!;
        if (Math.abs(difference) <= limit && use(here) && use(there)) differences[count++] = difference;
      }
      counts[k * rows + r] = count;
      if (count >= leastDifferences) medians[k * rows + r] = medianInPlace(differences, count);
    }
  }
  return { counts, medians };
}

/** Takes mean and linear trend out of row offsets; changes them. */
export function removeTrend(offsets: Float64Array): void {
  const n = offsets.length;
  let mean = 0;
  for (const value of offsets) mean += value / n;
  let slope = 0;
  let norm = 0;
  for (let i = 0; i < n; i++) {
    const u = i - (n - 1) / 2;
    slope += u * (offsets[i]! - mean);
    norm += u * u;
  }
  if (norm > 0) slope /= norm;
  for (let i = 0; i < n; i++) offsets[i]! -= mean + slope * (i - (n - 1) / 2);
}
