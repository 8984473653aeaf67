/** The same device solved the plain way: one dense matrix, Gauss elimination, damped Newton. Small maps only. */
import type { Grid } from '../../src/grid/maps.ts';

export interface DenseSheet {
  readonly sheetOhm: number;
  readonly ground: Uint8Array;
  readonly metal: Uint8Array;
}

/** Local bias per pixel where `ratio` is a number, for straight contact edges. */
export function denseLocalBias(
  grid: Grid, sheets: readonly DenseSheet[], ratio: readonly number[], density: (pixel: number, biasV: number) => number, biasV: number, contactOhmUm: number,
): number[] {
  const { columns, rows, pitchXM, pitchYM } = grid;
  const count = columns * rows;
  const unknown = sheets.map(() => new Int32Array(count).fill(-1));
  let n = 0;
  sheets.forEach(({ ground, metal }, s) => ground.forEach((value, p) => { if (value === 1 && metal[p] === 0) unknown[s]![p] = n++; }));
  const network = Array.from({ length: n }, () => new Float64Array(n));
  sheets.forEach(({ sheetOhm, metal }, s) => {
    for (let p = 0; p < count; p++) {
      const i = unknown[s]![p]!;
      if (i < 0) continue;
      for (const [dx, dy] of [[1, 0], [-1, 0], [0, 1], [0, -1]] as const) {
        const [x, y] = [(p % columns) + dx, Math.floor(p / columns) + dy];
        if (x < 0 || y < 0 || x >= columns || y >= rows) continue;
        const q = y * columns + x;
        const [distance, side] = dx === 0 ? [pitchYM, pitchXM] : [pitchXM, pitchYM];
        const j = unknown[s]![q]!;
        if (j >= 0) {
          const g = side / (sheetOhm * distance);
          network[i]![i]! += g;
          network[i]![j]! -= g;
        } else if (metal[q] === 1) network[i]![i]! += 1 / ((sheetOhm * distance) / 2 / side + (contactOhmUm * 1e-6) / side);
      }
    }
  });
  const drops = new Float64Array(n);
  const local = (p: number) => biasV - sheets.reduce((sum, _, s) => sum + (unknown[s]![p]! >= 0 ? drops[unknown[s]![p]!]! : 0), 0);
  for (let step = 0; step < 200; step++) {
    const matrix = network.map((row) => row.slice());
    const rest = Float64Array.from(network, (row) => -row.reduce((sum, g, j) => sum + g * drops[j]!, 0));
    for (let p = 0; p < count; p++) {
      if (Number.isNaN(ratio[p]!)) continue;
      const v = local(p);
      const scale = ratio[p]! * pitchXM * pitchYM;
      const slope = (scale * (density(p, v + 1e-6) - density(p, v - 1e-6))) / 2e-6;
      for (const mine of unknown) {
        if (mine[p]! < 0) continue;
        rest[mine[p]!]! += scale * density(p, v);
        for (const other of unknown) if (other[p]! >= 0) matrix[mine[p]!]![other[p]!]! += slope;
      }
    }
    const change = eliminate(matrix, rest);
    const largest = change.reduce((most, value) => Math.max(most, Math.abs(value)), 0);
    // At most 0.1 V a step: slow, but sure from a cold start.
    for (let i = 0; i < n; i++) drops[i]! += change[i]! * Math.min(1, 0.1 / largest);
    if (largest < 1e-11) return ratio.map((_, p) => local(p));
  }
  throw new Error('the dense solution did not settle');
}

function eliminate(matrix: Float64Array[], rest: Float64Array): Float64Array {
  const n = rest.length;
  // Symmetric and positive definite: no pivoting needed.
  for (let k = 0; k < n; k++) {
    for (let i = k + 1; i < n; i++) {
      const factor = matrix[i]![k]! / matrix[k]![k]!;
      if (factor === 0) continue;
      for (let j = k; j < n; j++) matrix[i]![j]! -= factor * matrix[k]![j]!;
      rest[i]! -= factor * rest[k]!;
    }
  }
  for (let i = n - 1; i >= 0; i--) {
    for (let j = i + 1; j < n; j++) rest[i]! -= matrix[i]![j]! * rest[j]!;
    rest[i]! /= matrix[i]![i]!;
  }
  return rest;
}
