/**
 * The shapes every stage agrees on: a map is a 2-D `ndarray`, row-major, row 0 at the
 * picture's top, `shape = [rows, columns]`. NaN means missing.
 */
import ndarray from 'ndarray';
import type { NdArray } from 'ndarray';

/** Values of one quantity in SI units; NaN where missing. */
export type ScalarMap = NdArray<Float32Array>;
/** 1 where the named condition holds, 0 elsewhere. */
export type MaskMap = NdArray<Uint8Array>;
/** Numbers of regions, 0 for none. */
export type LabelMap = NdArray<Uint32Array>;

/**
 * How pixels lie on the sample. Pitches are in metres and may differ in x and y.
 * x points right, y points up, the origin is the map's lower-left corner and the centre of
 * pixel (row r, column c) lies at ((c + ½)·pitchXM, (rows − r − ½)·pitchYM).
 */
export interface Grid {
  readonly columns: number;
  readonly rows: number;
  readonly pitchXM: number;
  readonly pitchYM: number;
}

/** Area of one pixel in m². */
export function pixelAreaM2(grid: Grid): number {
  return grid.pitchXM * grid.pitchYM;
}

/** Number of pixels. */
export function pixelCount(grid: Grid): number {
  return grid.columns * grid.rows;
}

/** Centre of a pixel in metres (x right, y up, origin at the lower-left corner). */
export function pixelCentre(grid: Grid, row: number, column: number): { xM: number; yM: number } {
  return { xM: (column + 0.5) * grid.pitchXM, yM: (grid.rows - row - 0.5) * grid.pitchYM };
}

/** A scalar map over `data` (length rows·columns), or filled with NaN when no data is given. */
export function scalarMap(grid: Grid, data?: Float32Array): ScalarMap {
  return ndarray(checked(grid, data ?? new Float32Array(pixelCount(grid)).fill(Number.NaN)), [grid.rows, grid.columns]);
}

/** A mask over `data` (length rows·columns), or all zero when no data is given. */
export function maskMap(grid: Grid, data?: Uint8Array): MaskMap {
  return ndarray(checked(grid, data ?? new Uint8Array(pixelCount(grid))), [grid.rows, grid.columns]);
}

/** A label map over `data` (length rows·columns), or all zero when no data is given. */
export function labelMap(grid: Grid, data?: Uint32Array): LabelMap {
  return ndarray(checked(grid, data ?? new Uint32Array(pixelCount(grid))), [grid.rows, grid.columns]);
}

function checked<T extends Float32Array | Uint8Array | Uint32Array>(grid: Grid, data: T): T {
  if (data.length !== pixelCount(grid)) {
    throw new RangeError(`a map of ${grid.columns} × ${grid.rows} pixels needs ${pixelCount(grid)} values, got ${data.length}`);
  }
  return data;
}
