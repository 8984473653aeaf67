/** Every n-th pixel of a map, for what needs no more. */
import type { Grid } from '../grid/maps.ts';

/** The grid of every `step`-th pixel in each direction; a rest at the right and lower border is left out. */
export function thinGrid(grid: Grid, step: number): Grid {
  return {
    columns: Math.floor(grid.columns / step), rows: Math.floor(grid.rows / step),
    pitchXM: grid.pitchXM * step, pitchYM: grid.pitchYM * step,
  };
}

/** Values at the middle of each block of `step` × `step` pixels, row-major on `thinGrid`. */
export function thin<Data extends Float32Array | Uint8Array>(data: Data, grid: Grid, step: number): Data {
  const { columns, rows } = thinGrid(grid, step);
  const out = data.slice(0, columns * rows) as Data;
  const middle = step >> 1;
  for (let r = 0; r < rows; r++) {
    for (let c = 0; c < columns; c++) out[r * columns + c] = data[(r * step + middle) * grid.columns + c * step + middle]!;
  }
  return out;
}
