/** Shift between two maps of one grid, to a part of a pixel, with its error. */
import { covarianceOfShift, shiftStep } from './shift-step.ts';

export interface Registration {
  /** What lies at (x, y) in the reference lies at (x + dx, y + dy) in the other map; columns to the right, rows downwards. */
  readonly dxPx: number;
  readonly dyPx: number;
  readonly seXPx: number;
  readonly seYPx: number;
  /** Correlation of the two maps at that shift, over the pixels that were compared. */
  readonly correlation: number;
}

/** Pixels compared at most: those where the reference changes. */
const mostPixels = 8000;
/** Fewer say nothing. */
const leastPixels = 60;
/** Of them are used to find the whole pixels. */
const roughPixels = 3000;
/** Newton steps at most; a step shorter than this ends them, pixels. */
const steps = { most: 12, end: 1e-4 } as const;

/**
 * Finds the shift at which `moved` looks like `reference` up to a factor and a level. Whole pixels come from the best normalised correlation within
 * `reach`, the rest from least squares over the pixels in which the reference changes, with the gradient of the reference (Lucas & Kanade, Proc. IJCAI, 674,
 * 1981; in the inverse form of Baker & Matthews, Int. J. Comput. Vis. 56, 221, 2004) and cubic interpolation of the other map. The
 * standard errors are those of clustered residuals (Liang & Zeger, Biometrika 73, 13, 1986; clusters are squares of 24 pixels), because residuals
 * of neighbouring pixels are alike.
 *
 * @param reference row-major, NaN missing, smooth over about two pixels; @param moved likewise. Pixels whose neighbourhood is missing in either are left out.
 * @returns undefined where too few pixels can be compared, the maps do not look alike (correlation below 0.3), or the shift reaches the end of the range.
 */
export function registerMaps(reference: Float32Array, moved: Float32Array, columns: number, rows: number, reach = 6): Registration | undefined {
  const places = changingPixels(reference, columns, rows, reach + 3);
  if (places.length < leastPixels) return undefined;
  const start = wholeShift(reference, moved, columns, places, reach);
  if (!start || Math.abs(start.dx) === reach || Math.abs(start.dy) === reach) return undefined;
  let { dx, dy } = start;
  for (let k = 0; k < steps.most; k++) {
    const step = shiftStep(reference, moved, columns, places, dx, dy);
    if (!step) return undefined;
    dx += step.dx;
    dy += step.dy;
    if (!(Math.hypot(dx - start.dx, dy - start.dy) < 2)) return undefined;
    if (Math.hypot(step.dx, step.dy) < steps.end) break;
  }
  const { seX, seY, correlation } = covarianceOfShift(reference, moved, columns, places, dx, dy);
  if (!(correlation >= 0.3) || !Number.isFinite(seX) || !Number.isFinite(seY)) return undefined;
  return { dxPx: dx, dyPx: dy, seXPx: seX, seYPx: seY, correlation };
}

/** Indices where the reference changes from neighbour to neighbour, away from the border; thinned by rows to what is needed. */
function changingPixels(reference: Float32Array, columns: number, rows: number, margin: number): Uint32Array {
  let largest = 0;
  const sampleRow = Math.max(1, Math.floor(rows / 64));
  for (let r = margin; r < rows - margin; r += sampleRow) largest = Math.max(largest, largestChange(reference, r * columns + margin, (r + 1) * columns - margin));
  const found = new Uint32Array(reference.length);
  let count = 0;
  for (let r = margin; r < rows - margin; r++) count = noteChanging(reference, columns, r * columns + margin, (r + 1) * columns - margin, 0.05 * largest, found, count);
  const stride = Math.max(1, count / mostPixels);
  return Uint32Array.from({ length: Math.floor(count / stride) }, (_, k) => found[Math.floor(k * stride)]!);
}

function largestChange(values: Float32Array, from: number, to: number): number {
  let largest = 0;
  for (let i = from; i < to; i++) {
    const change = Math.abs(values[i + 1]! - values[i - 1]!);
    if (change > largest) largest = change;
  }
  return largest;
}

/** Adds those of a row's pixels that change by more than `least` to the list; returns its new length. */
function noteChanging(values: Float32Array, columns: number, from: number, to: number, least: number, found: Uint32Array, count: number): number {
  for (let i = from; i < to; i++) {
    if (Math.abs(values[i + 1]! - values[i - 1]!) + Math.abs(values[i + columns]! - values[i - columns]!) > least) found[count++] = i;
  }
  return count;
}

function wholeShift(reference: Float32Array, moved: Float32Array, columns: number, places: Uint32Array, reach: number): { dx: number; dy: number } | undefined {
  const stride = Math.max(1, Math.floor(places.length / roughPixels));
  let best: { dx: number; dy: number } | undefined;
  let highest = 0;
  for (let dy = -reach; dy <= reach; dy++) {
    for (let dx = -reach; dx <= reach; dx++) {
      const correlation = correlationAt(reference, moved, places, stride, dy * columns + dx);
      if (correlation > highest) {
        highest = correlation;
        best = { dx, dy };
      }
    }
  }
  return best;
}

/** Correlation of the reference with the other map `offset` pixels on, over every `stride`-th place; NaN where too few can be compared. */
function correlationAt(reference: Float32Array, moved: Float32Array, places: Uint32Array, stride: number, offset: number): number {
  let n = 0;
  let sa = 0;
  let sb = 0;
  let saa = 0;
  let sbb = 0;
  let sab = 0;
  for (let k = 0; k < places.length; k += stride) {
    const i = places[k]!;
    const a = reference[i]!;
    const b = moved[i + offset]!;
    // NaN in either fails here.
    if (!(a * b === a * b)) continue;
    n++;
    sa += a;
    sb += b;
    saa += a * a;
    sbb += b * b;
    sab += a * b;
  }
  return n < leastPixels ? Number.NaN : (sab - (sa * sb) / n) / Math.sqrt((saa - (sa * sa) / n) * (sbb - (sb * sb) / n));
}
