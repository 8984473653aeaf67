/** A generalised least-squares fit. */
export interface GeneralisedFit {
  /** One per column of the design. */
  readonly coefficients: Float64Array;
  /** Standard errors with the estimated scale. */
  readonly standardErrors: Float64Array;
  /** Variance that the given correlation is multiplied by, from the weighted residuals. */
  readonly scale: number;
  /** Restricted log likelihood without its constants: comparable between correlations of the same data and design. */
  readonly logLikelihood: number;
}

/**
 * Fits `values` = design · coefficients + error, where the errors have the given correlation up to a common scale (Aitken, Proc. R. Soc.
 * Edinburgh 55, 42, 1936), with the restricted likelihood by which correlations can be compared (Patterson & Thompson, Biometrika 58,
 * 545, 1971).
 *
 * @param correlation n × n, symmetric positive definite, row-major; only the lower half is read. Overwritten with its Cholesky factor.
 * @param design n × p, row-major.
 * @param values length n, no NaN.
 * @returns undefined where n ≤ p, or the correlation or the design is not of full rank.
 */
export function generalisedLeastSquares(correlation: Float64Array, design: Float64Array, values: Float64Array): GeneralisedFit | undefined {
  const n = values.length;
  const p = n === 0 ? 0 : design.length / n;
  if (n <= p || p === 0 || !factorise(correlation, n)) return undefined;
  // Whitened columns: the design's, then the values.
  const white = new Float64Array(n * (p + 1));
  for (let i = 0; i < n; i++) {
    for (let k = 0; k < p; k++) white[i * (p + 1) + k] = design[i * p + k]!;
    white[i * (p + 1) + p] = values[i]!;
  }
  forward(correlation, n, white, p + 1);
  const normal = new Float64Array(p * p);
  const right = new Float64Array(p);
  let squares = 0;
  for (let i = 0, at = 0; i < n; i++, at += p + 1) {
    const value = white[at + p]!;
    squares += value * value;
    for (let k = 0; k < p; k++) {
      const a = white[at + k]!;
      if (a === 0) continue;
      right[k]! += a * value;
      for (let j = 0; j <= k; j++) normal[k * p + j]! += a * white[at + j]!;
    }
  }
  const largest = Math.max(...Array.from({ length: p }, (_, k) => normal[k * p + k]!));
  if (!factorise(normal, p, 1e-12 * largest)) return undefined;
  // right = Lᵀ⁻¹ (L⁻¹ Xᵀ W y); the middle part takes the explained squares.
  forward(normal, p, right, 1);
  for (let k = 0; k < p; k++) squares -= right[k]! ** 2;
  const scale = Math.max(0, squares) / (n - p);
  const inverse = inverseFactor(normal, p);
  const coefficients = new Float64Array(p);
  const standardErrors = new Float64Array(p);
  for (let k = 0; k < p; k++) {
    let sum = 0;
    let variance = 0;
    for (let j = k; j < p; j++) {
      sum += inverse[j * p + k]! * right[j]!;
      variance += inverse[j * p + k]! ** 2;
    }
    coefficients[k] = sum;
    standardErrors[k] = Math.sqrt(scale * variance);
  }
  const logLikelihood = -0.5 * (n - p) * Math.log(scale) - logDiagonal(correlation, n) - logDiagonal(normal, p);
  return { coefficients, standardErrors, scale, logLikelihood };
}

/** Cholesky factor in the lower half, in place; false where a pivot is not above `least`. */
function factorise(a: Float64Array, n: number, least = 0): boolean {
  for (let i = 0; i < n; i++) {
    const ri = i * n;
    for (let j = 0; j < i; j++) {
      const rj = j * n;
      let sum = a[ri + j]!;
      for (let k = 0; k < j; k++) sum -= a[ri + k]! * a[rj + k]!;
      a[ri + j] = sum / a[rj + j]!;
    }
    let pivot = a[ri + i]!;
    for (let k = 0; k < i; k++) pivot -= a[ri + k]! ** 2;
    if (!(pivot > least)) return false;
    a[ri + i] = Math.sqrt(pivot);
  }
  return true;
}

/** Solves L·x = b for `width` columns at once, in place. */
function forward(factor: Float64Array, n: number, columns: Float64Array, width: number): void {
  for (let i = 0; i < n; i++) {
    for (let k = 0; k < i; k++) {
      const l = factor[i * n + k]!;
      if (l === 0) continue;
      for (let c = 0; c < width; c++) columns[i * width + c]! -= l * columns[k * width + c]!;
    }
    const pivot = factor[i * n + i]!;
    for (let c = 0; c < width; c++) columns[i * width + c]! /= pivot;
  }
}

function inverseFactor(factor: Float64Array, n: number): Float64Array {
  const identity = new Float64Array(n * n);
  for (let i = 0; i < n; i++) identity[i * n + i] = 1;
  forward(factor, n, identity, n);
  return identity;
}

function logDiagonal(factor: Float64Array, n: number): number {
  let sum = 0;
  for (let i = 0; i < n; i++) sum += Math.log(factor[i * n + i]!);
  return sum;
}
