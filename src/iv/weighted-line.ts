/** Weighted straight line through a Fowler–Nordheim plot with noise that is partly constant, partly proportional. */
import { solveBand } from '../stats/cholesky.ts';
import { findRoot } from '../stats/root.ts';

export interface WeightedLine {
  /** V, and its standard error. */
  readonly slope: number;
  readonly slopeSe: number;
  readonly intercept: number;
  readonly interceptSe: number;
  /** Covariance of slope and intercept. */
  readonly covariance: number;
  /** Proportional noise that explains the scatter, standard deviation of ln I. */
  readonly share: number;
  readonly points: number;
}

/** Beyond this many standard errors of no correlation (1/√n) neighbouring residuals count as correlated. */
const correlatedErrors = 2;

/**
 * Fits y = intercept + slope·x by least squares with weights 1/(share² + (constantA/I)²), I from the
 * line itself (so that a point's noise does not choose its weight; four rounds). `share` is such that the
 * weighted squares equal their degrees of freedom (Mandel & Paule, Anal. Chem. 42, 1194, 1970). The mean of
 * ln(I + noise) lies constantA²/2I² below ln I, which is put back. Errors that all points share, those of
 * the offset and ohmic part that were taken off, are further unknowns with a standard normal prior.
 * Slow noise: where residuals of points taken one after the other correlate, both errors grow by
 * √((1+ρ)/(1−ρ)) (Bayley & Hammersley, J. R. Stat. Soc. Suppl. 8, 184, 1946, for a first-order process).
 *
 * @param y ln(I/V²) over x = 1/V, at least three points.
 * @param index order in which the points were taken.
 * @param sharedErrorsA for each shared error what one standard deviation of it does to every current, A.
 */
export function weightedLine(x: Float64Array, y: Float64Array, index: Int32Array, constantA: number, sharedErrorsA: readonly Float64Array[] = []): WeightedLine {
  let current = y.map((value, k) => Math.exp(value - 2 * Math.log(x[k]!)));
  let setting = settingOf(x, y, current, constantA, sharedErrorsA);
  let share = 0;
  let fit = solve(setting, 0);
  for (let round = 0; round < 4; round++) {
    share = shareOf(setting);
    fit = solve(setting, share);
    current = x.map((value) => Math.exp(fit.intercept + fit.slope * value - 2 * Math.log(value)));
    setting = settingOf(x, y, current, constantA, sharedErrorsA);
  }
  const grown = correlationFactor(Array.from(index.keys()).sort((a, b) => index[a]! - index[b]!).map((k) => fit.residuals[k]!));
  const { slope, intercept } = fit;
  return { slope, slopeSe: fit.slopeSe * grown, intercept, interceptSe: fit.interceptSe * grown, covariance: fit.covariance * grown ** 2, share, points: x.length };
}

interface Setting {
  readonly x: Float64Array;
  /** With the mean loss of ln(I + noise) put back. */
  readonly y: Float64Array;
  /** Constant noise over current. */
  readonly relative: Float64Array;
  /** Shared errors over current. */
  readonly shared: readonly Float64Array[];
}

function settingOf(x: Float64Array, y: Float64Array, current: Float64Array, constantA: number, sharedErrorsA: readonly Float64Array[]): Setting {
  const relative = current.map((value) => constantA / value);
  return { x, y: y.map((value, k) => value + relative[k]! ** 2 / 2), relative, shared: sharedErrorsA.map((values) => values.map((value, k) => value / current[k]!)) };
}

interface Solved {
  readonly slope: number;
  readonly slopeSe: number;
  readonly intercept: number;
  readonly interceptSe: number;
  readonly covariance: number;
  /** Weighted squares with those of the shared errors. */
  readonly squares: number;
  /** Over their standard deviations. */
  readonly residuals: Float64Array;
}

/** Normal equations about the weighted means, where constant and slope do not mix. */
function solve({ x, y, relative, shared }: Setting, share: number): Solved {
  const weight = relative.map((value) => 1 / (share ** 2 + value ** 2 + 1e-24));
  const total = weight.reduce((sum, value) => sum + value, 0);
  const mean = (values: Float64Array): number => values.reduce((sum, value, k) => sum + (value * weight[k]!) / total, 0);
  const meanX = mean(x);
  const meanY = mean(y);
  const columns = [x.map(() => 1), x.map((value) => value - meanX), ...shared];
  const p = columns.length;
  const heights = y.map((value) => value - meanY);
  const product = (a: Float64Array, b: Float64Array): number => a.reduce((sum, value, k) => sum + value * b[k]! * weight[k]!, 0);
  const matrix = (): Float64Array => {
    const band = new Float64Array(p * p);
    for (let i = 0; i < p; i++) for (let k = 0; k <= i; k++) band[i * p + k] = product(columns[i]!, columns[i - k]!) + (k === 0 && i >= 2 ? 1 : 0);
    return band;
  };
  const unit = (at: number): Float64Array => Float64Array.from({ length: p }, (_, k) => (k === at ? 1 : 0));
  const found = solveBand(matrix(), p - 1, Float64Array.from(columns, (column) => product(column, heights)));
  const ofLevel = solveBand(matrix(), p - 1, unit(0));
  const ofSlope = solveBand(matrix(), p - 1, unit(1));
  const residuals = heights.map((value, k) => (value - columns.reduce((sum, column, j) => sum + column[k]! * found[j]!, 0)) * Math.sqrt(weight[k]!));
  const slope = found[1]!;
  // intercept = level − slope·meanX.
  const covariance = ofSlope[0]! - meanX * ofSlope[1]!;
  return {
    slope, slopeSe: Math.sqrt(ofSlope[1]!), intercept: meanY + found[0]! - slope * meanX, covariance,
    interceptSe: Math.sqrt(Math.max(0, ofLevel[0]! - 2 * meanX * ofLevel[1]! + meanX ** 2 * ofSlope[1]!)),
    squares: residuals.reduce((sum, value) => sum + value ** 2, 0) + found.subarray(2).reduce((sum, value) => sum + value ** 2, 0),
    residuals,
  };
}

/** The proportional noise at which the weighted squares equal the degrees of freedom; 0 where the constant noise explains more than enough. */
function shareOf(setting: Setting): number {
  const degrees = setting.x.length - 2;
  const excess = (share: number): number => solve(setting, share).squares - degrees;
  if (degrees < 1 || !(excess(0) > 0)) return 0;
  let high = 1e-9;
  while (high < 1e3 && excess(high) > 0) high *= 10;
  return findRoot(excess, high === 1e-9 ? 0 : high / 10, high, 1e-4) || 0;
}

/** 1 where neighbours are not seen to correlate. */
function correlationFactor(residuals: readonly number[]): number {
  const n = residuals.length;
  let products = 0;
  let squares = 0;
  for (let k = 0; k < n; k++) {
    squares += residuals[k]! ** 2;
    if (k > 0) products += residuals[k]! * residuals[k - 1]!;
  }
  const correlation = squares > 0 ? products / squares : 0;
  if (n < 12 || !(correlation > correlatedErrors / Math.sqrt(n))) return 1;
  const bounded = Math.min(correlation, 0.95);
  return Math.sqrt((1 + bounded) / (1 - bounded));
}
