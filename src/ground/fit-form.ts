/** Fits a form to a map, or to the ground under features, on a sample of its pixels. */
import { solveBand } from '../stats/cholesky.ts';
import { centreAndScatter } from './centre.ts';
import { axisTable } from './form.ts';
import type { Form } from './form.ts';

/** A form has at most 21 coefficients, so more pixels than this only cost time. */
const mostPixels = 40_000;

/** Sampled pixels with the Legendre products at each: `basis[k * terms + i]`. */
interface FormSample {
  readonly order: number;
  readonly terms: number;
  readonly values: Float64Array;
  readonly basis: Float64Array;
}

/**
 * Least-squares form over the pixels that `use` admits (NaN skipped), on a sub-grid of at most about
 * 40 000 pixels. Where fewer pixels than terms are left, a ridge far below rounding keeps the answer finite.
 */
export function fitForm(values: Float32Array, columns: number, rows: number, order: number, use: (index: number) => boolean): Form {
  const sample = takeSample(values, columns, rows, order, use);
  return { order, coefficients: solve(sample, new Uint8Array(sample.values.length).fill(1)) };
}

/**
 * Form of the ground under features: fit, drop what stands above the ground or far below it, fit again until
 * the ground no longer changes (at most 15 rounds). The most common residual marks the ground and the scatter below it
 * its width, because bubbles and residue only ever stand above.
 * Adding a form of the same order to `values` adds it to the result. NaN is skipped.
 */
export function fitGroundForm(values: Float32Array, columns: number, rows: number, order: number): Form {
  const sample = takeSample(values, columns, rows, order, () => true);
  const kept = new Uint8Array(sample.values.length).fill(1);
  let coefficients = solve(sample, kept);
  let previous = Number.NaN;
  for (let round = 0; round < 15; round++) {
    const residual = residuals(sample, coefficients);
    const { centre, scatter } = centreAndScatter(residual);
    markBetween(residual, centre - 4 * scatter, centre + 3 * scatter, kept);
    coefficients = solve(sample, kept);
    if (Math.abs(scatter - previous) <= 1e-3 * scatter) break;
    previous = scatter;
  }
  return { order, coefficients };
}

function markBetween(values: Float64Array, low: number, high: number, marks: Uint8Array): void {
  for (let k = 0; k < marks.length; k++) marks[k] = values[k]! >= low && values[k]! <= high ? 1 : 0;
}

/** Distance between sampled pixels, the same in both directions, for a map of which `present` pixels count. */
export function sampleStep(present: number): number {
  return Math.max(1, Math.floor(Math.sqrt(present / mostPixels)));
}

/** Finite values on every `step`-th pixel in each direction. */
export function subSample(values: Float32Array, columns: number, rows: number, step: number): Float64Array {
  const out = new Float64Array(Math.ceil(columns / step) * Math.ceil(rows / step));
  let count = 0;
  for (let r = step >> 1; r < rows; r += step) {
    for (let c = step >> 1; c < columns; c += step) {
      const value = values[r * columns + c]!;
      if (!Number.isNaN(value)) out[count++] = value;
    }
  }
  return out.slice(0, count);
}

/** Number of finite values. */
export function presentCount(values: Float32Array): number {
  let count = 0;
  for (let i = 0; i < values.length; i++) if (values[i] === values[i]) count++;
  return count;
}

function takeSample(values: Float32Array, columns: number, rows: number, order: number, use: (index: number) => boolean): FormSample {
  const terms = ((order + 1) * (order + 2)) / 2;
  const px = axisTable(columns, order);
  const py = axisTable(rows, order);
  // Counted first: where only a strip of the map is present, every pixel of it is taken.
  const step = sampleStep(presentCount(values));
  const most = Math.ceil(columns / step) * Math.ceil(rows / step);
  const taken = new Float64Array(most);
  const basis = new Float64Array(most * terms);
  let count = 0;
  for (let r = step >> 1; r < rows; r += step) {
    for (let c = step >> 1; c < columns; c += step) {
      const index = r * columns + c;
      const value = values[index]!;
      if (Number.isNaN(value) || !use(index)) continue;
      let k = count * terms;
      for (let total = 0; total <= order; total++) {
        for (let j = 0; j <= total; j++) basis[k++] = px[c * (order + 1) + total - j]! * py[r * (order + 1) + j]!;
      }
      taken[count++] = value;
    }
  }
  return { order, terms, values: taken.subarray(0, count), basis };
}

function solve(sample: FormSample, kept: Uint8Array): Float64Array {
  const { terms } = sample;
  const normal = new Float64Array(terms * terms);
  const right = new Float64Array(terms);
  for (let i = 0; i < terms; i++) sumTerm(sample, kept, i, normal, right);
  for (let i = 0; i < terms; i++) normal[i * terms]! += 1e-12 * (normal[0] || 1);
  return solveBand(normal, terms - 1, right);
}

/** The part of the normal equations that belongs to one term: term by term, the sums stay in registers. */
function sumTerm({ terms, values, basis }: FormSample, kept: Uint8Array, i: number, normal: Float64Array, right: Float64Array): void {
  right[i] = productSum(basis, i, values, terms, kept);
  for (let j = 0; j <= i; j++) normal[i * terms + (i - j)] = pairSum(basis, i, j, terms, kept);
}

function productSum(basis: Float64Array, i: number, values: Float64Array, terms: number, kept: Uint8Array): number {
  let sum = 0;
  for (let k = 0, at = i; k < kept.length; k++, at += terms) if (kept[k] === 1) sum += basis[at]! * values[k]!;
  return sum;
}

function pairSum(basis: Float64Array, i: number, j: number, terms: number, kept: Uint8Array): number {
  let sum = 0;
  for (let k = 0, at = 0; k < kept.length; k++, at += terms) if (kept[k] === 1) sum += basis[at + i]! * basis[at + j]!;
  return sum;
}

function residuals({ terms, values, basis }: FormSample, coefficients: Float64Array): Float64Array {
  const out = new Float64Array(values.length);
  for (let k = 0, at = 0; k < out.length; k++, at += terms) {
    let sum = 0;
    for (let i = 0; i < terms; i++) sum += coefficients[i]! * basis[at + i]!;
    out[k] = values[k]! - sum;
  }
  return out;
}
