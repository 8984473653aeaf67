import { presentValues, selectInPlace } from './select.ts';

/**
 * Quantile of type 7 (linear between order statistics, position (n−1)·p; Hyndman & Fan,
 * Am. Stat. 50, 361, 1996). NaN values are left out; NaN when nothing is left or p is outside
 * 0–1. The input is not changed.
 */
export function quantile(values: ArrayLike<number>, p: number): number {
  const present = presentValues(values);
  const count = present.length;
  if (count === 0 || !(p >= 0 && p <= 1)) return Number.NaN;
  const position = (count - 1) * p;
  const below = Math.floor(position);
  const low = selectInPlace(present, below);
  if (below === count - 1 || position === below) return low;
  // Everything after `below` is at least `low`: the next order statistic is the smallest of it.
  let next = Number.POSITIVE_INFINITY;
  for (let k = below + 1; k < count; k++) if (present[k]! < next) next = present[k]!;
  return low + (position - below) * (next - low);
}
