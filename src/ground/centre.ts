/** Location and width of the ground in a mixture of ground and features that stand above it. */
import { madScale } from '../stats/mad.ts';

/**
 * Most common value: half-sample mode (Bickel & Frühwirth, Comput. Stat. Data Anal. 50, 3500, 2006), which
 * keeps halving to the narrowest half. Needs finite values; NaN for an empty sample. The input is not changed.
 */
export function mostCommon(sample: Float64Array): number {
  return modeOfSorted(sample.slice().sort());
}

/**
 * The most common value with the robust standard deviation from the values below it only: 1.4826 × their median distance, 0 for none. One sort
 * serves both. Needs finite values; a centre of NaN for an empty sample. The input is not changed.
 */
export function centreAndScatter(sample: Float64Array): { centre: number; scatter: number } {
  const sorted = sample.slice().sort();
  const centre = modeOfSorted(sorted);
  const below = countBelow(sorted, centre);
  // In the order of their distances the values below are those of the sample backwards.
  return { centre, scatter: below === 0 ? 0 : madScale * (centre - sorted[below - 1 - (below >> 1)]!) };
}

function modeOfSorted(sorted: Float64Array): number {
  if (sorted.length === 0) return Number.NaN;
  let from = 0;
  let length = sorted.length;
  while (length > 64) {
    const half = Math.ceil(length / 2);
    from = narrowest(sorted, from, length, half);
    length = half;
  }
  return sorted[from + (length >> 1)]!;
}

/** Where the narrowest `half` of `length` values from `from` on begins. */
function narrowest(sorted: Float64Array, from: number, length: number, half: number): number {
  let best = from;
  let width = Number.POSITIVE_INFINITY;
  for (let i = from; i + half <= from + length; i++) {
    const w = sorted[i + half - 1]! - sorted[i]!;
    if (w < width) {
      width = w;
      best = i;
    }
  }
  return best;
}

function countBelow(sorted: Float64Array, limit: number): number {
  let low = 0;
  let high = sorted.length;
  while (low < high) {
    const middle = (low + high) >>> 1;
    if (sorted[middle]! < limit) low = middle + 1;
    else high = middle;
  }
  return low;
}
