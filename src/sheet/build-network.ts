/** Lays the finest network over the sheets' ground. */
import type { Grid } from '../grid/maps.ts';
import type { SheetGround } from './ground-of-sheet.ts';
import { emptyLevel, sumConductances } from './network.ts';
import type { Level, SheetField } from './network.ts';

/** A sheet that resists: its ground, its resistance, and that of its contact's edge. */
export interface ResistingSheet {
  readonly ground: SheetGround;
  readonly sheetOhm: number;
  /** Resistance of a contact's edge times its length, Ω·m. */
  readonly contactOhmM: number;
}

/**
 * Finite volumes: one unknown in each pixel's centre, one conductance across each shared side.
 * Ground under contact metal is held at the terminal and has no unknown. Ground beside the terminal
 * is joined to it through half a pixel of sheet in series with the contact's edge.
 *
 * All conductances are multiplied by `unitOhm`, so currents come in volts over that resistance.
 *
 * @param sheets One or two sheets.
 * @returns The level, its sources still zero.
 */
export function buildNetwork(grid: Grid, sheets: readonly ResistingSheet[], unitOhm: number): Level {
  const { columns, rows, pitchXM, pitchYM } = grid;
  const level = emptyLevel(columns, rows, pitchXM, pitchYM, sheets.map(({ sheetOhm }) => ({
    halfX: ((sheetOhm / unitOhm) * pitchXM) / (2 * pitchYM),
    halfY: ((sheetOhm / unitOhm) * pitchYM) / (2 * pitchXM),
  })));
  sheets.forEach((sheet, f) => {
    const field = level.fields[f]!;
    const { reached, terminal, ground } = sheet.ground;
    for (let i = 0; i < field.free.length; i++) field.free[i] = ground[i]! & reached[i]! & (1 - terminal[i]!);
    joinPixels(level, field);
    joinTerminal(level, field, terminal, sheet.contactOhmM / unitOhm);
  });
  sumConductances(level);
  return level;
}

function joinPixels(level: Level, field: SheetField): void {
  const { columns, rows, width } = level;
  const { free, right, down, halfX, halfY } = field;
  for (let r = 1; r <= rows; r++) {
    for (let i = r * width + 1; i <= r * width + columns; i++) {
      if (free[i] === 0) continue;
      if (free[i + 1] === 1) right[i] = 1 / (2 * halfX);
      if (free[i + width] === 1) down[i] = 1 / (2 * halfY);
    }
  }
}

function joinTerminal(level: Level, field: SheetField, terminal: Uint8Array, contactM: number): void {
  const { columns, rows, width, pitchXM, pitchYM } = level;
  const { free, feedX, feedY, halfX, halfY } = field;
  for (let r = 1; r <= rows; r++) {
    for (let i = r * width + 1; i <= r * width + columns; i++) {
      if (free[i] === 0) continue;
      const sidesX = terminal[i - 1]! + terminal[i + 1]!;
      const sidesY = terminal[i - width]! + terminal[i + width]!;
      if (sidesX + sidesY === 0) continue;
      // A slanted edge is a staircase of pixel sides. In a pixel at a step the edge is the diagonal, not both sides.
      const share = sidesX > 0 && sidesY > 0 ? Math.hypot(pitchXM, pitchYM) / (pitchXM + pitchYM) : 1;
      if (sidesX > 0) feedX[i] = sidesX / (halfX + contactM / (pitchYM * share));
      if (sidesY > 0) feedY[i] = sidesY / (halfY + contactM / (pitchXM * share));
    }
  }
}
