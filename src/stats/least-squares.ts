/**
 * Linear least squares by Householder QR with scaled columns and iterative refinement of the
 * augmented system (Å. Björck, Numerical Methods for Least Squares Problems, SIAM 1996, sections
 * 2.3 and 2.9): the residuals that drive the refinement are carried in double-double.
 */
import { residualOf } from './double-double.ts';

export interface LeastSquares {
  readonly coefficients: Float64Array;
  /** Standard deviation of each coefficient; NaN when there are no degrees of freedom left. */
  readonly standardErrors: Float64Array;
  /** Residual standard deviation, √(Σr²/(n−p)). */
  readonly residualSd: number;
  /** 1 − Σr²/Σ(y−ȳ)², or over Σy² for a fit without a constant. */
  readonly rSquared: number;
  readonly degreesOfFreedom: number;
  readonly residuals: Float64Array;
  /** Row-major p × p matrix C with covariance = residualSd²·C·Cᵀ. */
  readonly covarianceRoot: Float64Array;
}

/**
 * Fits y ≈ Σ b_j·columns[j]. `constant` says whether the columns span a constant (R² is then
 * about the mean). All NaN when the columns are linearly dependent to working precision or an input
 * is NaN. Throws a RangeError for columns of unequal length or more columns than values.
 */
export function leastSquares(columns: readonly ArrayLike<number>[], y: ArrayLike<number>, constant: boolean): LeastSquares {
  const n = y.length;
  const p = columns.length;
  if (p === 0 || p > n) throw new RangeError(`a fit of ${p} coefficients needs at least as many values, got ${n}`);
  for (const column of columns) if (column.length !== n) throw new RangeError(`a column has ${column.length} values, expected ${n}`);

  // Powers of two as scales keep every scaled number exact.
  const scales = columns.map((column) => 2 ** -Math.floor(Math.log2(largest(column)) || 0));
  const matrix = columns.map((column, j) => Float64Array.from(column, (value) => value * scales[j]!));
  const factors = householder(matrix.map((column) => column.slice()), n);
  if (factors === undefined) return undetermined(n, p);

  const b = new Float64Array(p);
  const r = new Float64Array(n);
  // Round 0 solves from zero; the next rounds solve for what is left of both halves of
  // [I A; Aᵀ 0]·[r; b] = [y; 0].
  for (let round = 0; round < 4; round++) {
    const f = new Float64Array(n);
    for (let i = 0; i < n; i++) f[i] = residualOf(y[i]!, (k) => (k < p ? matrix[k]![i]! : 1), (k) => (k < p ? b[k]! : r[i]!), p + 1);
    const g = new Float64Array(p);
    for (let j = 0; j < p; j++) g[j] = residualOf(0, (k) => matrix[j]![k]!, (k) => r[k]!, n);
    const step = solveAugmented(factors, f, g, n, p);
    for (let j = 0; j < p; j++) b[j] = b[j]! + step[j]!;
    for (let i = 0; i < n; i++) r[i] = r[i]! + f[i]!;
  }

  const squares = residualOf(0, (k) => -r[k]!, (k) => r[k]!, n);
  const degreesOfFreedom = n - p;
  const residualSd = degreesOfFreedom > 0 ? Math.sqrt(squares / degreesOfFreedom) : Number.NaN;
  const covarianceRoot = inverseUpper(factors, p, scales);
  const standardErrors = Float64Array.from({ length: p }, (_, j) => residualSd * Math.hypot(...covarianceRoot.subarray(j * p, (j + 1) * p)));
  return {
    coefficients: b.map((value, j) => value * scales[j]!),
    standardErrors,
    residualSd,
    rSquared: 1 - squares / totalSquares(y, constant),
    degreesOfFreedom,
    residuals: r,
    covarianceRoot,
  };
}

interface Factors {
  /** Reflection vectors (each of length n, zero above its own row, squared length 2) and R's columns. */
  readonly vectors: readonly Float64Array[];
  readonly r: readonly Float64Array[];
}

/** QR of the columns (overwritten); undefined when a column depends on those before it. */
function householder(columns: Float64Array[], n: number): Factors | undefined {
  const vectors: Float64Array[] = [];
  for (let j = 0; j < columns.length; j++) {
    const column = columns[j]!;
    let gone = 0;
    let left = 0;
    for (let i = 0; i < j; i++) gone += column[i]! ** 2;
    for (let i = j; i < n; i++) left += column[i]! ** 2;
    const norm = Math.sqrt(left);
    if (!(norm > n * Number.EPSILON * Math.sqrt(gone + left))) return undefined;
    const vector = new Float64Array(n);
    for (let i = j; i < n; i++) vector[i] = column[i]!;
    vector[j] = vector[j]! + (column[j]! < 0 ? -norm : norm);
    let length = 0;
    for (let i = j; i < n; i++) length += vector[i]! ** 2;
    const scale = Math.sqrt(2 / length);
    for (let i = j; i < n; i++) vector[i] = vector[i]! * scale;
    vectors.push(vector);
    for (let k = j; k < columns.length; k++) reflect(vector, columns[k]!, j, n);
  }
  return { vectors, r: columns };
}

function reflect(vector: Float64Array, target: Float64Array, from: number, n: number): void {
  let dot = 0;
  for (let i = from; i < n; i++) dot += vector[i]! * target[i]!;
  for (let i = from; i < n; i++) target[i] = target[i]! - dot * vector[i]!;
}

/** Solves r + A b = f, Aᵀ r = g; `f` is overwritten by r, b is returned. */
function solveAugmented({ vectors, r }: Factors, f: Float64Array, g: Float64Array, n: number, p: number): Float64Array<ArrayBuffer> {
  const h = new Float64Array(p);
  for (let j = 0; j < p; j++) {
    let value = g[j]!;
    for (let k = 0; k < j; k++) value -= r[j]![k]! * h[k]!;
    h[j] = value / r[j]![j]!;
  }
  vectors.forEach((vector, j) => reflect(vector, f, j, n));
  const b = new Float64Array(p);
  for (let j = p - 1; j >= 0; j--) {
    let value = f[j]! - h[j]!;
    for (let k = j + 1; k < p; k++) value -= r[k]![j]! * b[k]!;
    b[j] = value / r[j]![j]!;
  }
  f.set(h);
  for (let j = p - 1; j >= 0; j--) reflect(vectors[j]!, f, j, n);
  return b;
}

/** Inverse of R with the column scales put back, row-major. */
function inverseUpper({ r }: Factors, p: number, scales: readonly number[]): Float64Array {
  const inverse = new Float64Array(p * p);
  for (let column = 0; column < p; column++) {
    for (let j = column; j >= 0; j--) {
      let value = j === column ? 1 : 0;
      for (let k = j + 1; k <= column; k++) value -= r[k]![j]! * inverse[k * p + column]!;
      inverse[j * p + column] = value / r[j]![j]!;
    }
  }
  return inverse.map((value, k) => value * scales[Math.floor(k / p)]!);
}

function totalSquares(y: ArrayLike<number>, constant: boolean): number {
  let centre = 0;
  if (constant) {
    for (let k = 0; k < y.length; k++) centre += y[k]! / y.length;
  }
  let sum = 0;
  for (let k = 0; k < y.length; k++) sum += (y[k]! - centre) ** 2;
  return sum;
}

function largest(values: ArrayLike<number>): number {
  let top = 0;
  for (let k = 0; k < values.length; k++) top = Math.max(top, Math.abs(values[k]!));
  return top;
}

function undetermined(n: number, p: number): LeastSquares {
  const none = (length: number): Float64Array => new Float64Array(length).fill(Number.NaN);
  return { coefficients: none(p), standardErrors: none(p), residualSd: Number.NaN, rSquared: Number.NaN, degreesOfFreedom: n - p, residuals: none(n), covarianceRoot: none(p * p) };
}
