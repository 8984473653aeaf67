/** Location and width of the ground in a mixture of ground and features that stand above it. */
import { madScale } from '../stats/mad.ts';

/**
 * Most common value: half-sample mode (Bickel & Frühwirth, Comput. Stat. Data Anal. 50, 3500, 2006), which
 * keeps halving to the narrowest half. Needs finite values; NaN for an empty sample. The input is not changed.
 */
export function mostCommon(sample: Float64Array): number {
  if (sample.length === 0) return Number.NaN;
  const sorted = Float64Array.from(sample).sort();
  let from = 0;
  let length = sorted.length;
  while (length > 64) {
    const half = Math.ceil(length / 2);
    let best = from;
    let width = Number.POSITIVE_INFINITY;
    for (let i = from; i + half <= from + length; i++) {
      const w = sorted[i + half - 1]! - sorted[i]!;
      if (w < width) {
        width = w;
        best = i;
      }
    }
    from = best;
    length = half;
  }
  return sorted[from + (length >> 1)]!;
}

/** Robust standard deviation from the values below `centre` only: 1.4826 × their median distance. 0 for none. */
export function lowerScatter(sample: Float64Array, centre: number): number {
  const below = sample.filter((value) => value < centre).map((value) => centre - value).sort();
  return below.length === 0 ? 0 : madScale * below[below.length >> 1]!;
}
