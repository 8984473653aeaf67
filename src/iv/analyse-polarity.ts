/** One polarity of a curve: its points, its hysteresis, the straight stretch and the line through it. */
import type { PlotLine } from './barrier-of-line.ts';
import { hysteresisOf, onTheWayUp } from './hysteresis.ts';
import type { Hysteresis } from './hysteresis.ts';
import type { LowBias } from './low-bias.ts';
import { plotPoints, polarityOf } from './plot-points.ts';
import type { PlotPoints, Polarity } from './plot-points.ts';
import { pointNoise, variancesOf } from './point-noise.ts';
import type { PointNoise } from './point-noise.ts';
import { straightStretch } from './straight-stretch.ts';
import { weightedLine } from './weighted-line.ts';

export interface PolarityLine extends PlotLine {
  readonly points: number;
  /** Magnitudes of the bias, V. */
  readonly fromV: number;
  readonly toV: number;
  /** Proportional noise, standard deviation of ln I. */
  readonly share: number;
}

export interface PolarityAnalysis {
  readonly polarity: Polarity;
  /** Points that count: above the floor, below the limit; of the way up only where hysteresis is seen. */
  readonly usable: PlotPoints;
  readonly noise: PointNoise;
  readonly hysteresis?: Hysteresis;
  readonly line?: PolarityLine;
}

/** Undefined without a point at this sign of the bias. Parameters as `polarityOf`. */
export function analysePolarity(biasV: Float64Array, currentA: Float64Array, direction: Int8Array, sign: 1 | -1, turn: 1 | -1, low: LowBias | undefined): PolarityAnalysis | undefined {
  const usableOf = (polarity: Polarity): PlotPoints =>
    // Two different lines make no line: the first way is the barrier before it was charged or changed.
    plotPoints(polarity, hysteresisOf(polarity, direction, low?.noiseA)?.seen === true ? onTheWayUp(direction, sign) : undefined);
  let polarity = polarityOf(biasV, currentA, direction, sign, turn, low);
  if (polarity === undefined) return undefined;
  let usable = usableOf(polarity);
  let noise = pointNoise(usable.x, usable.y, usable.currentA, low?.noiseA);
  // A sweep without a floor of its own shows the amplifier's noise in the scatter of its lowest points.
  for (let round = 0; round < 3 && low === undefined && noise.constantA > 0; round++) {
    polarity = polarityOf(biasV, currentA, direction, sign, turn, low, noise.constantA)!;
    usable = usableOf(polarity);
    const next = pointNoise(usable.x, usable.y, usable.currentA, undefined);
    if (!(next.constantA > noise.constantA)) break;
    noise = next;
  }
  const hysteresis = hysteresisOf(polarity, direction, low?.noiseA);
  const line = lineOf(usable, noise);
  return { polarity, usable, noise, ...(hysteresis === undefined ? {} : { hysteresis }), ...(line === undefined ? {} : { line }) };
}

function lineOf(points: PlotPoints, noise: PointNoise): PolarityLine | undefined {
  const stretch = straightStretch(points.x, points.y, variancesOf(noise, points.currentA));
  if (stretch === undefined) return undefined;
  const { first, last, bend } = stretch;
  const of = (values: Float64Array): Float64Array => values.slice(first, last + 1);
  const fit = weightedLine(of(points.x), of(points.y), points.index.slice(first, last + 1), noise.constantA, points.sharedErrorsA.map(of));
  // A bend that was let pass moves the slope from place to place within the stretch: as an even spread of its whole change.
  const bendSe = (Math.abs(fit.slope) * bend) / Math.sqrt(12);
  return { ...fit, slopeSe: Math.hypot(fit.slopeSe, bendSe), fromV: points.biasV[last]!, toV: points.biasV[first]! };
}
