/** What every decoder gives: numbers on a rectangle and only what the file itself says about them. */
import { Problem } from '../problems/problem.ts';
import type { Direction, Quantity } from './sample.ts';

export type Values = Float32Array | Float64Array;

/**
 * What a file says about the size of its pixels.
 * `tag`: by our own description, certain. `resolution`: resolution tags in cm or inch, in metres.
 * `scale`: a pixel scale whose unit nobody stated; `plain` is false when the file carries a
 * geographic coordinate system, in which case the scale is never taken for µm on its own.
 */
export type PitchStatement =
  | { readonly by: 'tag' | 'resolution'; readonly xM: number; readonly yM: number }
  | { readonly by: 'scale'; readonly x: number; readonly y: number; readonly plain: boolean };

/** A unit as the file spells it. `tag`: by our own description, certain; `description`: by somebody else's. */
export interface UnitStatement {
  readonly word: string;
  readonly by: 'tag' | 'description';
}

export interface DecodedMap {
  /** Name of the page within its file, empty when the file gives none. */
  readonly label: string;
  readonly columns: number;
  readonly rows: number;
  /** Length rows·columns, row 0 at the top, in the file's own unit; NaN where missing, possibly infinite. */
  readonly values: Values;
  readonly pitches: readonly PitchStatement[];
  readonly unit?: UnitStatement;
  readonly quantity?: Quantity;
  readonly direction?: Direction;
  readonly biasV?: number;
}

/** Pixels of 10 µm and more are no probe scan: resolution tags and bare scales are then not believed. */
export const largestPitchM = 10e-6;
/** Pixels of the largest map that is read (20 000 × 20 000). */
export const pixelLimit = 4e8;
/** Least number of rows and of columns of a map. */
export const leastSide = 4;

/** Refuses a rectangle that is no map or too large, before anything is allocated for it. */
export function checkSize(file: string, columns: number, rows: number): void {
  if (columns * rows > pixelLimit) throw new Problem('map-too-large', { file, columns, rows, limit: pixelLimit });
  if (columns < leastSide || rows < leastSide) throw new Problem('map-too-small', { file, columns, rows, least: leastSide });
}
