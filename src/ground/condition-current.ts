import type { Grid } from '../grid/maps.ts';
import { maskMap, scalarMap } from '../grid/maps.ts';
import { Problem } from '../problems/problem.ts';
import type { Notice } from '../problems/problem.ts';
import { notice } from '../problems/problem.ts';
import type { Channel } from '../read/sample.ts';
import type { ScanSection } from '../read/recipe.ts';
import { movedBack, shiftAgainstHeight } from './align-current.ts';
import type { Shift } from './align-current.ts';
import { fillFromNeighbours, markBrokenRuns } from './broken-runs.ts';
import { quantifiedOverFloor } from './current-limits.ts';
import { censoredLog, lessOffset, markCensored, markRepaired, undoWear, withRepairs } from './censored-maps.ts';
import { currentFloor } from './current-floor.ts';
import type { CurrentGround, RoughHeight } from './ground.ts';
import { clippedFrom, readAmplifier, runLength, runNoiseDecades } from './read-amplifier.ts';
import type { GroundSection } from './recipe.ts';
import { turnedUp } from './turn-current.ts';
import { findDrift, isWear, leastWearDecades, wearPerRow } from './wear.ts';
import type { Drift } from './wear.ts';

/** Above this height over the ground nothing of a thin barrier's current is left, metres. */
export const blockedAboveM = 4e-9;
/** Neighbours of a broken run agree when they differ by less than this, decades. */
const agreeDecades = 0.3;
/** An unexplained trend from this size and this many standard errors up is worth a remark. */
const unclear = { decades: 0.15, errors: 1 } as const;

/** What else is known when a current is conditioned. */
export interface BesideCurrent {
  /** Roughly levelled height of the same grid: tall features show the reading at zero current, and where the current lies. */
  readonly height?: RoughHeight | undefined;
  /** 1 on the footprint by outlines; ground beside it may show the reading at zero current. */
  readonly inside?: Uint8Array | undefined;
  /** True when the first line is the picture's last row. */
  readonly slowUp: boolean;
  /** Trend along the slow axis on the return scan. */
  readonly returned?: Drift | undefined;
}

/**
 * Conditions a current map: turns it by the bias's sign, removes the offset, undoes the amplifier's lag and a shift against the height, marks what is
 * censored (saturated, floor), repairs broken runs of one to three lines between agreeing neighbours, and undoes tip wear as a factor per
 * line. A current is never levelled like a height: only an offset, a time constant and a factor are physical.
 *
 * @param channel current in A, or relative units; NaN missing.
 * @throws Problem `current-saturated` when 99 % or more of the map is saturated.
 */
export function conditionCurrent(channel: Channel, grid: Grid, section: GroundSection, scan: ScanSection, beside: BesideCurrent): { current: CurrentGround; warnings: Notice[] } {
  const { columns, rows } = grid;
  const count = columns * rows;
  const unit = channel.unit === 'A' ? 'A' : 'relative';
  const { values: turned, sign, warnings } = turnedUp(channel);
  const levelled = beside.height?.levelled.data;
  const tall = levelled && ((i: number) => levelled[i]! > blockedAboveM);
  const { inside, slowUp } = beside;
  const amplifier = readAmplifier(turned, columns, rows, section, {
    blocked: tall, beside: inside && ((i: number) => inside[i] === 0), saturation: scan.saturationA, given: section.offsetA === undefined ? undefined : sign * section.offsetA,
  });
  const { zero, lag, saturation } = amplifier;
  if (zero.from === 'assumed') warnings.push(notice('current-offset-assumed', {}));
  if (lag) warnings.push(notice('current-lag', { px: lag.px, sePx: lag.sePx }));
  const saturationNet = clippedFrom(saturation) - zero.offset;
  const offsetFree = lessOffset(turned, zero.offset);
  let unlagged = lag ? lessOffset(amplifier.values, zero.offset) : offsetFree;
  let blind = amplifier.blind;
  const { floorA, floorSeA } = currentFloor(zero, scan.floorA, offsetFree);
  if (zero.quantum !== undefined) warnings.push(notice('current-quantised', { step: zero.quantum, floor: floorA, unit }));
  const floorLog = Math.log10(floorA);

  let log10 = censoredLog(unlagged, floorA, saturationNet);
  const shift = levelled && shiftAgainstHeight(levelled, log10, floorLog, columns, rows);
  if (section.align && shift && (shift.undoneXPx !== 0 || shift.undoneYPx !== 0)) {
    unlagged = movedBack(unlagged, columns, shift, Number.NaN);
    log10 = movedBack(log10, columns, shift, Number.NaN);
    blind = blind && movedBack(blind, columns, shift, 0);
    warnings.push(notice('current-shifted', shift));
  }

  const saturated = new Uint8Array(count);
  const floor = new Uint8Array(count);
  const saturatedPixels = markCensored(unlagged, blind, floorA, saturationNet, { log10, floor, saturated });
  if (saturatedPixels >= 0.99 * count) throw new Problem('current-saturated', { file: channel.source, share: saturatedPixels / count });

  let repaired: Uint8Array = new Uint8Array(count);
  if (section.repair) {
    // A broken contact loses current; what gains it along a line may be a short.
    const marks = markBrokenRuns(log10, columns, rows, { noise: runNoiseDecades, minLength: runLength, only: 'below' });
    repaired = fillFromNeighbours(log10, marks, columns, rows, agreeDecades);
  }
  const repairedPixels = markRepaired(repaired, floorLog + 1e-6, Math.log10(saturationNet) - 1e-6, { log10, floor, saturated });

  // What is seen but not measured well would be cut off from below and hide a trend.
  const measuredFrom = Math.log10(floorA * quantifiedOverFloor);
  const drift = findDrift(log10, columns, rows, (i) => floor[i] === 0 && saturated[i] === 0 && log10[i]! > measuredFrom && !tall?.(i), slowUp, (rows * grid.pitchYM) / (columns * grid.pitchXM));
  const worn = isWear(drift, beside.returned);
  warnings.push(...wearNotices(drift, worn, section.wear, beside.returned));
  const conditioned = withRepairs(unlagged, repaired, log10);
  // A bound moves with the wear like a value: what an unworn tip would have shown lies as much higher.
  if (section.wear && worn) undoWear(wearPerRow(drift.decades, rows, slowUp), columns, conditioned, log10);
  return {
    current: {
      unit, ...(channel.biasV === undefined ? {} : { biasV: channel.biasV }),
      offsetFree: scalarMap(grid, offsetFree), conditioned: scalarMap(grid, conditioned), log10: scalarMap(grid, log10),
      saturated: maskMap(grid, saturated), floor: maskMap(grid, floor), repaired: maskMap(grid, repaired), repairedPixels,
      offsetA: zero.offset, ...(zero.offsetSe === undefined ? {} : { offsetSeA: zero.offsetSe }), offsetFrom: zero.from,
      noiseA: zero.noise, floorA, ...(floorSeA === undefined ? {} : { floorSeA }), ...(zero.quantum === undefined ? {} : { stepA: zero.quantum }),
      ...(saturation === undefined ? {} : { saturationA: saturation - zero.offset }), saturatedPixels,
      wearDecades: worn ? drift.decades : 0, driftDecades: drift.decades, driftSeDecades: drift.seDecades,
      lagPx: lag?.px ?? 0, ...(lag && !Number.isNaN(lag.sePx) ? { lagSePx: lag.sePx } : {}), ...(shift ? { shift: done(shift, section.align) } : {}),
    },
    warnings,
  };
}

function done(shift: Shift, align: boolean): Shift {
  return align ? shift : { ...shift, undoneXPx: 0, undoneYPx: 0 };
}

function wearNotices(drift: Drift, worn: boolean, undo: boolean, returned: Drift | undefined): Notice[] {
  const { decades, seDecades } = drift;
  if (worn) return undo ? [notice('current-wear', { decades, seDecades })] : [];
  if (decades >= leastWearDecades && isWear(drift)) return [notice('current-drift-differs', { forwardDecades: decades, returnDecades: returned?.decades ?? Number.NaN })];
  return decades >= Math.max(unclear.decades, unclear.errors * seDecades) ? [notice('current-drift-unclear', { decades, seDecades })] : [];
}
