import type { Grid } from '../grid/maps.ts';
import type { ScanSection } from '../read/recipe.ts';
import type { Channel } from '../read/sample.ts';
import { shiftBetweenDirections } from './align-current.ts';
import { blockedAboveM } from './condition-current.ts';
import { currentFloor } from './current-floor.ts';
import { quantifiedOverFloor } from './current-limits.ts';
import type { CurrentGround, ReturnGround, RoughHeight } from './ground.ts';
import { clippedFrom, readAmplifier } from './read-amplifier.ts';
import type { GroundSection } from './recipe.ts';
import { turnedUp } from './turn-current.ts';
import { findDrift } from './wear.ts';
import type { Drift } from './wear.ts';

/** A return scan's current as far as the forward scan's needs it. */
export interface ReturnCurrent {
  readonly drift: Drift;
  readonly noiseA: number;
  readonly offsetA: number;
  readonly lagPx: number;
  /** log10 of the current, lag undone, at the floor at least; NaN missing. */
  readonly log10: Float32Array;
}

/** Reads offset, noise, lag and trend of the return scan's current. @param height roughly levelled height, of either direction. */
export function readReturnCurrent(channel: Channel, grid: Grid, section: GroundSection, scan: ScanSection, height: RoughHeight | undefined, slowUp: boolean): ReturnCurrent {
  const { columns, rows } = grid;
  const { values, sign } = turnedUp(channel);
  const levelled = height?.levelled.data;
  const tall = levelled && ((i: number) => levelled[i]! > blockedAboveM);
  // A time constant given for the forward scan runs the other way here.
  const turnedLag = section.lagPx === undefined ? section : { ...section, lagPx: -section.lagPx };
  const { zero, lag, saturation, values: unlagged } = readAmplifier(values, columns, rows, turnedLag, {
    blocked: tall, saturation: scan.saturationA, given: section.offsetA === undefined ? undefined : sign * section.offsetA,
  });
  const offsetFree = unlagged.map((value) => value - zero.offset);
  const { floorA } = currentFloor(zero, scan.floorA, offsetFree);
  const limit = clippedFrom(saturation) - zero.offset;
  const log10 = offsetFree.map((value) => (Number.isNaN(value) ? Number.NaN : Math.log10(Math.min(Math.max(value, floorA), limit))));
  const [from, to] = [Math.log10(floorA * quantifiedOverFloor), Math.log10(limit) - 1e-6];
  const drift = findDrift(log10, columns, rows, (i) => log10[i]! > from && log10[i]! < to && !tall?.(i), slowUp, (rows * grid.pitchYM) / (columns * grid.pitchXM));
  return { drift, noiseA: zero.noise, offsetA: zero.offset, lagPx: lag?.px ?? 0, log10 };
}

/** What the return scan measured, with its shift against the forward scan; undefined without a return scan. */
export function compareReturn(
  grid: Grid, forward: { height?: RoughHeight | undefined; current?: CurrentGround | undefined }, back: { height?: RoughHeight | undefined; current?: ReturnCurrent | undefined },
): ReturnGround | undefined {
  const { columns, rows } = grid;
  if (!back.height && !back.current) return undefined;
  const heightShift = back.height && forward.height && shiftBetweenDirections(forward.height.levelled.data, back.height.levelled.data, columns, rows);
  const shift = back.current && forward.current && shiftBetweenDirections(forward.current.log10.data, back.current.log10, columns, rows);
  const known = (found: typeof shift) => (found ? { shift: { ...found, undoneXPx: 0, undoneYPx: 0 } } : {});
  return {
    ...(back.height ? { height: { noiseM: back.height.noiseM, ...known(heightShift) } } : {}),
    ...(back.current ? {
      current: { noiseA: back.current.noiseA, offsetA: back.current.offsetA, lagPx: back.current.lagPx, driftDecades: back.current.drift.decades, ...known(shift) },
    } : {}),
  };
}
