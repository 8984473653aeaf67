/** Polynomial through points, fitted in a centred and scaled variable. */
import { leastSquares } from './least-squares.ts';
import type { LeastSquares } from './least-squares.ts';

/**
 * Least-squares polynomial of `degree` in x; coefficients by rising power of x itself. The fit is
 * made in z = (x − c)/h with h a power of two and c a multiple of h/16, so that z costs no rounding
 * that matters, and is then expanded back together with its covariance. Residuals, R² and errors as
 * `leastSquares`; all NaN when the points do not determine the polynomial.
 */
export function polynomialFit(x: ArrayLike<number>, y: ArrayLike<number>, degree: number): LeastSquares {
  let low = Number.POSITIVE_INFINITY;
  let high = Number.NEGATIVE_INFINITY;
  for (let k = 0; k < x.length; k++) {
    low = Math.min(low, x[k]!);
    high = Math.max(high, x[k]!);
  }
  const h = 2 ** Math.round(Math.log2((high - low) / 2 || 1));
  const c = (Math.round((8 * (low + high)) / h) * h) / 16;
  const z = Float64Array.from(x, (value) => (value - c) / h);
  const columns: Float64Array[] = [new Float64Array(x.length).fill(1)];
  for (let power = 1; power <= degree; power++) columns.push(columns[power - 1]!.map((value, k) => value * z[k]!));
  const fit = leastSquares(columns, y, true);

  const p = degree + 1;
  const expansion = shiftMatrix(c, h, p);
  const coefficients = new Float64Array(p);
  const covarianceRoot = new Float64Array(p * p);
  for (let row = 0; row < p; row++) {
    for (let k = row; k < p; k++) {
      const factor = expansion[row * p + k]!;
      coefficients[row] = coefficients[row]! + factor * fit.coefficients[k]!;
      for (let column = k; column < p; column++) covarianceRoot[row * p + column] = covarianceRoot[row * p + column]! + factor * fit.covarianceRoot[k * p + column]!;
    }
  }
  const standardErrors = Float64Array.from({ length: p }, (_, row) => fit.residualSd * Math.hypot(...covarianceRoot.subarray(row * p, (row + 1) * p)));
  return { ...fit, coefficients, covarianceRoot, standardErrors };
}

/** Row-major matrix that turns coefficients of ((x−c)/h)^k into coefficients of x^row: binomial(k,row)·(−c)^(k−row)/h^k. */
function shiftMatrix(c: number, h: number, p: number): Float64Array {
  const matrix = new Float64Array(p * p);
  for (let k = 0; k < p; k++) {
    let binomial = 1;
    for (let row = k; row >= 0; row--) {
      matrix[row * p + k] = (binomial * (-c) ** (k - row)) / h ** k;
      binomial = (binomial * row) / (k - row + 1);
    }
  }
  return matrix;
}
