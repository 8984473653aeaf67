export interface Histogram {
  readonly counts: Uint32Array;
  /** Lower edge of the first bin. */
  readonly from: number;
  readonly binWidth: number;
}

/**
 * Counts in equal bins from `from` to `to` (by default the smallest and largest value). A value on
 * an inner edge belongs to the bin above, `to` itself to the last bin. NaN, infinite values and values outside are
 * left out. Without any value the range is 0 to 1; equal ends are widened to a range of 1.
 */
export function histogram(values: ArrayLike<number>, bins: number, from?: number, to?: number): Histogram {
  let low = from ?? Number.POSITIVE_INFINITY;
  let high = to ?? Number.NEGATIVE_INFINITY;
  if (from === undefined || to === undefined) {
    for (let k = 0; k < values.length; k++) {
      const value = values[k]!;
      if (!Number.isFinite(value)) continue;
      if (from === undefined && value < low) low = value;
      if (to === undefined && value > high) high = value;
    }
  }
  if (!Number.isFinite(low)) low = Number.isFinite(high) ? high - 1 : 0;
  if (!Number.isFinite(high) || high <= low) high = low + 1;
  const counts = new Uint32Array(bins);
  const perUnit = bins / (high - low);
  for (let k = 0; k < values.length; k++) {
    const value = values[k]!;
    if (!(value >= low && value <= high)) continue;
    const bin = Math.min(bins - 1, Math.floor((value - low) * perUnit));
    counts[bin] = counts[bin]! + 1;
  }
  return { counts, from: low, binWidth: 1 / perUnit };
}
