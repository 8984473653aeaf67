import { presentValues, selectInPlace } from './select.ts';

/** Median; NaN values are left out, the mean of the middle two for an even count, NaN when nothing is left. The input is not changed. */
export function median(values: ArrayLike<number>): number {
  return medianInPlace(presentValues(values));
}

/** Median of the first `length` numbers, which are rearranged and must hold no NaN; NaN for none. */
export function medianInPlace(values: Float32Array | Float64Array, length = values.length): number {
  if (length === 0) return Number.NaN;
  const half = length >>> 1;
  const upper = selectInPlace(values, half, length);
  if (length % 2 === 1) return upper;
  // Everything before `half` is at most `upper`: the lower middle is the largest of it.
  let lower = Number.NEGATIVE_INFINITY;
  for (let k = 0; k < half; k++) if (values[k]! > lower) lower = values[k]!;
  return lower + (upper - lower) / 2;
}
