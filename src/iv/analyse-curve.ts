/** Everything that one current–voltage curve says. */
import { breakdownVPerNm } from '../barrier/model/barrier-warnings.ts';
import type { BarrierMaterial } from '../barrier/model/tunnel-model.ts';
import { notice } from '../problems/problem.ts';
import type { Notice } from '../problems/problem.ts';
import { analysePolarity } from './analyse-polarity.ts';
import type { PolarityAnalysis, PolarityLine } from './analyse-polarity.ts';
import { areaOfLine, heightOfLine, thicknessOfLine } from './barrier-of-line.ts';
import type { CurveAnalysis } from './curve-analysis.ts';
import type { IvCurve } from './curve.ts';
import { lowBiasOf } from './low-bias.ts';
import { onsetOf } from './onset.ts';
import { seenOhmicS } from './plot-points.ts';
import { leastForCurvature } from './straight-stretch.ts';
import { sweepDirections } from './sweeps.ts';

export interface CurveQuestion extends BarrierMaterial {
  /** Known thickness: the height follows from the slope. Absent: the thickness follows from `heightEv`. */
  readonly thicknessNm?: number;
  /** Stated area that the current flows through. */
  readonly areaNm2?: number;
}

export interface AnalysedCurve {
  readonly analysis: CurveAnalysis;
  readonly warnings: readonly Notice[];
  /** The polarity that the numbers are of; absent without a point. */
  readonly polarity?: PolarityAnalysis;
}

/** The straight part of fewer than this share of the usable points is said to be short. */
const shortShare = 0.5;
/** A contact's area is known to a decade: beyond it the numbers contradict each other. */
const areaContradiction = Math.log(10);

/** Analyses one curve. Pure; numbers that the curve does not give are absent. */
export function analyseCurve(curve: IvCurve, question: CurveQuestion): AnalysedCurve {
  const { name, biasV, currentA, temperatureK } = curve;
  const direction = sweepDirections(biasV);
  const low = lowBiasOf(biasV, currentA, direction);
  const turn = signOfCurrent(biasV, currentA);
  const ohmicS = seenOhmicS(low, turn);
  const warnings: Notice[] = [];
  const head = { name, points: biasV.length, ...(temperatureK === undefined ? {} : { temperatureK }) };
  const polarities = ([1, -1] as const).map((sign) => analysePolarity(biasV, currentA, direction, sign, turn, low)).filter((one) => one !== undefined);
  const [used, other] = polarities.sort((a, b) => slopeShare(a) - slopeShare(b));
  if (used === undefined) return { analysis: head, warnings: [notice('iv-few-points', { curve: name, usable: 0, points: biasV.length })] };

  const { polarity, line, hysteresis, usable } = used;
  if (ohmicS > 0) warnings.push(notice('iv-leakage', { curve: name, conductanceS: digits(ohmicS), resistanceOhm: digits(1 / ohmicS) }));
  if (polarity.saturated > 0) warnings.push(notice('iv-saturated', { curve: name, points: polarity.saturated, fromV: digits(polarity.biasV[polarity.saturated - 1]! * polarity.sign) }));
  if (hysteresis?.seen === true) {
    const higher = hysteresis.lnRatio > 0 ? 'down' : 'up';
    warnings.push(notice('iv-hysteresis', { curve: name, factor: digits(Math.exp(Math.abs(hysteresis.lnRatio))), higher, shiftV: digits(Math.abs(hysteresis.shiftV)) }));
  }
  const onset = onsetOf(polarity, low);
  const shared = {
    ...head, polarity: polarity.sign === 1 ? ('positive' as const) : ('negative' as const),
    ...(onset === undefined ? {} : { onsetV: onset * polarity.sign }),
    ...(low === undefined ? {} : { offsetA: low.offsetA, noiseA: low.noiseA }),
    ...(low?.ohmic === undefined ? {} : { leakage: { conductanceS: low.ohmic.conductanceS * turn, conductanceSe: low.ohmic.seS, seen: ohmicS > 0 } }),
    ...(hysteresis === undefined ? {} : { hysteresis }),
    ...(polarity.saturated > 0 ? { saturatedPoints: polarity.saturated } : {}),
  };
  if (line === undefined) {
    const { length } = usable.x;
    warnings.push(length < leastForCurvature ? notice('iv-few-points', { curve: name, usable: length, points: biasV.length }) : notice('iv-nowhere-straight', { curve: name, points: length }));
    return { analysis: shared, warnings, polarity: used };
  }
  warnings.push(...stretchRemarks(name, used, line));
  if (other?.line) warnings.push(notice('iv-other-polarity', { curve: name, used: shared.polarity, slopeV: digits(other.line.slope), slopeSe: digits(other.line.slopeSe) }));
  const barrier = barrierOf(name, line, question);
  return {
    analysis: {
      ...shared, used: [line.fromV * polarity.sign, line.toV * polarity.sign], usedPoints: line.points,
      slopeV: line.slope, slopeSe: line.slopeSe, intercept: line.intercept, interceptSe: line.interceptSe, noiseShare: line.share, ...barrier.found,
    },
    warnings: [...warnings, ...barrier.warnings],
    polarity: used,
  };
}

/** +1 where large currents have the sign of their bias, else −1 (some amplifiers turn the current). */
function signOfCurrent(biasV: Float64Array, currentA: Float64Array): 1 | -1 {
  let sum = 0;
  for (let k = 0; k < biasV.length; k++) sum += currentA[k]! * Math.sign(biasV[k]!);
  return sum < 0 ? -1 : 1;
}

/** Standard error of the slope over the slope; the better known polarity comes first. */
function slopeShare(one: PolarityAnalysis): number {
  return one.line === undefined ? Number.POSITIVE_INFINITY : one.line.slopeSe / Math.abs(one.line.slope);
}

function stretchRemarks(curve: string, { usable, polarity }: PolarityAnalysis, line: PolarityLine): Notice[] {
  const top = usable.biasV[0]!;
  const share = line.points / usable.x.length;
  const { sign } = polarity;
  return [
    ...(line.toV < top ? [notice('iv-top-bent', { curve, to: digits(line.toV * sign), toUsable: digits(top * sign) })] : []),
    ...(share < shortShare ? [notice('iv-bent', { curve, from: digits(line.fromV * sign), to: digits(line.toV * sign), share: `${Math.round(100 * share)} %` })] : []),
  ];
}

/** Height or thickness, area, field; nothing but a remark when the line does not fall. */
function barrierOf(curve: string, line: PolarityLine, question: CurveQuestion): { found: Partial<CurveAnalysis>; warnings: Notice[] } {
  if (!(line.slope < 0)) return { found: {}, warnings: [notice('iv-wrong-slope', { curve, slopeV: digits(line.slope) })] };
  const { massRatio, areaNm2 } = question;
  const given = question.thicknessNm;
  const height = given === undefined ? undefined : heightOfLine(line, given, massRatio);
  const thickness = given === undefined ? thicknessOfLine(line, question) : undefined;
  const heightEv = height?.value ?? question.heightEv;
  const thicknessNm = given ?? thickness!.value;
  const area = areaOfLine(line, heightEv, thicknessNm, massRatio, given === undefined ? 'height' : 'thickness');
  const field = [line.fromV / thicknessNm, line.toV / thicknessNm] as const;
  const warnings: Notice[] = [];
  // The slack lets 4.8 V over 4 nm count as 1.2 V/nm in spite of rounding.
  if (field[1] >= breakdownVPerNm * (1 - 1e-9)) {
    warnings.push(notice('iv-breakdown', { curve, fromVPerNm: field[0].toPrecision(3), toVPerNm: field[1].toPrecision(3), thicknessNm: digits(thicknessNm), given: given !== undefined }));
  }
  if (line.fromV < heightEv) warnings.push(notice('iv-below-height', { curve, from: digits(line.fromV), heightEv: digits(heightEv) }));
  if (areaNm2 !== undefined && Math.abs(Math.log(area.areaNm2 / areaNm2)) > areaContradiction + 2 * area.lnSe) {
    warnings.push(notice('iv-area', { curve, effectiveNm2: digits(area.areaNm2), statedNm2: digits(areaNm2) }));
  }
  return {
    found: {
      ...(height === undefined ? {} : { barrierEv: height.value, barrierSe: height.se }),
      thicknessNm, ...(thickness === undefined ? {} : { thicknessSe: thickness.se }),
      ...(Number.isFinite(area.areaNm2) && area.areaNm2 > 0 ? { effectiveAreaNm2: area.areaNm2, effectiveAreaLnSe: area.lnSe } : {}),
      fieldVPerNm: field,
    },
    warnings,
  };
}

function digits(value: number): string {
  return String(Number(value.toPrecision(4)));
}
