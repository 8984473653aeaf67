/** Slow loss of conductance along the slow axis, as a tip does when it wears. */
import { fitForm, formSurface } from './form.ts';
import { lineDifferencesSolved } from './lines.ts';

export interface Wear {
  /** Decades to add to every row's log current to undo the drift; zeros when it is not applied (too small, or a gain). */
  readonly perRow: Float64Array;
  /** Decades lost from first to last line; positive = conductance lost. */
  readonly decades: number;
}

/** Differences beyond this between nearby lines are terrace edges, decades: less than half a layer of any likely barrier. */
const sameTerraceDecades = 0.15;
/** A smaller loss, or any gain, cannot be told from the slow variation of a real barrier. */
export const leastWearDecades = 0.2;

/**
 * Drift of log current from line to line, from medians of differences between nearby lines: a terrace edge moves few
 * pixels' difference, wear moves all. The accumulated drift is kept only as a smooth curve (second order), because
 * what varies faster than the whole map is barrier rather than tip.
 *
 * @param log10 log10 of the current, NaN missing; @param use admits uncensored ground.
 */
export function findWear(log10: Float32Array, columns: number, rows: number, use: (index: number) => boolean, slowUp: boolean): Wear {
  const drift = Float32Array.from(lineDifferencesSolved(log10, columns, rows, use, sameTerraceDecades));
  const curve = formSurface(fitForm(drift, 1, rows, 2, () => true), 1, rows);
  const first = slowUp ? rows - 1 : 0;
  const last = slowUp ? 0 : rows - 1;
  const decades = curve[first]! - curve[last]!;
  const perRow = new Float64Array(rows);
  if (decades >= leastWearDecades) for (let r = 0; r < rows; r++) perRow[r] = curve[first]! - curve[r]!;
  return { perRow, decades };
}
