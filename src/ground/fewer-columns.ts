/** Every n-th column of a wide map, and back. */
import type { Grid } from '../grid/maps.ts';

/** Mark of pixels in no segment. */
export const inNone = 2;

/** Every n-th column, from the middle of each group of n. */
export function columnsOf(values: Float32Array, { columns, rows }: Grid, every: number): Float32Array {
  const narrow = Math.floor(columns / every);
  const out = new Float32Array(narrow * rows);
  for (let r = 0, k = 0; r < rows; r++) for (let c = 0; c < narrow; c++, k++) out[k] = values[r * columns + c * every + (every >> 1)]!;
  return out;
}

/**
 * Planes and marks of every pixel from those of every n-th column: a pixel takes over by how much the plane beside it was moved, where both are known to the current
 * or neither is.
 *
 * @param narrow what was found, and `planes`, the current's planes it was found with; @param planes the current's planes at every pixel.
 */
export function widened(
  narrow: { readonly plane: Float32Array; readonly terrace: Uint8Array; readonly planes: Float32Array | undefined }, planes: Float32Array | undefined, { columns, rows }: Grid, every: number,
): { plane: Float32Array; terrace: Uint8Array } {
  const width = Math.floor(columns / every);
  const beside = new Uint32Array(columns);
  for (let c = 0; c < columns; c++) beside[c] = Math.min(width - 1, Math.floor(c / every));
  const plane = new Float32Array(columns * rows);
  const terrace = new Uint8Array(plane.length);
  for (let r = 0; r < rows; r++) {
    widenMarks(narrow.terrace, r * width, beside, terrace, r * columns);
    if (planes && narrow.planes) widenMoves(narrow.plane, narrow.planes, r * width, beside, planes, plane, terrace, r * columns);
    else widenPlanes(narrow.plane, r * width, beside, plane, r * columns);
  }
  return { plane, terrace };
}

function widenMarks(narrow: Uint8Array, start: number, beside: Uint32Array, out: Uint8Array, from: number): void {
  for (let c = 0; c < beside.length; c++) out[from + c] = narrow[start + beside[c]!]!;
}

function widenPlanes(narrow: Float32Array, start: number, beside: Uint32Array, out: Float32Array, from: number): void {
  for (let c = 0; c < beside.length; c++) out[from + c] = narrow[start + beside[c]!]!;
}

function widenMoves(
  narrow: Float32Array, narrowPlanes: Float32Array, start: number, beside: Uint32Array, planes: Float32Array, out: Float32Array, marks: Uint8Array, from: number,
): void {
  for (let c = 0; c < beside.length; c++) {
    const i = from + c;
    const k = start + beside[c]!;
    const own = planes[i]!;
    const there = narrowPlanes[k]!;
    if ((own === own) !== (there === there)) {
      out[i] = own;
      marks[i] = inNone;
    } else out[i] = own === own ? own + (narrow[k]! - there) : narrow[k]!;
  }
}
