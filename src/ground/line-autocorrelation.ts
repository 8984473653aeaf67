import type { Grid } from '../grid/maps.ts';

/** More lines, or more pixels in them, no longer sharpen the autocorrelation. */
const mostLines = 256;
const mostPixels = 1 << 16;
/** Of the pixels of a terrace seen on those lines; fewer do not give its level. */
const leastOfLevel = 64;

/** Autocovariance along the fast axis, in m², at distances given in pixels. */
export interface LineAutocorrelation {
  /** Rising from 1, every pixel at first and then in steps of about a fifth, to half a line. */
  readonly lags: Int32Array;
  /** Mean product of heights `lag` apart, about the mean; NaN where no pair has that distance. */
  readonly covariance: Float64Array;
  readonly pairs: Float64Array;
  /** At distance 0: pixel noise is in it, and in no other. */
  readonly variance: number;
  readonly pixels: number;
  /** Mean number of pixels that count, over the lines that hold at least one. */
  readonly pixelsPerLine: number;
}

/**
 * Autocovariance of a levelled height along its lines, over evenly spread lines. Pairs with a missing or masked end do not count, so that gaps
 * do no harm. With `terraces` each height is taken about the mean of its terrace, and pixels of unknown or hardly seen terraces are left out:
 * what remains is the roughness inside terraces.
 *
 * @param height row-major, metres, NaN missing. @param mask row-major, 1 where a pixel counts.
 * @param terraces row-major numbers of terraces, −128 unknown.
 */
export function lineAutocorrelation(height: Float32Array, { columns, rows }: Pick<Grid, 'columns' | 'rows'>, mask: Uint8Array, terraces?: Int8Array): LineAutocorrelation {
  const lines = Math.max(1, Math.min(rows, mostLines, Math.floor(mostPixels / columns)));
  const step = Math.floor(rows / lines);
  const taken: number[] = [];
  for (let r = step >> 1; r < rows; r += step) taken.push(r);
  const levels = levelsOf(height, columns, taken, mask, terraces);

  const lags = distances(columns >> 1);
  const sums = new Float64Array(lags.length);
  const pairs = new Float64Array(lags.length);
  const z = new Float64Array(columns);
  const counts = new Float64Array(columns);
  let [squares, pixels, filled] = [0, 0, 0];
  for (const r of taken) {
    let onLine = 0;
    for (let c = 0; c < columns; c++) {
      const i = r * columns + c;
      const value = mask[i] === 1 ? height[i]! - levels[terraces ? terraces[i]! + 128 : 0]! : Number.NaN;
      counts[c] = Number.isNaN(value) ? 0 : 1;
      z[c] = counts[c] === 1 ? value : 0;
      onLine += counts[c]!;
      squares += z[c]! * z[c]!;
    }
    if (onLine === 0) continue;
    pixels += onLine;
    filled++;
    for (let k = 0; k < lags.length; k++) {
      sums[k]! += productSum(z, lags[k]!);
      pairs[k]! += productSum(counts, lags[k]!);
    }
  }
  return { lags, covariance: sums.map((sum, k) => sum / pairs[k]!), pairs, variance: squares / pixels, pixels, pixelsPerLine: pixels / filled };
}

/** Σ values[c]·values[c − lag]; what does not count is 0 in both factors, which spares a branch. */
function productSum(values: Float64Array, lag: number): number {
  let sum = 0;
  for (let c = lag; c < values.length; c++) sum += values[c]! * values[c - lag]!;
  return sum;
}

/** Mean height of each terrace (index: number + 128), or of all in entry 0; NaN where too little is seen. */
function levelsOf(height: Float32Array, columns: number, taken: readonly number[], mask: Uint8Array, terraces: Int8Array | undefined): Float64Array {
  const sums = new Float64Array(256);
  const counts = new Float64Array(256);
  for (const r of taken) {
    for (let i = r * columns; i < (r + 1) * columns; i++) {
      if (mask[i] !== 1 || Number.isNaN(height[i]!)) continue;
      const level = terraces ? terraces[i]! + 128 : 0;
      sums[level]! += height[i]!;
      counts[level]!++;
    }
  }
  const unknown = terraces ? 0 : -1;
  return sums.map((sum, level) => (level === unknown || counts[level]! < (terraces ? leastOfLevel : 1) ? Number.NaN : sum / counts[level]!));
}

function distances(most: number): Int32Array {
  const lags: number[] = [];
  for (let lag = 1; lag <= most; lag = Math.max(lag + 1, Math.round(lag * 1.2))) lags.push(lag);
  return Int32Array.from(lags);
}
