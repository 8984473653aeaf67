import type { Grid, ScalarMap } from '../grid/maps.ts';
import { maskMap, scalarMap } from '../grid/maps.ts';
import { fillFromNeighbours, markBrokenRuns, markSpikes } from './broken-runs.ts';
import { lowerScatter, mostCommon } from './centre.ts';
import { fitForm, fitGroundForm, presentCount, sampleStep, subSample } from './fit-form.ts';
import { formSurface, subtractForm } from './form.ts';
import type { HeightGround } from './ground.ts';
import { lineOffsets } from './lines.ts';
import { pixelNoise } from './noise.ts';
import type { GroundSection } from './recipe.ts';

/** Shortest broken run that is repaired, pixels along the fast axis. */
const runLength = 8;
/** A single pixel deeper than this below its surroundings is a spike; a probe does not reach deeper into a pinhole one pixel wide. */
const deepestPitM = 6e-9;

/**
 * Levels a height map: robust form with features masked, line offsets from differences between nearby lines, repair of
 * broken runs, and the form once more over the ground that is left.
 *
 * Levelled ground has its most common height at 0. A form of the section's order added to the input does not change
 * the result (to float32 rounding). Missing pixels stay missing unless `repair` can fill them from agreeing neighbours.
 *
 * @param height shape [rows, columns], metres, NaN missing.
 * @param fillMissing false where the height is all there is: then a missing point must stay one, because nothing else was measured there.
 * @param inside 1 on the ground that the form and the line offsets follow; all of the map when absent.
 * @throws never for finite or missing values; a map without any finite value must be refused before.
 */
export function levelHeight(height: ScalarMap, grid: Grid, section: GroundSection, inside?: Uint8Array, fillMissing = true): HeightGround {
  const { columns, rows } = grid;
  const raw = height.data;
  // What lies beside the flake has a level of its own and no say in the flake's form.
  const within = (map: Float32Array): Float32Array => (inside ? map.map((value, i) => (inside[i] === 1 ? value : Number.NaN)) : map);
  const first = fitGroundForm(within(raw), columns, rows, section.order);
  let values = subtractForm(raw, first, columns, rows);
  const isGround = groundTest(within(values), columns, rows);
  const offsets = section.lines ? lineOffsets(values, columns, rows, isGround) : new Float64Array(rows);
  values = values.map((value, i) => value - offsets[(i / columns) | 0]!);

  const noiseM = pixelNoise(values, columns, rows);
  const repaired = section.repair ? repairHeight(values, columns, rows, noiseM) : new Uint8Array(values.length);
  if (!fillMissing) {
    for (let i = 0; i < values.length; i++) {
      if (!Number.isNaN(raw[i]!)) continue;
      values[i] = Number.NaN;
      repaired[i] = 0;
    }
  }

  const groundAgain = groundTest(within(values), columns, rows);
  const again = fitForm(values, columns, rows, section.order, groundAgain);
  values = subtractForm(values, again, columns, rows);
  const zero = mostCommon(sampled(within(values), columns, rows));
  values = values.map((value) => value - zero);

  let repairedPixels = 0;
  for (const mark of repaired) repairedPixels += mark;
  return {
    levelled: scalarMap(grid, values),
    repaired: maskMap(grid, repaired),
    repairedPixels,
    noiseM: pixelNoise(values, columns, rows, groundAgain),
    tiltM: peakToPeak(formSurface(first, columns, rows)),
  };
}

/** A pixel is ground when it lies within the scatter around the most common height. */
function groundTest(values: Float32Array, columns: number, rows: number): (index: number) => boolean {
  const sample = sampled(values, columns, rows);
  const centre = mostCommon(sample);
  const scatter = lowerScatter(sample, centre);
  const low = centre - 4 * scatter;
  const high = centre + 3 * scatter;
  return (i) => values[i]! >= low && values[i]! <= high;
}

/** Finite values, thinned evenly to what a level needs. */
function sampled(values: Float32Array, columns: number, rows: number): Float64Array {
  return subSample(values, columns, rows, sampleStep(presentCount(values)));
}

function repairHeight(values: Float32Array, columns: number, rows: number, noise: number): Uint8Array {
  const marks = markBrokenRuns(values, columns, rows, { noise, minLength: runLength });
  markSpikes(values, marks, columns, rows, noise, deepestPitM);
  const before = values.slice();
  const filled = fillFromNeighbours(values, marks, columns, rows, Math.max(1e-9, 12 * noise));
  // Neighbours that disagree do not show that the run was broken: then what was measured stands.
  for (let i = 0; i < values.length; i++) if (Number.isNaN(values[i]!)) values[i] = before[i]!;
  return filled;
}

function peakToPeak(surface: Float64Array): number {
  let low = Number.POSITIVE_INFINITY;
  let high = Number.NEGATIVE_INFINITY;
  for (const value of surface) {
    if (value < low) low = value;
    if (value > high) high = value;
  }
  return high - low;
}
