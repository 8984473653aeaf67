/** How far each pixel of a mask lies from what is outside it. */
import { squaredDistances } from '../kernels/squared-distances.ts';

export interface DistanceOptions {
  /** Distance between the centres of neighbouring columns and rows, any one unit; 1 by default. */
  readonly pitchX?: number;
  readonly pitchY?: number;
  /** Count the ground beyond the picture's border as background (its nearest pixel centre one pitch beyond the border's). */
  readonly outsideIsBackground?: boolean;
}

/**
 * Squared Euclidean distance, in the pitch's unit squared, from each pixel's centre to the nearest
 * zero pixel's centre; 0 on zero pixels, Infinity where there is none. Exact: separable lower
 * envelopes of parabolas (Felzenszwalb & Huttenlocher, Theory of Computing 8, 415, 2012), worked in
 * doubles and rounded once to single precision (whole numbers up to 2²⁴ stay whole). Throws a
 * RangeError when the mask is not columns × rows. Computed by the kernel where one is installed, with the same result.
 */
export function squaredDistance(mask: Uint8Array, columns: number, rows: number, options: DistanceOptions = {}): Float32Array {
  if (mask.length !== columns * rows) throw new RangeError(`a mask of ${columns} × ${rows} pixels needs ${columns * rows} values, got ${mask.length}`);
  const { pitchX = 1, pitchY = 1, outsideIsBackground = false } = options;
  return squaredDistances(mask, columns, rows, pitchX, pitchY, outsideIsBackground) ?? squaredPlainly(mask, columns, rows, pitchX, pitchY, outsideIsBackground);
}

/** The same in plain TypeScript. */
function squaredPlainly(mask: Uint8Array, columns: number, rows: number, pitchX: number, pitchY: number, outsideIsBackground: boolean): Float32Array {
  const vertical = distancesAlongColumns(mask, columns, rows, outsideIsBackground);
  const result = new Float32Array(mask.length);

  const height = new Float64Array(columns); // squared vertical distance, in units of pitchX²
  const centres = new Int32Array(columns); // columns whose parabolas form the envelope
  const bounds = new Float64Array(columns + 1); // where each begins to be the lowest
  const ratio = (pitchY / pitchX) ** 2;
  const unit = pitchX * pitchX;
  for (let row = 0; row < rows; row++) {
    const start = row * columns;
    let top = -1;
    for (let q = 0; q < columns; q++) {
      const steps = vertical[start + q]!;
      if (steps === never) continue;
      const level = steps * steps * ratio;
      height[q] = level;
      let from = Number.NEGATIVE_INFINITY;
      while (top >= 0) {
        const v = centres[top]!;
        from = (level + q * q - height[v]! - v * v) / (2 * (q - v));
        if (from > bounds[top]!) break;
        top -= 1;
        from = Number.NEGATIVE_INFINITY;
      }
      top += 1;
      centres[top] = q;
      bounds[top] = from;
    }
    if (top < 0 && !outsideIsBackground) {
      result.fill(Number.POSITIVE_INFINITY, start, start + columns);
      continue;
    }
    let k = 0;
    for (let q = 0; q < columns; q++) {
      let squared = Number.POSITIVE_INFINITY;
      if (top >= 0) {
        while (k < top && bounds[k + 1]! < q) k += 1;
        const v = centres[k]!;
        squared = (q - v) * (q - v) + height[v]!;
      }
      if (outsideIsBackground) {
        // Beyond the left and right border the nearest point lies straight across.
        const across = Math.min(q + 1, columns - q);
        if (across * across < squared) squared = mask[start + q] === 0 ? 0 : across * across;
      }
      result[start + q] = squared * unit;
    }
  }
  return result;
}

/** Marks a column without background. */
const never = 0xffffffff;

/** Steps along the column to the nearest zero pixel, row by row in memory order. */
function distancesAlongColumns(mask: Uint8Array, columns: number, rows: number, outsideIsBackground: boolean): Uint32Array {
  const steps = new Uint32Array(mask.length);
  const beyond = outsideIsBackground ? 1 : never;
  for (let k = 0; k < mask.length; k++) {
    if (mask[k] === 0) continue;
    const above = k < columns ? never : steps[k - columns]!;
    steps[k] = k < columns ? beyond : above === never ? never : above + 1;
  }
  for (let k = mask.length - 1; k >= 0; k--) {
    const last = k >= (rows - 1) * columns;
    const below = last ? never : steps[k + columns]!;
    const upwards = last ? beyond : below === never ? never : below + 1;
    if (upwards < steps[k]!) steps[k] = upwards;
  }
  return steps;
}
