/** The current's part of verdict.json: what was measured of amplifier, tip and alignment. */
import type { Shift } from '../ground/align-current.ts';
import type { CurrentGround, ReturnGround } from '../ground/ground.ts';
import { rounded, toNm } from './units.ts';

const known = (value: number | undefined): number | undefined => (value === undefined ? undefined : rounded(value));

/** Without amperes the fields that end in A are absent; the same numbers are given as `…Relative`. */
export function currentPart(current: CurrentGround) {
  const amperes = current.unit === 'A';
  const inA = (value: number | undefined): number | undefined => (amperes ? known(value) : undefined);
  const relative = (value: number | undefined): number | undefined => (amperes ? undefined : known(value));
  return {
    offsetA: inA(current.offsetA),
    offsetSeA: inA(current.offsetSeA),
    noiseA: inA(current.noiseA),
    floorA: inA(current.floorA),
    floorSeA: inA(current.floorSeA),
    stepA: inA(current.stepA),
    offsetRelative: relative(current.offsetA),
    offsetSeRelative: relative(current.offsetSeA),
    noiseRelative: relative(current.noiseA),
    floorRelative: relative(current.floorA),
    floorSeRelative: relative(current.floorSeA),
    stepRelative: relative(current.stepA),
    offsetFrom: current.offsetFrom,
    saturatedPixels: current.saturatedPixels,
    repairedPixels: current.repairedPixels,
    wearDecades: rounded(current.wearDecades),
    driftDecades: known(current.driftDecades),
    driftSeDecades: known(current.driftSeDecades),
    lagPx: rounded(current.lagPx),
    lagSePx: known(current.lagSePx),
    shift: current.shift && shiftPart(current.shift),
    biasV: current.biasV,
  };
}

/** The return scan's noise and its differences from the forward scan. */
export function returnPart({ height, current }: ReturnGround, unit: CurrentGround['unit'] | undefined) {
  const amperes = unit !== 'relative';
  return {
    height: height && { noiseNm: toNm(height.noiseM), shift: height.shift && shiftPart(height.shift) },
    current: current && {
      noiseA: amperes ? rounded(current.noiseA) : undefined,
      offsetA: amperes ? rounded(current.offsetA) : undefined,
      noiseRelative: amperes ? undefined : rounded(current.noiseA),
      offsetRelative: amperes ? undefined : rounded(current.offsetA),
      lagPx: rounded(current.lagPx),
      driftDecades: rounded(current.driftDecades),
      shift: current.shift && shiftPart(current.shift),
    },
  };
}

/** Pixels to the right and down the picture; `undone…` is what the map was moved back by. */
export function shiftPart(shift: Shift) {
  return {
    rightPx: rounded(shift.dxPx), rightSePx: rounded(shift.seXPx), downPx: rounded(shift.dyPx), downSePx: rounded(shift.seYPx),
    undoneRightPx: shift.undoneXPx, undoneDownPx: shift.undoneYPx, correlation: rounded(shift.correlation),
  };
}
