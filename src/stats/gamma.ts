/** Regularised incomplete gamma function, its inverse, and what follows from it. */
import { findRoot } from './root.ts';

// Lanczos' approximation, g = 7, nine terms (C. Lanczos, SIAM J. Numer. Anal. B 1, 86, 1964; coefficients by P. Godfrey, 2001).
const lanczos = [
  0.99999999999980993, 676.5203681218851, -1259.1392167224028, 771.32342877765313, -176.61502916214059, 12.507343278686905,
  -0.13857109526572012, 9.9843695780195716e-6, 1.5056327351493116e-7,
];

/** ln Γ(x) for x > 0, to about 1e-14 of 1 + |ln Γ|; NaN for x ≤ 0. */
export function lnGamma(x: number): number {
  if (!(x > 0)) return Number.NaN;
  if (x < 0.5) return Math.log(Math.PI / Math.sin(Math.PI * x)) - lnGamma(1 - x);
  let sum = lanczos[0]!;
  for (let k = 1; k < lanczos.length; k++) sum += lanczos[k]! / (x - 1 + k);
  const t = x + 6.5;
  return 0.5 * Math.log(2 * Math.PI) + (x - 0.5) * Math.log(t) - t + Math.log(sum);
}

/** P(a, x), the lower regularised incomplete gamma function, a > 0, x ≥ 0; NaN outside. */
export function gammaP(a: number, x: number): number {
  return x < a + 1 ? series(a, x) : 1 - fraction(a, x);
}

/** Q(a, x) = 1 − P(a, x) without loss of digits in the upper tail. */
export function gammaQ(a: number, x: number): number {
  return x < a + 1 ? 1 - series(a, x) : fraction(a, x);
}

/** Power series (Abramowitz & Stegun 6.5.29, 1964). */
function series(a: number, x: number): number {
  if (!(a > 0 && x >= 0)) return Number.NaN;
  if (x === 0) return 0;
  let term = 1 / a;
  let sum = term;
  for (let n = 1; n < 100000; n++) {
    term *= x / (a + n);
    sum += term;
    if (term < sum * 1e-17) break;
  }
  return sum * Math.exp(a * Math.log(x) - x - lnGamma(a));
}

/** Continued fraction (Abramowitz & Stegun 6.5.31) by Lentz' method (Appl. Opt. 15, 668, 1976). */
function fraction(a: number, x: number): number {
  if (!(a > 0)) return Number.NaN;
  if (x === Number.POSITIVE_INFINITY) return 0;
  const tiny = 1e-300;
  let b = x + 1 - a;
  let c = 1 / tiny;
  let d = 1 / b;
  let value = d;
  for (let n = 1; n < 100000; n++) {
    const numerator = n * (a - n);
    b += 2;
    d = 1 / (b + numerator * d || tiny);
    c = b + numerator / c || tiny;
    const factor = c * d;
    value *= factor;
    if (Math.abs(factor - 1) < 1e-16) break;
  }
  return value * Math.exp(a * Math.log(x) - x - lnGamma(a));
}

/**
 * x at which P(a, x) = p, to about 1e-12; 0 at p = 0, Infinity at p = 1, NaN outside. Solved in
 * whichever tail is the smaller.
 */
export function inverseGammaP(a: number, p: number): number {
  if (!(a > 0 && p >= 0 && p <= 1)) return Number.NaN;
  if (p === 0) return 0;
  if (p === 1) return Number.POSITIVE_INFINITY;
  const excess = p < 0.5 ? (x: number) => gammaP(a, x) - p : (x: number) => 1 - p - gammaQ(a, x);
  let high = a + 10;
  while (excess(high) < 0) high *= 2;
  return findRoot(excess, 0, high, 1e-15);
}

/** Quantile of the chi-square distribution with `degrees` of freedom (any positive number). */
export function chiSquareQuantile(p: number, degrees: number): number {
  return 2 * inverseGammaP(degrees / 2, p);
}
