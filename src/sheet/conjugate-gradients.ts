/** Linear solve inside a Newton step: conjugate gradients preconditioned by a multigrid cycle. */
import { cycle } from './cycle.ts';
import type { Level } from './network.ts';

/** Vectors of (number of sheets)·(ringed size of the finest level); coarser levels use their beginnings. */
export interface Workspace {
  readonly step: Float64Array;
  readonly residual: Float64Array;
  readonly direction: Float64Array;
  readonly image: Float64Array;
}

export function workspace(finest: Level): Workspace {
  const length = finest.size * finest.fields.length;
  return { step: new Float64Array(length), residual: new Float64Array(length), direction: new Float64Array(length), image: new Float64Array(length) };
}

export interface LinearSolve {
  readonly iterations: number;
  /** Scalar product of the step with the right-hand side. */
  readonly decrease: number;
}

/** A Newton step that needs more is better taken inexactly and followed by another. */
const maxIterations = 100;

/**
 * Solves (network + slopes)·step = residual on level `from` until the residual has shrunk by
 * `reduction` in the 2-norm. Leaves the step in `work.step`; `work.residual` is used up.
 */
export function conjugateGradients(levels: readonly Level[], from: number, work: Workspace, reduction: number): LinearSolve {
  const level = levels[from]!;
  const length = level.size * level.fields.length;
  const { step, residual, direction, image } = work;
  step.fill(0, 0, length);
  // A coarser level may have left numbers where this one has its ring.
  image.fill(0, 0, length);
  const goal = reduction * reduction * square(residual, length);
  let product = precondition(levels, from, residual);
  copyCorrection(level, direction, 0);
  let decrease = 0;
  let iterations = 0;
  while (iterations < maxIterations && product > 0) {
    applyLinearised(level, direction, image);
    let curvature = 0;
    for (let i = 0; i < length; i++) curvature += direction[i]! * image[i]!;
    if (!(curvature > 0)) break;
    const alpha = product / curvature;
    let norm = 0;
    for (let i = 0; i < length; i++) {
      step[i]! += alpha * direction[i]!;
      const rest = residual[i]! - alpha * image[i]!;
      residual[i] = rest;
      norm += rest * rest;
    }
    // The right-hand side times the direction equals `product`, since earlier directions are conjugate to this one.
    decrease += alpha * product;
    iterations++;
    if (norm <= goal) break;
    const before = product;
    product = precondition(levels, from, residual);
    copyCorrection(level, direction, product / before);
  }
  return { iterations, decrease };
}

function square(vector: Float64Array, length: number): number {
  let total = 0;
  for (let i = 0; i < length; i++) total += vector[i]! * vector[i]!;
  return total;
}

/** Runs one cycle on `residual` and returns its product with the correction. */
function precondition(levels: readonly Level[], from: number, residual: Float64Array): number {
  const { fields, size } = levels[from]!;
  for (let f = 0; f < fields.length; f++) {
    const { rhs } = fields[f]!;
    const offset = f * size;
    for (let i = 0; i < size; i++) rhs[i] = residual[offset + i]!;
  }
  cycle(levels, from);
  let product = 0;
  for (let f = 0; f < fields.length; f++) {
    const { x } = fields[f]!;
    const offset = f * size;
    for (let i = 0; i < size; i++) product += residual[offset + i]! * x[i]!;
  }
  return product;
}

/** direction = correction + beta·direction. */
function copyCorrection(level: Level, direction: Float64Array, beta: number): void {
  const { fields, size } = level;
  for (let f = 0; f < fields.length; f++) {
    const { x } = fields[f]!;
    const offset = f * size;
    for (let i = 0; i < size; i++) direction[offset + i] = beta === 0 ? x[i]! : x[i]! + beta * direction[offset + i]!;
  }
}

/** image = (network + slopes)·vector, by differences: a weak feed must not drown in the rounding of large sums. */
function applyLinearised(level: Level, vector: Float64Array, image: Float64Array): void {
  const { fields, size, width, columns, rows, slope01 } = level;
  const both = fields.length === 2;
  for (let f = 0; f < fields.length; f++) {
    const { right, down, feed } = fields[f]!;
    const slope = f === 0 ? level.slope0 : level.slope1;
    const offset = f * size;
    const otherOffset = both ? size - offset : 0;
    for (let r = 1; r <= rows; r++) {
      for (let i = r * width + 1; i <= r * width + columns; i++) {
        const k = offset + i;
        const here = vector[k]!;
        let value = (feed[i]! + slope[i]!) * here
          + right[i]! * (here - vector[k + 1]!) + right[i - 1]! * (here - vector[k - 1]!)
          + down[i]! * (here - vector[k + width]!) + down[i - width]! * (here - vector[k - width]!);
        if (both) value += slope01[i]! * vector[otherOffset + i]!;
        image[k] = value;
      }
    }
  }
}
