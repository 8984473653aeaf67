/** Form (tilt, bow and higher orders) of a height map as a polynomial in normalised coordinates. */
import { withoutSurface } from '../kernels/subtract-surface.ts';

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
export function axisTable(length: number, order: number): Float64Array {
  const table = new Float64Array(length * (order + 1));
  const row = new Float64Array(order + 1);
  for (let i = 0; i < length; i++) {
    legendre(order, length > 1 ? (2 * i) / (length - 1) - 1 : 0, row);
    table.set(row, i * (order + 1));
  }
  return table;
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
  for (let r = 0; r < rows; r++) fillRow(surface, r * columns, columns, alongRow.subarray(r * terms, (r + 1) * terms), px);
  return surface;
}

/** Difference between the highest and the lowest value of the form over all pixels; no surface is kept. */
export function formRange(form: Form, columns: number, rows: number): number {
  const terms = form.order + 1;
  const px = axisTable(columns, form.order);
  const alongRow = rowPolynomials(form, rows);
  const row = new Float64Array(columns);
  let low = Number.POSITIVE_INFINITY;
  let high = Number.NEGATIVE_INFINITY;
  for (let r = 0; r < rows; r++) {
    fillRow(row, 0, columns, alongRow.subarray(r * terms, (r + 1) * terms), px);
    for (let c = 0; c < columns; c++) {
      const value = row[c]!;
      if (value < low) low = value;
      if (value > high) high = value;
    }
  }
  return high - low;
}

/** One row of a form from its polynomial there. */
function fillRow(into: Float64Array, start: number, columns: number, polynomial: Float64Array, px: Float64Array): void {
  const terms = polynomial.length;
  for (let c = 0, at = 0; c < columns; c++) {
    let sum = 0;
    for (let n = 0; n < terms; n++) sum += polynomial[n]! * px[at++]!;
    into[start + c] = sum;
  }
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
