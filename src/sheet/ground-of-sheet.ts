/** Where a sheet lies, where it is fed, and which of its ground the feed reaches. */
import type { Grid } from '../grid/maps.ts';

/**
 * One sheet on the grid with a ring of one pixel around it: index of pixel (row, column) is
 * (row + 1)·(columns + 2) + column + 1. The ring spares every loop its border tests.
 */
export interface SheetGround {
  /** 1 where the sheet conducts. */
  readonly ground: Uint8Array;
  /** 1 where the terminal lies: contact metal, or everything outside the outer edge when no contact is drawn. */
  readonly terminal: Uint8Array;
  /** 1 on ground that a path inside the sheet joins to the terminal. */
  readonly reached: Uint8Array;
  /** Whether a contact is drawn. */
  readonly drawn: boolean;
}

/** Copies a map-sized mask into a ringed one (ring 0). */
export function ringed(grid: Grid, mask: Uint8Array): Uint8Array {
  const { columns, rows } = grid;
  const result = new Uint8Array((columns + 2) * (rows + 2));
  for (let r = 0; r < rows; r++) result.set(mask.subarray(r * columns, (r + 1) * columns), (r + 1) * (columns + 2) + 1);
  return result;
}

/**
 * Finds a sheet's terminal and the ground it reaches.
 *
 * Ground joins ground through the four sides of a pixel. Contact metal feeds the ground under it and
 * the ground beside it. Without metal the terminal runs along the whole outer edge; a hole's rim is
 * not fed, except where the hole holds an island that would else be cut off.
 *
 * @param grid The map's grid.
 * @param ground Shape rows·columns, 1 where the sheet conducts.
 * @param metal Shape rows·columns, 1 under contact metal; absent when no contact is drawn.
 * @param resistive False for a perfect conductor: then without metal the terminal's place is left empty.
 */
export function groundOfSheet(grid: Grid, ground: Uint8Array, metal: Uint8Array | undefined, resistive = true): SheetGround {
  const sheet = ringed(grid, ground);
  // Where nothing is drawn and nothing drops, all of the sheet is at the terminal's potential and nobody asks where that is.
  if (!metal && !resistive) return { ground: sheet, terminal: new Uint8Array(sheet.length), reached: sheet, drawn: false };
  if (metal) {
    const terminal = ringed(grid, metal);
    return { ground: sheet, terminal, reached: reachedFrom(grid, sheet, terminal), drawn: true };
  }
  const width = grid.columns + 2;
  const open = sheet.map((value) => 1 - value);
  const ring = new Uint8Array(sheet.length);
  ring.fill(1, 0, width);
  ring.fill(1, sheet.length - width);
  for (let i = 0; i < sheet.length; i += width) ring[i] = ring[i + width - 1] = 1;
  const around = flooded(open, ring, eightSides(width));
  const reached = reachedFrom(grid, sheet, around);
  if (reached.every((value, i) => value === sheet[i])) return { ground: sheet, terminal: around, reached, drawn: false };
  const islands = sheet.map((value, i) => value & (1 - reached[i]!));
  const shores = around.slice();
  for (let i = width; i < sheet.length - width; i++) {
    if (islands[i] === 1) for (const offset of fourSides(width)) shores[i + offset]! |= open[i + offset]!;
  }
  const terminal = flooded(open, shores, eightSides(width));
  return { ground: sheet, terminal, reached: sheet.slice(), drawn: false };
}

function fourSides(width: number): readonly number[] {
  return [-1, 1, -width, width];
}

/** For what is not sheet: there corners join, because the sheet's own corners do not. */
function eightSides(width: number): readonly number[] {
  return [...fourSides(width), -width - 1, -width + 1, width - 1, width + 1];
}

/** Sheet joined to the terminal under it or beside it. */
function reachedFrom(grid: Grid, sheet: Uint8Array, terminal: Uint8Array): Uint8Array {
  const width = grid.columns + 2;
  const seeds = new Uint8Array(sheet.length);
  for (let r = 1; r <= grid.rows; r++) {
    for (let i = r * width + 1; i <= r * width + grid.columns; i++) {
      if (sheet[i] === 1 && (terminal[i]! | terminal[i - 1]! | terminal[i + 1]! | terminal[i - width]! | terminal[i + width]!) === 1) seeds[i] = 1;
    }
  }
  return flooded(sheet, seeds, fourSides(width));
}

/** Pixels of `mask` reached from `seeds` by steps of `offsets`. */
function flooded(mask: Uint8Array, seeds: Uint8Array, offsets: readonly number[]): Uint8Array {
  const reached = seeds.slice();
  const waiting = new Int32Array(mask.length);
  let count = 0;
  for (let i = 0; i < seeds.length; i++) if (seeds[i] === 1) waiting[count++] = i;
  while (count > 0) {
    const i = waiting[--count]!;
    for (const offset of offsets) {
      // Beyond the array's ends `mask` is undefined, which is no 1.
      const next = i + offset;
      if (mask[next] === 1 && reached[next] === 0) {
        reached[next] = 1;
        waiting[count++] = next;
      }
    }
  }
  return reached;
}
