/** Small devices for the sheet stage's tests. */
import { maskMap, scalarMap } from '../../src/grid/maps.ts';
import type { Grid, MaskMap, ScalarMap } from '../../src/grid/maps.ts';
import type { Outline, OutlineLayer } from '../../src/read/sample.ts';
import type { SheetInput } from '../../src/sheet/sheet-input.ts';

/** Grid with pitches in µm. */
export function createGrid(columns: number, rows: number, pitchXUm = 1, pitchYUm = pitchXUm): Grid {
  return { columns, rows, pitchXM: pitchXUm * 1e-6, pitchYM: pitchYUm * 1e-6 };
}

/** Rectangle from pixel edges: columns [left, right), rows [top, bottom). */
export function createBox(grid: Grid, layer: OutlineLayer, left: number, top: number, right: number, bottom: number): Outline {
  const x = (column: number) => column * grid.pitchXM;
  const y = (row: number) => (grid.rows - row) * grid.pitchYM;
  return { layer, rings: [[[x(left), y(bottom)], [x(right), y(bottom)], [x(right), y(top)], [x(left), y(top)], [x(left), y(bottom)]]] };
}

/** Mask from a picture: `#` is 1. */
export function createMask(picture: readonly string[]): Uint8Array {
  return Uint8Array.from(picture.join(''), (character) => (character === '#' ? 1 : 0));
}

export function fullMask(grid: Grid): MaskMap {
  return maskMap(grid, new Uint8Array(grid.columns * grid.rows).fill(1));
}

export function evenRatio(grid: Grid, log10 = 0): ScalarMap {
  return scalarMap(grid, new Float32Array(grid.columns * grid.rows).fill(log10));
}

/** Footprint everywhere, ratio 1, no outlines, band factor 3; override what matters. */
export function createInput(grid: Grid, more: Partial<SheetInput> = {}): SheetInput {
  return { grid, footprint: fullMask(grid), outlines: [], log10Relative: evenRatio(grid), bandFactor: 3, ...more };
}

/** Fowler–Nordheim shape of a 4 nm barrier (2.5 eV, mass 0.5), scaled to `full` A/m² at 4 V. */
export function tunnelDensity(full: number): (biasV: number) => number {
  const slope = 76.37167;
  return (v) => (v <= 0 ? 0 : full * (v / 4) ** 2 * Math.exp(slope / 4 - slope / v));
}

/** Repeatable numbers in [0, 1) (Park & Miller's multiplier). */
export function seeded(seed: number): () => number {
  let state = seed;
  return () => (state = (state * 16807) % 2147483647) / 2147483647;
}
