/** One step of a least-squares registration, and the error at its end. */

/** Side of the squares within which residuals may depend on each other, pixels. */
const clusterPx = 24;
/** Unknowns of the fit: shift in x and y, factor, level. */
const unknowns = 4;

/** The change of the shift by one step of Gauss and Newton; undefined where the pixels do not determine it. */
export function shiftStep(reference: Float32Array, moved: Float32Array, columns: number, places: Uint32Array, dx: number, dy: number): { dx: number; dy: number } | undefined {
  const normal = new Float64Array(unknowns * unknowns);
  const right = new Float64Array(unknowns);
  const row = new Float64Array(unknowns);
  const shift = interpolation(columns, dx, dy);
  for (const i of places) {
    const value = designAt(reference, moved, columns, i, shift, row);
    if (Number.isNaN(value)) continue;
    for (let a = 0; a < unknowns; a++) {
      right[a]! += row[a]! * value;
      for (let b = 0; b < unknowns; b++) normal[a * unknowns + b]! += row[a]! * row[b]!;
    }
  }
  const inverse = inverted(normal);
  if (!inverse) return undefined;
  const solution = times(inverse, right);
  // moved(x + d) ≈ f·(reference + gradient·e) + level: the shift is off by e, and f multiplies it in the fit.
  const factor = solution[2]!;
  return factor > 0 ? { dx: -solution[0]! / factor, dy: -solution[1]! / factor } : undefined;
}

/** Standard errors by the sandwich of clustered residuals, and the correlation, at the end of the search. */
export function covarianceOfShift(reference: Float32Array, moved: Float32Array, columns: number, places: Uint32Array, dx: number, dy: number): { seX: number; seY: number; correlation: number } {
  const normal = new Float64Array(unknowns * unknowns);
  const right = new Float64Array(unknowns);
  const row = new Float64Array(unknowns);
  const shift = interpolation(columns, dx, dy);
  let [n, s, ss] = [0, 0, 0];
  for (const i of places) {
    const value = designAt(reference, moved, columns, i, shift, row);
    if (Number.isNaN(value)) continue;
    n++;
    s += value;
    ss += value * value;
    for (let a = 0; a < unknowns; a++) {
      right[a]! += row[a]! * value;
      for (let b = 0; b < unknowns; b++) normal[a * unknowns + b]! += row[a]! * row[b]!;
    }
  }
  const none = { seX: Number.NaN, seY: Number.NaN, correlation: Number.NaN };
  const inverse = inverted(normal);
  if (!inverse || n <= unknowns) return none;
  const solution = times(inverse, right);
  const scores = new Map<number, Float64Array>();
  let residual = 0;
  for (const i of places) {
    const value = designAt(reference, moved, columns, i, shift, row);
    if (Number.isNaN(value)) continue;
    let rest = value;
    for (let a = 0; a < unknowns; a++) rest -= row[a]! * solution[a]!;
    residual += rest * rest;
    const cluster = Math.floor(Math.floor(i / columns) / clusterPx) * columns + Math.floor((i % columns) / clusterPx);
    let score = scores.get(cluster);
    if (!score) scores.set(cluster, (score = new Float64Array(unknowns)));
    for (let a = 0; a < unknowns; a++) score[a]! += row[a]! * rest;
  }
  const variance = [0, 0];
  for (const score of scores.values()) {
    const moves = times(inverse, score);
    variance[0]! += moves[0]! ** 2;
    variance[1]! += moves[1]! ** 2;
  }
  // Few clusters underestimate; the usual factor for their number.
  const few = scores.size / Math.max(1, scores.size - 1);
  const factor = Math.abs(solution[2]!);
  return {
    seX: Math.sqrt(few * variance[0]!) / factor, seY: Math.sqrt(few * variance[1]!) / factor,
    correlation: Math.sign(solution[2]!) * Math.sqrt(Math.max(0, 1 - residual / (ss - (s * s) / n))),
  };
}

/** Fills one row of the design (gradient in x, in y, reference, 1) and returns the moved map's value there; NaN where anything is missing. */
function designAt(reference: Float32Array, moved: Float32Array, columns: number, i: number, shift: Interpolation, row: Float64Array): number {
  const x = (reference[i + 1]! - reference[i - 1]!) / 2;
  const y = (reference[i + columns]! - reference[i - columns]!) / 2;
  const value = reference[i]!;
  row[0] = x;
  row[1] = y;
  row[2] = value;
  row[3] = 1;
  return x * y * value === x * y * value ? cubicAt(moved, columns, i, shift) : Number.NaN;
}

/** Where the sixteen pixels begin, from a pixel, that a shifted value is read from, and their weights along x and y. */
interface Interpolation {
  readonly offset: number;
  readonly wx: Float64Array;
  readonly wy: Float64Array;
}

function interpolation(columns: number, dx: number, dy: number): Interpolation {
  const wholeX = Math.floor(dx);
  const wholeY = Math.floor(dy);
  return { offset: wholeY * columns + wholeX, wx: weights(dx - wholeX), wy: weights(dy - wholeY) };
}

/** Catmull–Rom interpolation (Keys, IEEE Trans. Acoust. 29, 1153, 1981, a = −1/2) of the map beside pixel `i`. */
function cubicAt(map: Float32Array, columns: number, i: number, { offset, wx, wy }: Interpolation): number {
  const start = i + offset;
  let sum = 0;
  for (let v = 0; v < 4; v++) {
    const at = start + (v - 1) * columns - 1;
    sum += wy[v]! * (wx[0]! * map[at]! + wx[1]! * map[at + 1]! + wx[2]! * map[at + 2]! + wx[3]! * map[at + 3]!);
  }
  return sum;
}

function weights(t: number): Float64Array {
  return Float64Array.of(((2 - t) * t - 1) * t / 2, ((3 * t - 5) * t * t + 2) / 2, ((4 - 3 * t) * t + 1) * t / 2, ((t - 1) * t * t) / 2);
}

function times(matrix: Float64Array, vector: Float64Array): Float64Array {
  return Float64Array.from(vector, (_, a) => vector.reduce((sum, value, b) => sum + matrix[a * unknowns + b]! * value, 0));
}

/** Inverse by Gauss and Jordan with pivots; undefined for a singular matrix. */
function inverted(matrix: Float64Array): Float64Array | undefined {
  const n = unknowns;
  const a = Float64Array.from(matrix);
  const out = new Float64Array(n * n);
  for (let k = 0; k < n; k++) out[k * n + k] = 1;
  for (let k = 0; k < n; k++) {
    let pivot = k;
    for (let r = k + 1; r < n; r++) if (Math.abs(a[r * n + k]!) > Math.abs(a[pivot * n + k]!)) pivot = r;
    const value = a[pivot * n + k]!;
    if (!(Math.abs(value) > 1e-12 * Math.abs(matrix[k * n + k]!)) || value === 0) return undefined;
    for (let c = 0; c < n; c++) {
      [a[k * n + c], a[pivot * n + c]] = [a[pivot * n + c]!, a[k * n + c]!];
      [out[k * n + c], out[pivot * n + c]] = [out[pivot * n + c]!, out[k * n + c]!];
    }
    for (let c = 0; c < n; c++) {
      a[k * n + c]! /= value;
      out[k * n + c]! /= value;
    }
    for (let r = 0; r < n; r++) {
      const factor = a[r * n + k]!;
      if (r === k || factor === 0) continue;
      for (let c = 0; c < n; c++) {
        a[r * n + c]! -= factor * a[k * n + c]!;
        out[r * n + c]! -= factor * out[k * n + c]!;
      }
    }
  }
  return out;
}
