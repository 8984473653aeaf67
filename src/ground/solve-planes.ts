/** Form and levels of terraces at once, whatever the offsets of the lines are. */
import { solveBand } from '../stats/cholesky.ts';
import { axisTable } from './form.ts';
import type { Form } from './form.ts';

export interface PlanesInput {
  /** What is left of the height over the form, lines and planes known so far, metres. */
  readonly rest: Float32Array;
  /** 1 on ground; 0 elsewhere, also where the height is missing. */
  readonly ground: Uint8Array;
  readonly columns: number;
  readonly rows: number;
  readonly order: number;
  /** Whether every row has an offset of its own. */
  readonly lines: boolean;
  /** Number of the unknown level per pixel from 1; 0 where the plane is known. */
  readonly level: Uint16Array;
  readonly levels: number;
}

export interface PlanesChange {
  readonly form: Form;
  /** By number of the level; index 0 is 0. */
  readonly levelM: Float64Array;
}

/** About this many pixels decide. */
const mostPixels = 80_000;
/** Weight, in pixels, that ties to zero what the ground leaves open: terms that the lines take up, levels that no line shares with others. */
const tie = 2;

/**
 * Least squares over the ground of rest = form + level + row offset, the row offsets eliminated (each row counts by its deviations from its own
 * mean), so that levels and form are found whatever the lines' offsets are. What only varies from row to row is left at zero.
 */
export function solvePlanes(input: PlanesInput): PlanesChange {
  const { columns, rows, order, lines, levels } = input;
  const terms = ((order + 1) * (order + 2)) / 2;
  const size = terms + levels;
  const normal = new Float64Array(size * size);
  const right = new Float64Array(size);
  const px = axisTable(columns, order);
  const py = axisTable(rows, order);
  const step = Math.max(1, Math.round((columns * rows) / mostPixels));

  const sums = new Float64Array(size + 2);
  const equations = { terms, size, normal, right, sums, basis: new Float64Array(terms) };
  for (let r = 0; r < rows; r++) {
    const ofRow = py.subarray(r * (order + 1), (r + 1) * (order + 1));
    addRow(equations, input, order, px, ofRow, r * columns, r % step, step);
    if (!lines && r + 1 < rows) continue;
    eliminate(equations);
    sums.fill(0);
  }
  // The lower band of the symmetric matrix, as the solver takes it.
  const band = new Float64Array(size * size);
  for (let i = 0; i < size; i++) {
    for (let j = 0; j <= i; j++) band[i * size + (i - j)] = normal[i * size + j]! + (i === j ? tie : 0);
  }
  const solved = solveBand(band, size - 1, right);
  const levelM = new Float64Array(levels + 1);
  levelM.set(solved.subarray(terms), 1);
  return { form: { order, coefficients: solved.slice(0, terms) }, levelM };
}

interface Equations {
  readonly terms: number;
  readonly size: number;
  readonly normal: Float64Array;
  readonly right: Float64Array;
  /** Over the pixels that share an offset: sums of the terms, pixels by level, and at the end the number of pixels and the sum of their values. */
  readonly sums: Float64Array;
  readonly basis: Float64Array;
}

/** Adds the ground of one row, from column `from` in steps, to the equations. */
function addRow(
  equations: Equations, { rest, ground, columns, level }: PlanesInput, order: number, px: Float64Array, py: Float64Array, start: number, from: number, step: number,
): void {
  const { basis, sums, size } = equations;
  for (let c = from; c < columns; c += step) {
    const i = start + c;
    if (ground[i] === 0) continue;
    fillBasis(basis, order, px, c * (order + 1), py);
    sums[size]!++;
    sums[size + 1]! += rest[i]!;
    addPixel(equations, rest[i]!);
    if (level[i] !== 0) addToLevel(equations, level[i]!, rest[i]!);
  }
}

function fillBasis(basis: Float64Array, order: number, px: Float64Array, at: number, py: Float64Array): void {
  let k = 0;
  for (let total = 0; total <= order; total++) {
    for (let j = 0; j <= total; j++) basis[k++] = px[at + total - j]! * py[j]!;
  }
}

function addPixel({ terms, size, normal, right, sums, basis }: Equations, value: number): void {
  for (let a = 0; a < terms; a++) {
    const ba = basis[a]!;
    sums[a]! += ba;
    right[a]! += ba * value;
    for (let b = 0; b <= a; b++) normal[a * size + b]! += ba * basis[b]!;
  }
}

function addToLevel({ terms, size, normal, right, sums, basis }: Equations, level: number, value: number): void {
  const at = terms + level - 1;
  sums[at]!++;
  right[at]! += value;
  normal[at * size + at]!++;
  for (let b = 0; b < terms; b++) normal[at * size + b]! += basis[b]!;
}

/** Takes the common offset out of the equations: the products of the sums over the number of pixels. */
function eliminate({ terms, size, normal, right, sums }: Equations): void {
  const pixels = sums[size]!;
  const sum = sums[size + 1]!;
  if (pixels === 0) return;
  for (let a = 0; a < size; a++) {
    const total = sums[a]!;
    // A level without a pixel on the row is not touched by it.
    if (a >= terms && total === 0) continue;
    right[a]! -= (total * sum) / pixels;
    for (let b = 0; b <= a; b++) if (b < terms || sums[b] !== 0) normal[a * size + b]! -= (total * sums[b]!) / pixels;
  }
}
