/** Slow loss of conductance along the slow axis, as a tip does when it wears. */
import { fitForm } from './fit-form.ts';
import { formSurface } from './form.ts';
import { lineDifferencesSolved } from './lines.ts';
import { pixelNoise } from './noise.ts';

export interface Wear {
  /** Decades to add to every row's log current to undo the drift; zeros when it is not applied (too small, or a gain). */
  readonly perRow: Float64Array;
  /** Decades lost from first to last line; positive = conductance lost. */
  readonly decades: number;
}

/**
 * Differences beyond a window between nearby lines are terrace edges. The window follows the pixel noise of the log current (four standard
 * deviations of a difference) within these limits, decades: the upper one is still below a layer of any likely barrier.
 */
const window = { least: 0.15, most: 0.4 };
/** A smaller loss, or any gain, cannot be told from the slow variation of a real barrier. */
export const leastWearDecades = 0.2;
/** Rounds in which the window is centred on the drift found so far; a window centred on zero would cut one side of the scatter and shrink the drift. */
const rounds = 4;

/**
 * Drift of log current from line to line, from medians of differences between nearby lines: a terrace edge moves few
 * pixels' difference, wear moves all. The accumulated drift is kept only as a smooth curve (second order), because
 * what varies faster than the whole map is barrier rather than tip.
 *
 * @param log10 log10 of the current, NaN missing; @param use admits uncensored ground.
 */
export function findWear(log10: Float32Array, columns: number, rows: number, use: (index: number) => boolean, slowUp: boolean): Wear {
  const noise = pixelNoise(log10, columns, rows, use);
  const limit = Math.min(window.most, Math.max(window.least, 4 * Math.SQRT2 * (noise || 0)));
  const curve = new Float64Array(rows);
  let rest: Float32Array = log10;
  for (let round = 0; round < rounds; round++) {
    const drift = Float32Array.from(lineDifferencesSolved(rest, columns, rows, use, limit));
    const found = formSurface(fitForm(drift, 1, rows, 2, () => true), 1, rows);
    let largest = 0;
    for (let r = 0; r < rows; r++) {
      curve[r]! += found[r]!;
      largest = Math.max(largest, Math.abs(found[r]! - found[0]!));
    }
    if (largest < 0.005) break;
    rest = log10.map((value, i) => value - curve[(i / columns) | 0]!);
  }
  const first = slowUp ? rows - 1 : 0;
  const last = slowUp ? 0 : rows - 1;
  const decades = curve[first]! - curve[last]!;
  const perRow = new Float64Array(rows);
  if (decades >= leastWearDecades) for (let r = 0; r < rows; r++) perRow[r] = curve[first]! - curve[r]!;
  return { perRow, decades };
}
