/** What was found of the ground, for the page: levelling, current, return scan, texture. */
import type { FlawThresholds } from '../src/flaws/flaws.ts';
import type { Shift } from '../src/ground/align-current.ts';
import type { CurrentGround, HeightGround, ReturnGround } from '../src/ground/ground.ts';
import type { Texture } from '../src/ground/measure-texture.ts';
import { leastWearDecades } from '../src/ground/wear.ts';
import type { Appraised } from '../src/report/appraised.ts';
import { rounded, toNm } from '../src/report/units.ts';
import { thresholdsPart } from '../src/report/verdict.ts';
import { texturePart } from '../src/report/verdict-texture.ts';
import { withoutMissing } from '../src/report/without-missing.ts';
import type { LevelsSummary, SampleSummary, ShiftSummary, TextureSummary, ThresholdsInForce } from './api.ts';

export function groundParts({ ground: { height, current, layers, returned } }: Appraised): Pick<SampleSummary, 'height' | 'current' | 'returned'> {
  return {
    ...(height ? { height: { noiseNm: toNm(height.noiseM), tiltNm: toNm(height.tiltM), repairedPixels: height.repairedPixels, ...(height.levels ? { levels: levelsOf(height.levels, layers?.gapM) } : {}) } } : {}),
    ...(current ? { current: currentOf(current) } : {}),
    ...(returned ? { returned: returnOf(returned) } : {}),
  };
}

export function textureOf(texture: Texture): TextureSummary {
  const { sqNm, sqInsideTerracesNm, sqCorrectedNm, levellingBiasShare, correlationNm, noEstimate } = texturePart(texture);
  return withoutMissing({ sqNm, sqInsideTerracesNm, sqCorrectedNm, levellingBiasShare, correlationNm, noEstimate }) as TextureSummary;
}

/** The limits in force as verdict.json has them. */
export function thresholdsIn(thresholds: FlawThresholds): ThresholdsInForce {
  return withoutMissing(thresholdsPart(thresholds)) as ThresholdsInForce;
}

function levelsOf(levels: NonNullable<HeightGround['levels']>, gapM: number | undefined): LevelsSummary {
  const { formFrom, order, spotsUsed, tiltM, bowM, lineRmsM, lineMostM, planesM } = levels;
  return {
    formFrom, order, tiltNm: toNm(tiltM), bowNm: toNm(bowM), planesNm: planesM.map(toNm),
    ...(spotsUsed === undefined ? {} : { spotsUsed }),
    ...(lineRmsM === undefined ? {} : { lineRmsNm: toNm(lineRmsM) }),
    ...(lineMostM === undefined ? {} : { lineMostNm: toNm(lineMostM) }),
    ...(gapM === undefined ? {} : { gapNm: toNm(gapM) }),
  };
}

/** A number under its name, or nothing where there is none. */
function known<Name extends string>(name: Name, value: number | undefined): { readonly [key in Name]?: number } {
  return value === undefined || Number.isNaN(value) ? {} : { [name]: rounded(value) } as { readonly [key in Name]?: number };
}

function currentOf(current: CurrentGround): NonNullable<SampleSummary['current']> {
  return {
    unit: current.unit, ...(current.biasV === undefined ? {} : { biasV: current.biasV }),
    offsetA: rounded(current.offsetA), noiseA: rounded(current.noiseA), floorA: rounded(current.floorA),
    ...known('saturationA', current.saturationA),
    saturatedPixels: current.saturatedPixels, repairedPixels: current.repairedPixels, wearDecades: rounded(current.wearDecades),
    wearTold: current.wearDecades >= leastWearDecades,
    ...known('offsetSeA', current.offsetSeA), ...(current.offsetFrom === undefined ? {} : { offsetFrom: current.offsetFrom }),
    ...known('floorSeA', current.floorSeA), ...known('stepA', current.stepA),
    ...known('driftDecades', current.driftDecades), ...known('driftSeDecades', current.driftSeDecades),
    lagPx: rounded(current.lagPx), ...known('lagSePx', current.lagSePx),
    ...(current.shift ? { shift: shiftOf(current.shift) } : {}),
  };
}

function returnOf({ height, current }: ReturnGround): NonNullable<SampleSummary['returned']> {
  return {
    ...(height ? { heightNoiseNm: toNm(height.noiseM) } : {}), ...(height?.shift ? { heightShift: shiftOf(height.shift) } : {}),
    ...known('currentNoiseA', current?.noiseA), ...known('lagPx', current?.lagPx), ...known('driftDecades', current?.driftDecades),
    ...(current?.shift ? { currentShift: shiftOf(current.shift) } : {}),
  };
}

function shiftOf({ dxPx, dyPx, seXPx, seYPx, undoneXPx, undoneYPx }: Shift): ShiftSummary {
  return { rightPx: rounded(dxPx), rightSePx: rounded(seXPx), downPx: rounded(dyPx), downSePx: rounded(seYPx), undoneRightPx: undoneXPx, undoneDownPx: undoneYPx };
}
