/**
 * Broken runs: stretches of one to three scan lines where the probe lost contact or the signal. They are long
 * along the fast axis, sharp across it, and the lines on both sides agree.
 */

/** Pixels in a row inside a run that may agree with the lines around it, by noise. */
const mostGap = 2;
/** Pixels in a row inside a run where the lines around it disagree too much to tell, over the flank of a feature. */
const mostUntold = 12;
/** Neither off nor in order. */
const untold = 2;

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
 * A pixel qualifies when it differs from its reference by more than six times the noise and more than four times the reference's own disagreement. The
 * reference are the two middle ones of the four pixels up to two lines before and after, so that a second broken line beside the first, whatever it
 * shows, does not hide it; a ridge or a slope does not qualify, because on it those two disagree. NaN never qualifies.
 */
export function markBrokenRuns(values: Float32Array, columns: number, rows: number, rule: RunRule): Uint8Array {
  const marks = new Uint8Array(values.length);
  for (let r = 0; r < rows; r++) markRow(values, marks, columns, rows, r, rule);
  markBetween(values, marks, columns, rows, rule);
  return marks;
}

/** A line between two broken ones is broken too where it stands off the lines beyond them. */
function markBetween(values: Float32Array, marks: Uint8Array, columns: number, rows: number, { noise, only }: RunRule): void {
  for (let i = 2 * columns; i + 2 * columns < rows * columns; i++) {
    if (marks[i] === 1 || marks[i - columns] === 0 || marks[i + columns] === 0) continue;
    const [above, below] = [values[i - 2 * columns]!, values[i + 2 * columns]!];
    const off = values[i]! - (above + below) / 2;
    if (Math.abs(above - below) <= 6 * noise && Math.abs(off) > 6 * noise && !(only === 'below' && off > 0)) marks[i] = 1;
  }
}

function markRow(values: Float32Array, marks: Uint8Array, columns: number, rows: number, r: number, rule: RunRule): void {
  let start = -1;
  let sign = 0;
  let last = 0;
  let agreeing = 0;
  for (let c = 0; c <= columns; c++) {
    // Outside a run nothing happens at pixels that agree with both lines beside them, which are nearly all.
    if (start < 0 && r > 0 && r + 1 < rows) c = firstUnsettled(values, columns, r * columns + c, (r + 1) * columns, 6 * rule.noise) - r * columns;
    let s = c < columns ? breakSign(values, columns, rows, r, c, rule.noise) : 0;
    if (s === 1 && rule.only === 'below') s = 0;
    if (start >= 0 && s === sign) {
      last = c;
      agreeing = 0;
      continue;
    }
    if (s === 0) agreeing++;
    if (start >= 0 && s !== -sign && agreeing <= mostGap && c - last <= mostUntold && c < columns) continue;
    if (start >= 0 && last + 1 - start >= rule.minLength) {
      const [from, to] = lengthened(values, columns, rows, r, start, last, rule.noise);
      marks.fill(1, r * columns + from, r * columns + to + 1);
    }
    start = s === 0 || s === untold ? -1 : c;
    sign = s;
    last = c;
    agreeing = 0;
  }
}

/** The first pixel from `i` on that differs from the line before or after by more than `least`, or where one of the three is missing; `end` without any. */
function firstUnsettled(values: Float32Array, columns: number, i: number, end: number, least: number): number {
  for (; i < end; i++) {
    const value = values[i]!;
    if (!(Math.abs(value - values[i - columns]!) <= least && Math.abs(value - values[i + columns]!) <= least)) return i;
  }
  return end;
}

/** A run goes on at its ends where the lines around it disagree too much to tell, as beside a terrace, and the line itself goes on as it was. */
function lengthened(values: Float32Array, columns: number, rows: number, r: number, start: number, last: number, noise: number): [number, number] {
  const goesOn = (c: number, inside: number): boolean =>
    c >= 0 && c < columns && Math.abs(values[r * columns + c]! - values[r * columns + inside]!) <= 6 * noise && breakSign(values, columns, rows, r, c, noise) === untold;
  let [from, to] = [start, last];
  while (start - from < mostUntold && goesOn(from - 1, from)) from--;
  while (to - last < mostUntold && goesOn(to + 1, to)) to++;
  return [from, to];
}

/** +1 or −1 where the pixel stands off to one side of the lines around it, 0 where it agrees with them, `untold` where they disagree themselves. */
function breakSign(values: Float32Array, columns: number, rows: number, r: number, c: number, noise: number): number {
  const i = r * columns + c;
  const value = values[i]!;
  const before = r > 0 ? values[i - columns]! : Number.NaN;
  const after = r + 1 < rows ? values[i + columns]! : Number.NaN;
  const least = 6 * noise;
  // Most pixels are settled by the line before and the line after.
  if (Math.abs(value - before) <= least && Math.abs(value - after) <= least) return 0;
  let low: number;
  let high: number;
  if (r >= 2 && r + 2 < rows) {
    const further = values[i - 2 * columns]!;
    const beyond = values[i + 2 * columns]!;
    // The two middle ones of four: of two pairs in order, the larger of the lower ends and the smaller of the upper ends.
    low = Math.max(Math.min(before, after), Math.min(further, beyond));
    high = Math.min(Math.max(before, after), Math.max(further, beyond));
    if (low > high) [low, high] = [high, low];
  } else {
    // Beside the map's border: the two of three that are nearest to each other.
    const side = r < 2 ? 1 : -1;
    const third = r === 1 || r === rows - 2 ? -side : 3 * side;
    const [p, q, s] = [side, 2 * side, third].map((away) => values[i + away * columns] ?? Number.NaN).sort((a, b) => a - b) as [number, number, number];
    [low, high] = q - p < s - q ? [p, q] : [q, s];
  }
  const off = value - (low + high) / 2;
  // Missing lines leave nothing to compare with.
  if (!(Math.abs(off) > least) && high - low <= least) return off === off ? 0 : untold;
  const agreed = Math.abs(off) > 4 * (high - low);
  if (r >= 3 && r + 3 < rows) {
    // Where lines beside it are broken themselves, three lines to either side must bear it out.
    const six = [before, after, values[i - 2 * columns]!, values[i + 2 * columns]!, values[i - 3 * columns]!, values[i + 3 * columns]!].sort((a, b) => a - b);
    const middle = (six[2]! + six[3]!) / 2;
    const wider = value - middle;
    if (!(Math.abs(wider) > Math.max(least, 4 * (six[3]! - six[2]!)))) return untold;
    if (agreed) return wider * off > 0 ? Math.sign(off) : untold;
    // The crest of a ridge or a dome stands off six lines too; but these do not lie level with each other, as all that are whole do beside broken ones.
    const level = six.filter((near) => Math.abs(near - middle) <= least / 2).length;
    return level >= 4 && (Math.abs(before - middle) <= least / 2 || Math.abs(after - middle) <= least / 2) ? Math.sign(wider) : untold;
  }
  return agreed ? Math.sign(off) : untold;
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
 * most three lines apart (four for marked ones) and agree within a tolerance; otherwise from left and right, for gaps of one or two pixels. A marked pixel between lines that disagree
 * takes the nearer line's value. Beside the map's upper and
 * lower border a marked pixel takes what lies up to two lines inwards.
 *
 * @param tolerance for missing pixels; @param markedTolerance for marked ones, the same when absent.
 * @returns 1 where a pixel was filled. Pixels that could not be filled become NaN (they were marked) or stay NaN.
 */
export function fillFromNeighbours(values: Float32Array, marks: Uint8Array, columns: number, rows: number, tolerance: number, markedTolerance = tolerance): Uint8Array {
  const filled = new Uint8Array(values.length);
  const source = values.slice();
  const valueAt = (r: number, c: number): number =>
    (r >= 0 && r < rows && c >= 0 && c < columns && marks[r * columns + c] === 0 ? source[r * columns + c]! : Number.NaN);
  for (let i = nextGap(source, marks, 0); i < source.length; i = nextGap(source, marks, i + 1)) {
    const c = i % columns;
    const r = (i - c) / columns;
    const within = marks[i] === 1 ? markedTolerance : tolerance;
    let value = between(valueAt, r, c, 1, 0, within, marks[i] === 1 ? 4 : 3);
    if (Number.isNaN(value)) value = between(valueAt, r, c, 0, 1, within, 3);
    if (Number.isNaN(value) && marks[i] === 1) value = oneSide(valueAt, r, c);
    if (Number.isNaN(value) && marks[i] === 1) value = inwards(valueAt, r, c, rows);
    values[i] = value;
    if (!Number.isNaN(value)) filled[i] = 1;
  }
  return filled;
}

/** The first pixel from `i` on that is marked or missing; the number of pixels without any. */
function nextGap(values: Float32Array, marks: Uint8Array, i: number): number {
  while (i < values.length && marks[i] === 0 && values[i] === values[i]) i++;
  return i;
}

/** Linear interpolation between the nearest usable pixels on both sides, at most `apart` steps apart; NaN if they disagree. */
function between(valueAt: (r: number, c: number) => number, r: number, c: number, dr: number, dc: number, tolerance: number, apart: number): number {
  let back = 1;
  while (back < apart && Number.isNaN(valueAt(r - back * dr, c - back * dc))) back++;
  let ahead = 1;
  while (ahead < apart && Number.isNaN(valueAt(r + ahead * dr, c + ahead * dc))) ahead++;
  if (back + ahead > apart) return Number.NaN;
  const a = valueAt(r - back * dr, c - back * dc);
  const b = valueAt(r + ahead * dr, c + ahead * dc);
  if (Math.abs(a - b) > tolerance) return Number.NaN;
  return (a * ahead + b * back) / (back + ahead);
}

/** Where both sides are usable but disagree, as where a run crosses a border, the nearer one, the one before when both are as near; NaN where a side is missing. */
function oneSide(valueAt: (r: number, c: number) => number, r: number, c: number): number {
  const before = [valueAt(r - 1, c), valueAt(r - 2, c)];
  const after = [valueAt(r + 1, c), valueAt(r + 2, c)];
  const b = before.findIndex((value) => value === value);
  const a = after.findIndex((value) => value === value);
  if (a < 0 || b < 0) return Number.NaN;
  return b <= a ? before[b]! : after[a]!;
}

/** Beside the border, the nearest usable pixel inwards, two lines away at most; NaN elsewhere. */
function inwards(valueAt: (r: number, c: number) => number, r: number, c: number, rows: number): number {
  const step = r < 2 ? 1 : r >= rows - 2 ? -1 : 0;
  if (step === 0) return Number.NaN;
  const near = valueAt(r + step, c);
  return Number.isNaN(near) ? valueAt(r + 2 * step, c) : near;
}
