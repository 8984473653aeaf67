/** Form (tilt, bow and higher orders) of a height map as a polynomial in normalised coordinates. */
import { withoutSurface } from '../kernels/subtract-surface.ts';
import { solveBand } from '../stats/cholesky.ts';
import { lowerScatter, mostCommon } from './centre.ts';

/** Coefficients of Legendre products Pi(u)·Pj(v), i + j ≤ order, u and v running from −1 to 1 over the map. */
export interface Form {
  readonly order: number;
  readonly coefficients: Float64Array;
}

/** Values of the Legendre polynomials P0…P5 at u (Bonnet's recursion). */
function legendre(order: number, u: number, into: Float64Array): void {
  into[0] = 1;
  if (order >= 1) into[1] = u;
  for (let n = 1; n < order; n++) into[n + 1] = ((2 * n + 1) * u * into[n]! - n * into[n - 1]!) / (n + 1);
}

/** Legendre polynomials along one axis: `table[i * (order + 1) + n]` = Pn at pixel i. */
function axisTable(length: number, order: number): Float64Array {
  const table = new Float64Array(length * (order + 1));
  const row = new Float64Array(order + 1);
  for (let i = 0; i < length; i++) {
    legendre(order, length > 1 ? (2 * i) / (length - 1) - 1 : 0, row);
    table.set(row, i * (order + 1));
  }
  return table;
}

/**
 * Least-squares form over the pixels where `use` is 1 (NaN skipped), on a sub-grid of at most about
 * 40 000 pixels: the form has at most 21 coefficients, so more pixels only cost time.
 */
export function fitForm(values: Float32Array, columns: number, rows: number, order: number, use: (index: number) => boolean): Form {
  const terms = ((order + 1) * (order + 2)) / 2;
  const normal = new Float64Array(terms * terms);
  const right = new Float64Array(terms);
  const px = axisTable(columns, order);
  const py = axisTable(rows, order);
  const basis = new Float64Array(terms);
  const step = subStep(columns, rows);
  for (let r = step >> 1; r < rows; r += step) {
    for (let c = step >> 1; c < columns; c += step) {
      const index = r * columns + c;
      const value = values[index]!;
      if (Number.isNaN(value) || !use(index)) continue;
      fillBasis(basis, px, py, order, r, c);
      for (let i = 0; i < terms; i++) {
        const bi = basis[i]!;
        right[i]! += bi * value;
        for (let j = 0; j <= i; j++) normal[i * terms + (i - j)]! += bi * basis[j]!;
      }
    }
  }
  // A ridge far below rounding keeps the factorisation defined when a row of pixels is all that is left.
  for (let i = 0; i < terms; i++) normal[i * terms]! += 1e-12 * (normal[0] || 1);
  return { order, coefficients: solveBand(normal, terms - 1, right) };
}

/** Every n-th pixel in each direction is enough for a form. */
export function subStep(columns: number, rows: number): number {
  return Math.max(1, Math.floor(Math.sqrt((columns * rows) / 40_000)));
}

function fillBasis(basis: Float64Array, px: Float64Array, py: Float64Array, order: number, r: number, c: number): void {
  let k = 0;
  for (let total = 0; total <= order; total++) {
    for (let j = 0; j <= total; j++) basis[k++] = px[c * (order + 1) + total - j]! * py[r * (order + 1) + j]!;
  }
}

/** The form's polynomial in u on each row: rows × (order + 1) coefficients of P0…Porder. */
function rowPolynomials(form: Form, rows: number): Float64Array {
  const { order, coefficients } = form;
  const py = axisTable(rows, order);
  const table = new Float64Array(rows * (order + 1));
  for (let r = 0; r < rows; r++) {
    const start = r * (order + 1);
    let k = 0;
    for (let total = 0; total <= order; total++) {
      for (let j = 0; j <= total; j++) table[start + total - j]! += coefficients[k++]! * py[start + j]!;
    }
  }
  return table;
}

/** Values of the form at every pixel, row-major. */
export function formSurface(form: Form, columns: number, rows: number): Float64Array {
  const terms = form.order + 1;
  const px = axisTable(columns, form.order);
  const alongRow = rowPolynomials(form, rows);
  const surface = new Float64Array(columns * rows);
  for (let r = 0; r < rows; r++) {
    for (let c = 0; c < columns; c++) {
      let sum = 0;
      for (let n = 0; n < terms; n++) sum += alongRow[r * terms + n]! * px[c * terms + n]!;
      surface[r * columns + c] = sum;
    }
  }
  return surface;
}

/**
 * Form of the ground under features: fit, drop what stands above the ground or far below it, fit again until
 * the ground no longer changes (at most 15 rounds). The most common residual marks the ground and the scatter below it
 * its width, because bubbles and residue only ever stand above.
 * Adding a form of the same order to `values` adds it to the result.
 */
export function fitGroundForm(values: Float32Array, columns: number, rows: number, order: number): { form: Form; residual: Float32Array } {
  let form = fitForm(values, columns, rows, order, () => true);
  let residual = subtractForm(values, form, columns, rows);
  const step = subStep(columns, rows);
  let previous = Number.NaN;
  for (let round = 0; round < 15; round++) {
    const sample = subSample(residual, columns, rows, step);
    const centre = mostCommon(sample);
    const scatter = lowerScatter(sample, centre);
    const low = centre - 4 * scatter;
    const high = centre + 3 * scatter;
    const current = residual;
    form = fitForm(values, columns, rows, order, (i) => current[i]! >= low && current[i]! <= high);
    residual = subtractForm(values, form, columns, rows);
    if (Math.abs(scatter - previous) <= 1e-3 * scatter) break;
    previous = scatter;
  }
  return { form, residual };
}

/** `values − form`; NaN stays NaN. Computed by the kernel where one is installed, with the same result. */
export function subtractForm(values: Float32Array, form: Form, columns: number, rows: number): Float32Array {
  return withoutSurface(values, columns, rows, form.order + 1, rowPolynomials(form, rows), axisTable(columns, form.order))
    ?? subtractPlainly(values, form, columns, rows);
}

/** The same in plain TypeScript. */
function subtractPlainly(values: Float32Array, form: Form, columns: number, rows: number): Float32Array {
  const surface = formSurface(form, columns, rows);
  const out = new Float32Array(values.length);
  for (let i = 0; i < out.length; i++) out[i] = values[i]! - surface[i]!;
  return out;
}

/** Finite values on every `step`-th pixel in each direction. */
export function subSample(values: Float32Array, columns: number, rows: number, step: number): Float64Array {
  const out: number[] = [];
  for (let r = step >> 1; r < rows; r += step) {
    for (let c = step >> 1; c < columns; c += step) {
      const value = values[r * columns + c]!;
      if (!Number.isNaN(value)) out.push(value);
    }
  }
  return Float64Array.from(out);
}
