/** Red-black relaxation of the linearised sheets, one or both at a time. */
import type { Level } from './network.ts';

/** Relaxes the pixels whose row + column has the parity `colour`. Both sheets of a pixel are solved together. */
export function relax(level: Level, colour: 0 | 1): void {
  if (level.fields.length === 2) relaxBoth(level, colour);
  else relaxOne(level, colour);
}

function relaxOne(level: Level, colour: 0 | 1): void {
  const { width, columns, rows, inverse0 } = level;
  const { right, down, x, rhs } = level.fields[0]!;
  for (let r = 1; r <= rows; r++) {
    const end = r * width + columns;
    for (let i = r * width + 1 + ((r + colour) & 1); i <= end; i += 2) {
      x[i] = (rhs[i]! + right[i]! * x[i + 1]! + right[i - 1]! * x[i - 1]! + down[i]! * x[i + width]! + down[i - width]! * x[i - width]!) * inverse0[i]!;
    }
  }
}

function relaxBoth(level: Level, colour: 0 | 1): void {
  const { width, columns, rows, inverse0, inverse1, inverse01 } = level;
  const { right: rightA, down: downA, x: a, rhs: rhsA } = level.fields[0]!;
  const { right: rightB, down: downB, x: b, rhs: rhsB } = level.fields[1]!;
  for (let r = 1; r <= rows; r++) {
    const end = r * width + columns;
    for (let i = r * width + 1 + ((r + colour) & 1); i <= end; i += 2) {
      const p = rhsA[i]! + rightA[i]! * a[i + 1]! + rightA[i - 1]! * a[i - 1]! + downA[i]! * a[i + width]! + downA[i - width]! * a[i - width]!;
      const q = rhsB[i]! + rightB[i]! * b[i + 1]! + rightB[i - 1]! * b[i - 1]! + downB[i]! * b[i + width]! + downB[i - width]! * b[i - width]!;
      const cross = inverse01[i]!;
      a[i] = inverse0[i]! * p + cross * q;
      b[i] = cross * p + inverse1[i]! * q;
    }
  }
}

/** Adds the residual of `level`, summed over joined pixels, to the cleared right-hand side of `next`. */
export function restrictResidual(level: Level, next: Level): void {
  const both = level.fields.length === 2;
  const { width, columns, rows, shiftX, shiftY, slope01 } = level;
  for (let f = 0; f < level.fields.length; f++) {
    const { right, down, feed, free, x, rhs } = level.fields[f]!;
    const slope = f === 0 ? level.slope0 : level.slope1;
    const other = both ? level.fields[1 - f]!.x : x;
    const coarse = next.fields[f]!.rhs;
    coarse.fill(0);
    for (let r = 1; r <= rows; r++) {
      const j0 = (((r - 1) >> shiftY) + 1) * next.width + 1;
      for (let c = 0; c < columns; c++) {
        const i = r * width + 1 + c;
        if (free[i] === 0) continue;
        const here = x[i]!;
        let residual = rhs[i]! - (feed[i]! + slope[i]!) * here
          + right[i]! * (x[i + 1]! - here) + right[i - 1]! * (x[i - 1]! - here)
          + down[i]! * (x[i + width]! - here) + down[i - width]! * (x[i - width]! - here);
        if (both) residual -= slope01[i]! * other[i]!;
        coarse[j0 + (c >> shiftX)]! += residual;
      }
    }
  }
}

/** Adds the coarser level's correction to every free pixel. */
export function addCorrection(level: Level, next: Level): void {
  const { width, columns, rows, shiftX, shiftY } = level;
  for (let f = 0; f < level.fields.length; f++) {
    const { free, x } = level.fields[f]!;
    const coarse = next.fields[f]!.x;
    for (let r = 0; r < rows; r++) {
      const i0 = (r + 1) * width + 1;
      const j0 = ((r >> shiftY) + 1) * next.width + 1;
      for (let c = 0; c < columns; c++) x[i0 + c]! += free[i0 + c]! * coarse[j0 + (c >> shiftX)]!;
    }
  }
}
