/** Form and line offsets of a height whose terraces are taken as parallel planes. */
import type { Grid } from '../grid/maps.ts';
import { median, medianInPlace } from '../stats/median.ts';
import { centreAndScatter, mostCommon } from './centre.ts';
import { fitForm, presentCount, sampleStep, subSample } from './fit-form.ts';
import { columnsOf, inNone, widened } from './fewer-columns.ts';
import type { Form } from './form.ts';
import { subtractForm } from './form.ts';
import { removeTrend } from './lines.ts';
import { loseUntold, mapThrough, movePlanes, raisePlanes, takeLines, takePlanes, takeRaise, zeroWhereMissing } from './plane-maps.ts';
import type { GroundSection } from './recipe.ts';
import { levelSegments } from './segment-levels.ts';
import { solvePlanes } from './solve-planes.ts';
import { within } from './within.ts';

/** What is taken out of a height: a form, and one offset per row. */
export interface Levels {
  readonly form: Form;
  readonly lines: Float64Array;
}

export interface RefinedLevels extends Levels {
  /** Height of the plane, the terrace, that each pixel lies on, metres; NaN where neither the current nor flat ground tells, and on small patches that may be films. */
  readonly plane: Float32Array;
}

export interface RefineHelp {
  readonly start: Levels;
  /** 1 on the ground that counts; all of the map when absent. */
  readonly inside?: Uint8Array | undefined;
  /** Height of each pixel's terrace above some common plane by its current, metres, NaN unknown; absent where nothing tells. */
  readonly planes?: Float32Array | undefined;
  /** Height of one layer, metres. */
  readonly layerM: number;
}

/** Rounds of planes, lines and form; each takes the better ground of the one before. Segments are sought in the first two. */
const rounds = 3;
/** A line with less ground than this takes its offset from the lines beside it. */
const leastInLine = 24;
/** Columns that are enough to refine by; of maps with two and a half times as many or more every second, third … is taken. */
const enoughColumns = 256;
const manyColumns = 640;
/** But no fewer than every fourth: narrower terraces would be lost between them. */
const fewestEvery = 4;
/** Jumps that many times those of the differences, and this many metres more, are streaks. */
const streakTimes = 1.5;
const streakM = 0.03e-9;
/** A noiseless map still has rounding: less scatter than this is none, metres. */
const leastScatterM = 1e-13;

/**
 * Refines levels found without knowledge of terraces. The height is taken as form + line offset + plane + ground: the plane is the current's where that
 * tells the layer, and where it does not (censored, or no current at all) one unknown level for each connected segment of flat ground.
 * In each round what lies within the scatter of its plane is ground; form and levels follow from the ground whatever the lines' offsets
 * (`solvePlanes`), each line's offset is the median of its ground over them, and the form is fitted once more to all ground.
 *
 * The median of a whole line sees the terraces' planes removed, so that steps do not pull it, unlike a plain line median; and it does not add up
 * the errors of differences between lines. On ground that is no set of planes, where such medians would leave streaks, the differences stay.
 *
 * @param height metres, row-major, NaN missing.
 */
export function refineLevels(height: Float32Array, grid: Grid, section: GroundSection, help: RefineHelp): RefinedLevels {
  const { inside, planes } = help;
  const raw = within(height, inside);
  const every = grid.columns < manyColumns ? 1 : Math.min(fewestEvery, Math.floor(grid.columns / enoughColumns));
  if (every === 1) {
    const found = refine(raw, grid, section, help, planes);
    dropFilms(found.plane, found.terrace, grid.columns);
    return found;
  }
  // A line's offset and a terrace's plane are as well known from some hundred columns; only the result is needed at every pixel.
  const narrow = { columns: Math.floor(grid.columns / every), rows: grid.rows, pitchXM: grid.pitchXM * every, pitchYM: grid.pitchYM };
  const narrowPlanes = planes && columnsOf(planes, grid, every);
  const found = refine(columnsOf(raw, grid, every), narrow, section, help, narrowPlanes, every);
  const { plane, terrace } = widened({ ...found, planes: narrowPlanes }, planes, grid, every);
  const flat = raw.slice();
  takePlanes(flat, plane, found.lines, grid.columns);
  const form = fitForm(flat, grid.columns, grid.rows, section.order, (i) => found.ground[Math.floor(i / grid.columns) * narrow.columns + Math.min(narrow.columns - 1, Math.floor((i % grid.columns) / every))] === 1);
  dropFilms(plane, terrace, grid.columns);
  return { form, lines: found.lines, plane };
}

interface Found extends RefinedLevels {
  readonly terrace: Uint8Array;
  readonly ground: Uint8Array;
}

function refine(raw: Float32Array, grid: Grid, section: GroundSection, help: RefineHelp, planes: Float32Array | undefined, every = 1): Found {
  const { columns, rows } = grid;
  const known = planes ? zeroWhereMissing(planes) : new Float32Array(raw.length);
  const plane = known.slice();
  const level = new Uint16Array(raw.length);
  const terrace = new Uint8Array(raw.length);
  let ground: Uint8Array = new Uint8Array(raw.length);
  let levels = 0;
  let { form, lines } = help.start;
  for (let round = 0; round < rounds; round++) {
    // Segments are sought twice, because the first look is through lines and a form that lean on the steps.
    const seeks = round < 2;
    const rest = overKnown(raw, form, lines, seeks ? known : plane, columns, rows);
    if (seeks) {
      const found = levelSegments(rest, grid, help.layerM, planes, every);
      levels = 0;
      // With neither a segment nor a current all of the map is taken for one plane.
      const told = planes !== undefined || found.levelM.length > 1;
      const numbers = Uint16Array.from(found.levelM, (height) => (height === height ? 0 : ++levels));
      const marks = found.terrace.slice();
      marks[0] = inNone;
      mapThrough(found.segment, numbers, level);
      mapThrough(found.segment, marks, terrace);
      raisePlanes(found.segment, found.levelM, known, plane);
      if (told) loseUntold(found.segment, planes, plane);
      takeRaise(rest, plane, known);
    }
    ground = groundOf(rest, columns, rows, level, levels);
    const change = solvePlanes({ rest, ground, columns, rows, order: section.order, lines: section.lines, level, levels });
    const moved = subtractForm(rest, change.form, columns, rows);
    movePlanes(plane, moved, level, change.levelM);
    if (section.lines) lines = lineMedians(moved, groundOf(moved, columns, rows, level, 0), columns, rows, lines);
    const flat = raw.slice();
    takePlanes(flat, plane, lines, columns);
    const admitted = ground;
    if (round === rounds - 1 && section.lines && streaks(overLines(raw, form, lines, columns, rows), columns, rows, lines, help.start.lines)) {
      const start = help.start.lines;
      takeLines(flat, start.map((offset, r) => offset - lines[r]!), columns);
      lines = help.start.lines;
    }
    form = fitForm(flat, columns, rows, section.order, (i) => admitted[i] === 1);
  }
  return { form, lines, plane, terrace, ground };
}

function overLines(raw: Float32Array, form: Form, lines: Float64Array, columns: number, rows: number): Float32Array {
  const over = subtractForm(raw, form, columns, rows);
  takeLines(over, lines, columns);
  return over;
}

/**
 * Whether medians over the planes leave more of a jump from line to line than the differences they started from. They do where the ground is no set of planes:
 * there each line's median is that of other places than the next one's.
 *
 * @param over height without form and `lines`.
 */
function streaks(over: Float32Array, columns: number, rows: number, lines: Float64Array, start: Float64Array): boolean {
  const buffer = new Float64Array(columns);
  const [own, others]: [number[], number[]] = [[], []];
  for (let r = 1; r < rows; r++) {
    let count = 0;
    for (let i = r * columns; i < (r + 1) * columns; i++) {
      const jump = over[i]! - over[i - columns]!;
      if (jump === jump) buffer[count++] = jump;
    }
    if (count < leastInLine) continue;
    const jump = medianInPlace(buffer, count);
    own.push(Math.abs(jump));
    others.push(Math.abs(jump + lines[r]! - lines[r - 1]! - (start[r]! - start[r - 1]!)));
  }
  return own.length > 0 && median(own) > streakTimes * median(others) + streakM;
}

/** Films lie on planes too, and help to level; but they are no terraces: their planes, and those of the same height that reach out from them to their rims, become unknown. */
function dropFilms(plane: Float32Array, terrace: Uint8Array, columns: number): void {
  const queue: number[] = [];
  for (let i = 0; i < plane.length; i++) if (terrace[i] === 0) queue.push(i);
  for (let i = queue.pop(); i !== undefined; i = queue.pop()) {
    const height = plane[i]!;
    plane[i] = Number.NaN;
    if (height !== height) continue;
    const c = i % columns;
    for (const j of [c > 0 ? i - 1 : -1, c + 1 < columns ? i + 1 : -1, i - columns, i + columns]) {
      if (j >= 0 && j < plane.length && terrace[j] === inNone && Math.abs(plane[j]! - height) < 0.05e-9) queue.push(j);
    }
  }
}

function overKnown(raw: Float32Array, form: Form, lines: Float64Array, known: Float32Array, columns: number, rows: number): Float32Array {
  const over = subtractForm(raw, form, columns, rows);
  takePlanes(over, known, lines, columns);
  return over;
}

/**
 * 1 where the height lies within the scatter of its plane: around its most common value, and on each level that is still unknown around the most
 * common value there.
 */
function groundOf(rest: Float32Array, columns: number, rows: number, level: Uint16Array, levels: number): Uint8Array {
  const present = presentCount(rest);
  const sample = subSample(rest, columns, rows, (present > 20_000 ? 2 : 1) * sampleStep(present));
  const found = centreAndScatter(sample);
  const { centre } = found;
  const scatter = Math.max(leastScatterM, found.scatter);
  const centres = new Float64Array(levels + 1).fill(centre);
  if (levels > 0) {
    const lists: number[][] = Array.from({ length: levels + 1 }, () => []);
    const every = Math.max(1, Math.floor(rest.length / 100_000));
    for (let i = 0; i < rest.length; i += every) if (level[i]! > 0 && rest[i] === rest[i]) lists[level[i]!]!.push(rest[i]!);
    for (let k = 1; k <= levels; k++) if (lists[k]!.length > 0) centres[k] = mostCommon(Float64Array.from(lists[k]!));
  }
  const out = new Uint8Array(rest.length);
  if (levels > 0) markNearLevel(rest, level, centres, -4 * scatter, 3 * scatter, out);
  else markNear(rest, centre, -4 * scatter, 3 * scatter, out);
  return out;
}

function markNear(rest: Float32Array, centre: number, low: number, high: number, out: Uint8Array): void {
  for (let i = 0; i < out.length; i++) {
    const off = rest[i]! - centre;
    if (off >= low && off <= high) out[i] = 1;
  }
}

function markNearLevel(rest: Float32Array, level: Uint16Array, centres: Float64Array, low: number, high: number, out: Uint8Array): void {
  for (let i = 0; i < out.length; i++) {
    const off = rest[i]! - centres[level[i]!]!;
    if (off >= low && off <= high) out[i] = 1;
  }
}

/**
 * Offset of every row: the median of its ground added to what it was. Rows with little ground take the correction of the rows beside them, linear
 * between those. Mean and trend are removed, as they belong to the form.
 */
function lineMedians(rest: Float32Array, ground: Uint8Array, columns: number, rows: number, before: Float64Array): Float64Array {
  const step = Math.max(1, Math.floor(columns / 512));
  const buffer = new Float64Array(columns);
  const correction = new Float64Array(rows).fill(Number.NaN);
  for (let r = 0; r < rows; r++) {
    let count = 0;
    for (let c = r % step; c < columns; c += step) {
      const i = r * columns + c;
      if (ground[i] === 1) buffer[count++] = rest[i]!;
    }
    if (count >= leastInLine) correction[r] = medianInPlace(buffer, count);
  }
  const known = [...correction.keys()].filter((r) => correction[r] === correction[r]);
  if (known.length === 0) return before;
  let next = 0;
  const lines = before.map((offset, r) => {
    while (next < known.length - 1 && known[next]! < r) next++;
    const after = known[next]!;
    const back = after === r ? r : (known[next - 1] ?? after);
    const share = after === back ? 0 : Math.min(1, Math.max(0, (r - back) / (after - back)));
    return offset + correction[back]! * (1 - share) + correction[after]! * share;
  });
  removeTrend(lines);
  return lines;
}
