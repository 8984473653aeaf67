/**
 * Solves A·x = b for a symmetric positive definite band matrix by Cholesky factorisation
 * (Golub & Van Loan, Matrix Computations, 4th ed., algorithm 4.3.5).
 *
 * @param band `band[i * (width + 1) + k]` holds A[i][i − k] for k = 0…width; entries left of column 0 are ignored. Overwritten.
 * @param right right-hand side, length n; overwritten with the solution and returned.
 * @returns the solution; entries are NaN where a pivot is not positive.
 */
export function solveBand(band: Float64Array, width: number, right: Float64Array): Float64Array {
  const n = right.length;
  const stride = width + 1;
  const at = (i: number, k: number): number => band[i * stride + k] ?? 0;
  for (let i = 0; i < n; i++) {
    const first = Math.max(0, i - width);
    for (let j = first; j <= i; j++) {
      let sum = at(i, i - j);
      for (let k = Math.max(first, j - width); k < j; k++) sum -= at(i, i - k) * at(j, j - k);
      band[i * stride + (i - j)] = j === i ? Math.sqrt(sum) : sum / at(j, 0);
    }
  }
  for (let i = 0; i < n; i++) {
    let sum = right[i] ?? 0;
    for (let k = 1; k <= Math.min(width, i); k++) sum -= at(i, k) * (right[i - k] ?? 0);
    right[i] = sum / at(i, 0);
  }
  for (let i = n - 1; i >= 0; i--) {
    let sum = right[i] ?? 0;
    for (let k = 1; k <= Math.min(width, n - 1 - i); k++) sum -= at(i + k, k) * (right[i + k] ?? 0);
    right[i] = sum / at(i, 0);
  }
  return right;
}
