/** Level of the ground around each pixel, features left out. */
import { dilateByKernel } from '../kernels/dilate.ts';
import { nearestByKernel } from '../kernels/nearest-admitted.ts';
import { riseOverGround } from '../kernels/rise-above-ground.ts';

/**
 * Mean of the admitted pixels in a square window around each pixel, by summed-area tables (Crow, SIGGRAPH 1984). Where the
 * window holds too few of them it grows by steps to the whole map; at borders it is cut off.
 *
 * @param values row-major, NaN skipped; @param use 1 = admitted; @param windowPx full width of the first window.
 * @returns one level per pixel; NaN only where nothing at all is admitted.
 */
function windowMean(values: Float32Array, use: Uint8Array, columns: number, rows: number, windowPx: number): Float32Array {
  const { sums, counts } = summedAreas(values, use, columns, rows);
  const out = new Float32Array(columns * rows);
  const least = 0.12;
  for (let r = 0; r < rows; r++) {
    for (let c = 0; c < columns; c++) {
      let half = windowPx >> 1;
      let level = Number.NaN;
      for (;;) {
        const top = Math.max(0, r - half);
        const bottom = Math.min(rows, r + half + 1);
        const left = Math.max(0, c - half);
        const right = Math.min(columns, c + half + 1);
        const n = areaOf(counts, columns, top, bottom, left, right);
        const whole = top === 0 && left === 0 && bottom === rows && right === columns;
        if (n >= least * (bottom - top) * (right - left) || (whole && n > 0)) {
          level = areaOf(sums, columns, top, bottom, left, right) / n;
          break;
        }
        if (whole) break;
        half *= 2;
      }
      out[r * columns + c] = level;
    }
  }
  return out;
}

function summedAreas(values: Float32Array, use: Uint8Array, columns: number, rows: number): { sums: Float64Array; counts: Float64Array } {
  const stride = columns + 1;
  const sums = new Float64Array(stride * (rows + 1));
  const counts = new Float64Array(stride * (rows + 1));
  for (let r = 0; r < rows; r++) {
    let sum = 0;
    let count = 0;
    for (let c = 0; c < columns; c++) {
      const value = values[r * columns + c]!;
      if (use[r * columns + c] === 1 && !Number.isNaN(value)) {
        sum += value;
        count++;
      }
      const at = (r + 1) * stride + c + 1;
      sums[at] = sums[at - stride]! + sum;
      counts[at] = counts[at - stride]! + count;
    }
  }
  return { sums, counts };
}

function areaOf(table: Float64Array, columns: number, top: number, bottom: number, left: number, right: number): number {
  const stride = columns + 1;
  return table[bottom * stride + right]! - table[top * stride + right]! - table[bottom * stride + left]! + table[top * stride + left]!;
}

/**
 * Height above the local ground: the ground is the window mean over pixels that do not stand out, found by three rounds.
 *
 * Computed by the kernel where one is installed, with the same result.
 *
 * @param levelled metres, NaN missing; @param startM pixels further than this above the ground do not count as ground.
 */
export function riseAboveGround(levelled: Float32Array, columns: number, rows: number, startM: number): Float32Array {
  const windowPx = Math.max(15, Math.round(Math.min(columns, rows) / 8));
  return riseOverGround(levelled, columns, rows, windowPx >> 1, startM, rounds) ?? risePlainly(levelled, columns, rows, windowPx, startM);
}

/** Enough for the ground no longer to change. */
const rounds = 3;

/** The same in plain TypeScript. */
function risePlainly(levelled: Float32Array, columns: number, rows: number, windowPx: number, startM: number): Float32Array {
  const use = new Uint8Array(levelled.length);
  for (let i = 0; i < use.length; i++) use[i] = Math.abs(levelled[i]!) < 3 * startM ? 1 : 0;
  let rise: Float32Array = levelled;
  for (let round = 0; round < rounds; round++) {
    const ground = windowMean(levelled, use, columns, rows, windowPx);
    const next = new Float32Array(levelled.length);
    for (let i = 0; i < next.length; i++) {
      next[i] = levelled[i]! - ground[i]!;
      use[i] = next[i]! < 0.75 * startM && next[i]! > -2 * startM ? 1 : 0;
    }
    rise = next;
  }
  return rise;
}

/**
 * For every pixel the index of a nearest admitted pixel (city-block distance), spreading breadth first from the edge of the
 * admitted region; an admitted pixel is its own nearest. −1 where nothing is admitted. Computed by the kernel where one is installed, with the same result.
 *
 * @param withinPx further away than this (city-block) nothing is sought: −1 there too. Spares the time where only near ground counts.
 */
export function nearestAdmitted(use: Uint8Array, columns: number, rows: number, withinPx = columns + rows): Int32Array {
  return nearestByKernel(use, columns, rows, withinPx) ?? nearestPlainly(use, columns, rows, withinPx);
}

/** The same in plain TypeScript. */
function nearestPlainly(use: Uint8Array, columns: number, rows: number, withinPx: number): Int32Array {
  const count = columns * rows;
  const nearest = new Int32Array(count).fill(-1);
  const queue = new Int32Array(count);
  let tail = 0;
  for (let r = 0, i = 0; r < rows; r++) {
    for (let c = 0; c < columns; c++, i++) {
      if (use[i] !== 1) continue;
      nearest[i] = i;
      // Only the rim of the admitted region can reach anything: its inside need not queue.
      const inside =
        (c === 0 || use[i - 1] === 1) && (c + 1 === columns || use[i + 1] === 1) && (r === 0 || use[i - columns] === 1) && (r + 1 === rows || use[i + columns] === 1);
      if (!inside) queue[tail++] = i;
    }
  }
  // The queue holds the rim, then what lies one step from it, then two.
  let steps = 0;
  let endOfStep = tail;
  for (let head = 0; head < tail; head++) {
    if (head === endOfStep) {
      steps++;
      endOfStep = tail;
    }
    if (steps >= withinPx) break;
    const i = queue[head]!;
    const from = nearest[i]!;
    const c = i % columns;
    if (c > 0 && nearest[i - 1]! < 0) {
      nearest[i - 1] = from;
      queue[tail++] = i - 1;
    }
    if (c + 1 < columns && nearest[i + 1]! < 0) {
      nearest[i + 1] = from;
      queue[tail++] = i + 1;
    }
    if (i >= columns && nearest[i - columns]! < 0) {
      nearest[i - columns] = from;
      queue[tail++] = i - columns;
    }
    if (i + columns < count && nearest[i + columns]! < 0) {
      nearest[i + columns] = from;
      queue[tail++] = i + columns;
    }
  }
  return nearest;
}

/** Grows a mask by `radius` pixels (square neighbourhood, cut off at borders). Computed by the kernel where one is installed, with the same result. */
export function dilate(mask: Uint8Array, columns: number, rows: number, radius: number): Uint8Array {
  return dilateByKernel(mask, columns, rows, radius) ?? dilatePlainly(mask, columns, rows, radius);
}

/** The same in plain TypeScript. */
function dilatePlainly(mask: Uint8Array, columns: number, rows: number, radius: number): Uint8Array {
  const along = new Uint8Array(mask.length);
  for (let r = 0; r < rows; r++) {
    let until = -1;
    for (let c = 0; c < columns; c++) {
      if (mask[r * columns + c] === 1) {
        along.fill(1, r * columns + Math.max(until + 1, c - radius, 0), r * columns + Math.min(columns, c + radius + 1));
        until = Math.min(columns - 1, c + radius);
      }
    }
  }
  const out = new Uint8Array(mask.length);
  for (let r = 0; r < rows; r++) {
    for (let k = Math.max(0, r - radius); k <= Math.min(rows - 1, r + radius); k++) {
      const from = k * columns;
      const to = r * columns;
      for (let c = 0; c < columns; c++) if (along[from + c] === 1) out[to + c] = 1;
    }
  }
  return out;
}
