/**
 * Broken runs: stretches of one or two scan lines where the probe lost contact or the signal. They are long
 * along the fast axis, sharp across it, and the lines on both sides agree.
 */

/** What a run must show. `noise` is the pixel noise in the map's unit. */
export interface RunRule {
  readonly noise: number;
  /** Shortest run in pixels. */
  readonly minLength: number;
  /** `below`: only runs that lie below both neighbours count; both ways when absent. */
  readonly only?: 'below';
}

/**
 * Marks pixels of broken runs (1) in a map whose lines have been brought to a common level.
 * A pixel qualifies when it differs from the mean of the lines before and after the run by more than six times the
 * noise and more than four times their disagreement, and when those lines themselves run on smoothly (a wrinkle lying along the
 * fast axis does not: its flanks slope). NaN never qualifies.
 */
export function markBrokenRuns(values: Float32Array, columns: number, rows: number, rule: RunRule): Uint8Array {
  const marks = new Uint8Array(values.length);
  for (const thickness of [1, 2]) {
    for (let r = 1; r + thickness < rows; r++) {
      markRow(values, marks, columns, rows, r, thickness, rule);
    }
  }
  return marks;
}

function markRow(values: Float32Array, marks: Uint8Array, columns: number, rows: number, r: number, thickness: number, rule: RunRule): void {
  let start = -1;
  let sign = 0;
  let gaps = 0;
  for (let c = 0; c <= columns; c++) {
    let s = c < columns ? breakSign(values, columns, rows, r, c, thickness, rule.noise) : 0;
    if (s > 0 && rule.only === 'below') s = 0;
    if (start >= 0 && s === sign) {
      gaps = 0;
      continue;
    }
    // Up to two pixels in a row may miss the rule, noise or a feature under the run does that.
    if (start >= 0 && s !== -sign && gaps < 2 && c < columns) {
      gaps++;
      continue;
    }
    if (start >= 0) {
      const end = c - gaps;
      if (end - start >= rule.minLength) fillRun(marks, columns, r, thickness, start, end);
    }
    start = s === 0 ? -1 : c;
    sign = s;
    gaps = 0;
  }
}

function fillRun(marks: Uint8Array, columns: number, r: number, thickness: number, start: number, end: number): void {
  for (let k = 0; k < thickness; k++) marks.fill(1, (r + k) * columns + start, (r + k) * columns + end);
}

/** +1 or −1 where all lines of the run stand off to one side of both neighbours, else 0. */
function breakSign(values: Float32Array, columns: number, rows: number, r: number, c: number, thickness: number, noise: number): number {
  const before = values[(r - 1) * columns + c]!;
  const after = values[(r + thickness) * columns + c]!;
  const mean = (before + after) / 2;
  const least = Math.max(6 * noise, 4 * Math.abs(before - after));
  let off = 0;
  for (let k = 0; k < thickness; k++) {
    const e = values[(r + k) * columns + c]! - mean;
    if (!(Math.abs(e) > least)) return 0;
    if (off !== 0 && Math.sign(e) !== Math.sign(off)) return 0;
    off = off === 0 || Math.abs(e) < Math.abs(off) ? e : off;
  }
  const slopeLimit = Math.max(4 * noise, Math.abs(off) / 4);
  if (r >= 2 && Math.abs(before - values[(r - 2) * columns + c]!) > slopeLimit) return 0;
  if (r + thickness + 1 < rows && Math.abs(after - values[(r + thickness + 1) * columns + c]!) > slopeLimit) return 0;
  return Math.sign(off);
}

/**
 * Marks spikes: single pixels that stand off all eight neighbours by more than twelve times the noise while these agree among themselves to within
 * eight. A pit of up to `pitDepth` is left alone, because it may be a pinhole.
 */
export function markSpikes(values: Float32Array, marks: Uint8Array, columns: number, rows: number, noise: number, pitDepth: number): void {
  for (let r = 1; r + 1 < rows; r++) {
    for (let c = 1; c + 1 < columns; c++) {
      const i = r * columns + c;
      const value = values[i]!;
      // Most pixels are settled by one neighbour.
      if (!(Math.abs(value - values[i - 1]!) > 12 * noise)) continue;
      let low = Number.POSITIVE_INFINITY;
      let high = Number.NEGATIVE_INFINITY;
      for (const step of [-columns - 1, -columns, -columns + 1, -1, 1, columns - 1, columns, columns + 1]) {
        const neighbour = values[i + step]!;
        if (neighbour < low) low = neighbour;
        if (neighbour > high) high = neighbour;
      }
      if (high - low > 8 * noise) continue;
      if (value > high + 12 * noise || value < low - Math.max(12 * noise, pitDepth)) marks[i] = 1;
    }
  }
}

/**
 * Fills marked or missing pixels from the nearest unmarked pixels above and below in the same column, when these are at
 * most three lines apart and agree within `tolerance`; otherwise from left and right, for gaps of one or two pixels.
 *
 * @returns 1 where a pixel was filled. Pixels that could not be filled become NaN (they were marked) or stay NaN.
 */
export function fillFromNeighbours(values: Float32Array, marks: Uint8Array, columns: number, rows: number, tolerance: number): Uint8Array {
  const filled = new Uint8Array(values.length);
  const source = Float32Array.from(values);
  const usable = (r: number, c: number): boolean =>
    r >= 0 && r < rows && c >= 0 && c < columns && marks[r * columns + c] === 0 && !Number.isNaN(source[r * columns + c]!);
  for (let r = 0; r < rows; r++) {
    for (let c = 0; c < columns; c++) {
      const i = r * columns + c;
      if (marks[i] === 0 && !Number.isNaN(values[i]!)) continue;
      const vertical = between(source, columns, usable, r, c, 1, 0, tolerance);
      const value = Number.isNaN(vertical) ? between(source, columns, usable, r, c, 0, 1, tolerance) : vertical;
      values[i] = value;
      if (!Number.isNaN(value)) filled[i] = 1;
    }
  }
  return filled;
}

/** Linear interpolation between the nearest usable pixels on both sides, at most three steps apart; NaN if they disagree. */
function between(
  source: Float32Array, columns: number, usable: (r: number, c: number) => boolean,
  r: number, c: number, dr: number, dc: number, tolerance: number,
): number {
  let back = 1;
  while (back <= 2 && !usable(r - back * dr, c - back * dc)) back++;
  let ahead = 1;
  while (ahead <= 2 && !usable(r + ahead * dr, c + ahead * dc)) ahead++;
  if (back > 2 || ahead > 2 || back + ahead > 3) return Number.NaN;
  const a = source[(r - back * dr) * columns + c - back * dc]!;
  const b = source[(r + ahead * dr) * columns + c + ahead * dc]!;
  if (Math.abs(a - b) > tolerance) return Number.NaN;
  return (a * ahead + b * back) / (back + ahead);
}
