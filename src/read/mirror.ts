/** Mirrors a map in place. */
import type { Values } from './decoded-map.ts';

/** Mirrors values (length rows·columns, row-major) left to right and/or top to bottom, in place. */
export function mirrorMap(values: Values, columns: number, rows: number, leftRight: boolean, topBottom: boolean): void {
  if (leftRight) for (let r = 0; r < rows; r++) values.subarray(r * columns, (r + 1) * columns).reverse();
  if (!topBottom) return;
  for (let r = 0; r < rows >> 1; r++) {
    const top = values.slice(r * columns, (r + 1) * columns);
    values.copyWithin(r * columns, (rows - 1 - r) * columns, (rows - r) * columns);
    values.set(top, (rows - 1 - r) * columns);
  }
}
