/** How far this map's usable area is known. */
import type { Grid } from '../grid/maps.ts';
import { codeOf } from './book-causes.ts';

export interface IntervalInput {
  readonly grid: Grid;
  readonly codes: Uint8Array;
  /** Log10 current and the ladder's step and error; absent for a height alone. */
  readonly log10?: Float32Array;
  readonly referenceLog10?: number;
  readonly stepDecades?: number;
  readonly stepSeDecades?: number;
  /** Height above the local ground is not kept; the flaws' area stands for what a shift of the thresholds could move. */
  readonly pixelAreaM2: number;
}

/** Standard deviation of the position of an outline, in pixels: an edge is placed to a whole pixel, and thresholds move it by about as much. */
const outlinePx = 0.35;
/** Part of the ladder's step by which the border between two terraces may lie elsewhere (one standard deviation). */
const borderPart = 0.06;

/**
 * Half-width of the 95 % interval of the usable area, m². Two independent parts in quadrature:
 *
 * - outlines: everything that borders usable ground is placed to about a third of a pixel, and errs the same way along one outline, so the
 *   error is length × position error;
 * - band edges and anchor: pixels whose log current lies within a small part of the step (or the ladder's own error) from the borders of the
 *   reference's terrace could belong to either side.
 *
 * A map is a census of its footprint: no sampling error is added. Not included: another choice of reference (said as a remark) and effects that the
 * chain does not model.
 */
export function usableHalfWidth(input: IntervalInput): number {
  const outline = outlinePx * outlineArea(input);
  const border = borderArea(input);
  return 1.96 * Math.hypot(outline, border);
}

/** Area of a one-pixel seam along all borders of usable ground with flaws or other ground (the map's own border is none). */
function outlineArea(input: IntervalInput): number {
  const { columns, rows, pitchXM, pitchYM } = input.grid;
  const usable = codeOf('usable');
  let edges = 0;
  for (let r = 0, i = 0; r < rows; r++) {
    for (let c = 0; c < columns; c++, i++) {
      const here = input.codes[i] === usable;
      if (c + 1 < columns && here !== (input.codes[i + 1] === usable)) edges++;
      if (r + 1 < rows && here !== (input.codes[i + columns] === usable)) edges++;
    }
  }
  // Errors along different outlines partly cancel: with about a dozen independent ones a third of the sum remains.
  return (edges * (Math.PI / 4) * pitchXM * pitchYM) / 3;
}

function borderArea(input: IntervalInput): number {
  const { log10, referenceLog10, stepDecades } = input;
  if (!log10 || referenceLog10 === undefined || !stepDecades || Number.isNaN(referenceLog10)) return 0;
  const reach = Math.hypot(borderPart * stepDecades, input.stepSeDecades ?? 0);
  const [usable, thin, thick] = [codeOf('usable'), codeOf('thin'), codeOf('thick')];
  let near = 0;
  for (let i = 0; i < log10.length; i++) {
    const code = input.codes[i]!;
    if (code !== usable && code !== thin && code !== thick) continue;
    const distance = Math.abs(Math.abs(log10[i]! - referenceLog10) - stepDecades / 2);
    if (distance < reach) near++;
  }
  return (near / 2) * input.pixelAreaM2;
}
