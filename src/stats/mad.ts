import { medianInPlace } from './median.ts';
import { presentValues } from './select.ts';

/** 1/Φ⁻¹(3/4): what the MAD of normal numbers is multiplied by to give their standard deviation. */
export const madScale = 1.482602218505602;

/** Median absolute deviation from the median, unscaled, with that median. NaN values are left out; NaN when nothing is left. The input is not changed. */
export function medianAbsoluteDeviation(values: ArrayLike<number>): { median: number; mad: number } {
  const present = presentValues(values);
  const centre = medianInPlace(present);
  for (let k = 0; k < present.length; k++) present[k] = Math.abs(present[k]! - centre);
  return { median: centre, mad: medianInPlace(present) };
}

/** Robust standard deviation: the MAD times 1.4826 (Hampel, J. Am. Stat. Assoc. 69, 383, 1974). */
export function scaledMad(values: ArrayLike<number>): number {
  return madScale * medianAbsoluteDeviation(values).mad;
}
