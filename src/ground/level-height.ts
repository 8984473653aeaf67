import type { Grid, ScalarMap } from '../grid/maps.ts';
import { maskMap, scalarMap } from '../grid/maps.ts';
import { fillFromNeighbours, markBrokenRuns, markSpikes } from './broken-runs.ts';
import { centreAndScatter } from './centre.ts';
import { fitGroundForm, presentCount, sampleStep, subSample } from './fit-form.ts';
import { formRange, subtractForm } from './form.ts';
import type { HeightGround } from './ground.ts';
import { lineOffsets } from './lines.ts';
import { pixelNoise } from './noise.ts';
import { takeLines } from './plane-maps.ts';
import type { GroundSection } from './recipe.ts';
import type { Levels, RefinedLevels } from './refine-levels.ts';
import { within } from './within.ts';

/** Shortest broken run that is repaired, pixels along the fast axis. */
const runLength = 8;
/** A single pixel deeper than this below its surroundings is a spike; a probe does not reach deeper into a pinhole one pixel wide. */
const deepestPitM = 6e-9;

/**
 * Form and line offsets of a height map without knowledge of terraces: a robust form with features masked, and line offsets from differences
 * between nearby lines.
 *
 * @param height shape [rows, columns], metres, NaN missing.
 * @param inside 1 on the ground that counts; all of the map when absent. What lies beside the flake has a level of its own and no say in its form.
 */
export function firstLevels(height: ScalarMap, { columns, rows }: Grid, section: GroundSection, inside?: Uint8Array): Levels {
  const raw = within(height.data, inside);
  const form = fitGroundForm(raw, columns, rows, section.order);
  if (!section.lines) return { form, lines: new Float64Array(rows) };
  const values = subtractForm(raw, form, columns, rows);
  const { isGround } = groundTest(values, columns, rows);
  if (!linesOff(values, isGround, columns, rows)) return { form, lines: lineOffsets(values, columns, rows, isGround) };
  // Lines that jump by more than the scatter are no ground by this test: they are brought near first, by all of their pixels.
  const coarse = lineOffsets(values, columns, rows, () => true);
  takeLines(values, coarse, columns);
  const fine = lineOffsets(values, columns, rows, groundTest(values, columns, rows).isGround);
  return { form, lines: coarse.map((offset, r) => offset + fine[r]!) };
}

/** Whether some lines hold hardly any ground, although they are measured. */
function linesOff(values: Float32Array, isGround: (index: number) => boolean, columns: number, rows: number): boolean {
  const step = Math.max(1, Math.floor(columns / 64));
  for (let r = 0; r < rows; r++) {
    let [present, ground] = [0, 0];
    for (let c = r % step; c < columns; c += step) {
      const i = r * columns + c;
      if (values[i] !== values[i]) continue;
      present++;
      if (isGround(i)) ground++;
    }
    if (present >= 8 && ground < 0.15 * present) return true;
  }
  return false;
}

/** Height without form and line offsets, metres. */
export function withoutLevels(raw: Float32Array, { columns, rows }: Grid, levels: Levels): Float32Array {
  const values = subtractForm(raw, levels.form, columns, rows);
  takeLines(values, levels.lines, columns);
  return values;
}

function lowerBy(values: Float32Array, by: number): void {
  for (let i = 0; i < values.length; i++) values[i]! -= by;
}

/**
 * Levels a height map: takes form and line offsets out, and repairs broken runs, spikes and single missing points.
 *
 * Levelled ground has its most common height at 0. A form of the section's order added to the input does not change
 * the result (to float32 rounding). Missing pixels stay missing unless `repair` can fill them from agreeing neighbours.
 *
 * @param height shape [rows, columns], metres, NaN missing.
 * @param fillMissing false where the height is all there is: then a missing point must stay one, because nothing else was measured there.
 * @throws never for finite or missing values; a map without any finite value must be refused before.
 */
export function levelHeight(height: ScalarMap, grid: Grid, section: GroundSection, levels: RefinedLevels, inside?: Uint8Array, fillMissing = true): HeightGround {
  const { columns, rows } = grid;
  const raw = height.data;
  const values = withoutLevels(raw, grid, levels);
  const noiseM = pixelNoise(values, columns, rows);
  const repaired = section.repair ? repairHeight(values, columns, rows, noiseM) : new Uint8Array(values.length);
  if (!fillMissing) {
    for (let i = 0; i < values.length; i++) {
      if (!Number.isNaN(raw[i]!)) continue;
      values[i] = Number.NaN;
      repaired[i] = 0;
    }
  }
  const ground = within(values, inside);
  const { isGround, centre } = groundTest(ground, columns, rows);
  lowerBy(values, centre);
  return {
    levelled: scalarMap(grid, values),
    repaired: maskMap(grid, repaired),
    repairedPixels: sumOf(repaired),
    noiseM: pixelNoise(values, columns, rows, isGround),
    plane: levels.plane,
    tiltM: formRange(levels.form, columns, rows),
  };
}

function sumOf(marks: Uint8Array): number {
  let sum = 0;
  for (let i = 0; i < marks.length; i++) sum += marks[i]!;
  return sum;
}

/** A pixel is ground when it lies within the scatter around the most common height, the centre. */
function groundTest(values: Float32Array, columns: number, rows: number): { isGround: (index: number) => boolean; centre: number } {
  const { centre, scatter } = centreAndScatter(sampled(values, columns, rows));
  const low = centre - 4 * scatter;
  const high = centre + 3 * scatter;
  return { isGround: (i) => values[i]! >= low && values[i]! <= high, centre };
}

/** Finite values, thinned evenly to what a level needs. */
function sampled(values: Float32Array, columns: number, rows: number): Float64Array {
  return subSample(values, columns, rows, sampleStep(presentCount(values)));
}

function repairHeight(values: Float32Array, columns: number, rows: number, noise: number): Uint8Array {
  const marks = markBrokenRuns(values, columns, rows, { noise, minLength: runLength });
  markSpikes(values, marks, columns, rows, noise, deepestPitM);
  const before = values.slice();
  // A run is known to be broken; a missing point between neighbours that disagree is not known at all.
  const filled = fillFromNeighbours(values, marks, columns, rows, Math.max(1e-9, 12 * noise), Number.POSITIVE_INFINITY);
  // With nothing beside it to fill it from, what was measured stands.
  for (let i = 0; i < values.length; i++) if (Number.isNaN(values[i]!)) values[i] = before[i]!;
  return filled;
}
