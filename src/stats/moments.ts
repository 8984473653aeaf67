/** Mean, standard deviation and serial correlation, kept exact where a large mean hides a small scatter. */

/** Neumaier's compensated sum (Z. Angew. Math. Mech. 54, 39, 1974) of `term(k)`. */
function sumOf(count: number, term: (k: number) => number): number {
  let sum = 0;
  let lost = 0;
  for (let k = 0; k < count; k++) {
    const value = term(k);
    const next = sum + value;
    lost += Math.abs(sum) >= Math.abs(value) ? sum - next + value : value - next + sum;
    sum = next;
  }
  return sum + lost;
}

/** Arithmetic mean; NaN for no values and when any is NaN. */
export function mean(values: ArrayLike<number>): number {
  const count = values.length;
  if (count === 0) return Number.NaN;
  // Summing deviations from the first value keeps the digits that a large common part would take.
  const origin = values[0]!;
  return origin + sumOf(count, (k) => values[k]! - origin) / count;
}

/**
 * Sample standard deviation (n − 1) by two passes with Björck's correction (Chan, Golub & LeVeque,
 * Am. Stat. 37, 242, 1983). NaN for fewer than two values and when any is NaN.
 */
export function standardDeviation(values: ArrayLike<number>): number {
  const count = values.length;
  if (count < 2) return Number.NaN;
  const centre = mean(values);
  const squares = sumOf(count, (k) => (values[k]! - centre) ** 2);
  const rest = sumOf(count, (k) => values[k]! - centre);
  return Math.sqrt(Math.max(0, squares - (rest * rest) / count) / (count - 1));
}

/** Lag-1 autocorrelation Σ(yᵢ−ȳ)(yᵢ₊₁−ȳ)/Σ(yᵢ−ȳ)², as NIST's StRD defines it. NaN for fewer than two values, no scatter, or any NaN. */
export function lag1Autocorrelation(values: ArrayLike<number>): number {
  const count = values.length;
  if (count < 2) return Number.NaN;
  const centre = mean(values);
  const products = sumOf(count - 1, (k) => (values[k]! - centre) * (values[k + 1]! - centre));
  return products / sumOf(count, (k) => (values[k]! - centre) ** 2);
}
