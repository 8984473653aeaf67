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
  const { rest, ground, columns, rows, order, lines, level, levels } = input;
  const terms = ((order + 1) * (order + 2)) / 2;
  const size = terms + levels;
  const normal = new Float64Array(size * size);
  const right = new Float64Array(size);
  const px = axisTable(columns, order);
  const py = axisTable(rows, order);
  const step = Math.max(1, Math.round((columns * rows) / mostPixels));

  const basis = new Float64Array(terms);
  let row = new RowSums(terms, levels);
  for (let r = 0; r < rows; r++) {
    for (let c = r % step; c < columns; c += step) {
      const i = r * columns + c;
      if (ground[i] === 0) continue;
      let k = 0;
      for (let total = 0; total <= order; total++) {
        for (let j = 0; j <= total; j++) basis[k++] = px[c * (order + 1) + total - j]! * py[r * (order + 1) + j]!;
      }
      row.add(basis, rest[i]!, level[i]!, normal, right, size);
    }
    if (!lines && r + 1 < rows) continue;
    row.eliminate(normal, right, size);
    row = new RowSums(terms, levels);
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

/** Sums over the pixels that share an offset. */
class RowSums {
  private pixels = 0;
  private sum = 0;
  private readonly basis: Float64Array;
  private readonly inLevel: Float64Array;
  private readonly terms: number;

  constructor(terms: number, levels: number) {
    this.terms = terms;
    this.basis = new Float64Array(terms);
    this.inLevel = new Float64Array(levels + 1);
  }

  add(basis: Float64Array, value: number, level: number, normal: Float64Array, right: Float64Array, size: number): void {
    const { terms } = this;
    this.pixels++;
    this.sum += value;
    this.inLevel[level]!++;
    for (let a = 0; a < terms; a++) {
      const ba = basis[a]!;
      this.basis[a]! += ba;
      right[a]! += ba * value;
      for (let b = 0; b <= a; b++) normal[a * size + b]! += ba * basis[b]!;
    }
    if (level === 0) return;
    const at = terms + level - 1;
    right[at]! += value;
    normal[at * size + at]!++;
    for (let b = 0; b < terms; b++) normal[at * size + b]! += basis[b]!;
  }

  /** Takes the common offset out of the equations: the products of the sums over the number of pixels. */
  eliminate(normal: Float64Array, right: Float64Array, size: number): void {
    const { terms, pixels, sum, inLevel } = this;
    if (pixels === 0) return;
    const present = [...this.basis.keys(), ...[...inLevel.keys()].filter((level) => level > 0 && inLevel[level]! > 0).map((level) => terms + level - 1)];
    const total = (at: number): number => (at < terms ? this.basis[at]! : inLevel[at - terms + 1]!);
    for (const a of present) {
      right[a]! -= (total(a) * sum) / pixels;
      for (const b of present) if (b <= a) normal[a * size + b]! -= (total(a) * total(b)) / pixels;
    }
  }
}
