/** Carries the tunnel elements' slopes to the coarser levels and inverts each pixel's own block. */
import type { Level } from './network.ts';

/** Sums the slopes of each level into the next and prepares every level's relaxation. The finest level's slopes are given. */
export function spreadSlopes(levels: readonly Level[], from: number): void {
  for (let k = from; k < levels.length; k++) {
    const level = levels[k]!;
    const next = levels[k + 1];
    if (next) {
      sumInto(level, level.slope0, next, next.slope0);
      if (level.fields.length === 2) {
        sumInto(level, level.slope1, next, next.slope1);
        sumInto(level, level.slope01, next, next.slope01);
      }
    }
    if (level.fields.length === 2) invertBlocks(level);
    else invert(level);
  }
}

function sumInto(level: Level, fine: Float32Array, next: Level, coarse: Float32Array): void {
  const { shiftX, shiftY, width, columns, rows } = level;
  coarse.fill(0);
  for (let r = 0; r < rows; r++) {
    const i0 = (r + 1) * width + 1;
    const j0 = ((r >> shiftY) + 1) * next.width + 1;
    for (let c = 0; c < columns; c++) coarse[j0 + (c >> shiftX)]! += fine[i0 + c]!;
  }
}

function invert(level: Level): void {
  const { slope0, inverse0, size } = level;
  const { sum, free } = level.fields[0]!;
  for (let i = 0; i < size; i++) inverse0[i] = free[i] === 1 ? 1 / (sum[i]! + slope0[i]!) : 0;
}

function invertBlocks(level: Level): void {
  const { slope0, slope1, slope01, inverse0, inverse1, inverse01, size } = level;
  const first = level.fields[0]!;
  const second = level.fields[1]!;
  for (let i = 0; i < size; i++) {
    const a = first.sum[i]!;
    const b = second.sum[i]!;
    const s0 = slope0[i]!;
    const s1 = slope1[i]!;
    const s01 = slope01[i]!;
    if (first.free[i] === 1 && second.free[i] === 1) {
      // Expanded so that two large slopes do not cancel: where both sheets are free here, s0·s1 = s01².
      const determinant = a * b + a * s1 + b * s0 + Math.max(0, s0 * s1 - s01 * s01);
      inverse0[i] = (b + s1) / determinant;
      inverse1[i] = (a + s0) / determinant;
      inverse01[i] = -s01 / determinant;
    } else {
      inverse0[i] = first.free[i] === 1 ? 1 / (a + s0) : 0;
      inverse1[i] = second.free[i] === 1 ? 1 / (b + s1) : 0;
      inverse01[i] = 0;
    }
  }
}
