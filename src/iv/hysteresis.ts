/** Whether the ways up and down of a sweep show the same current. */
import { plotPoints } from './plot-points.ts';
import type { PlotPoints, Polarity } from './plot-points.ts';
import { pointNoise, variancesOf } from './point-noise.ts';

export interface Hysteresis {
  /** Mean of ln(I down/I up) at equal bias, weighted by noise, and its standard error. */
  readonly lnRatio: number;
  readonly lnRatioSe: number;
  /** The shift of bias that would do the same, V; positive where the way down carries more. */
  readonly shiftV: number;
  /** The difference is beyond three standard errors and above 5 %. */
  readonly seen: boolean;
}

const leastPoints = 5;
const seenErrors = 3;
const seenRatio = 0.05;

/** Whether a point was taken on the way up, towards larger bias of either sign. */
export function onTheWayUp(direction: Int8Array, sign: 1 | -1): (index: number) => boolean {
  return (index) => direction[index]! * sign >= 0;
}

/**
 * Compares the way down with the line between neighbouring points of the way up, where both are above
 * the floor. Undefined when either way has fewer than five points there.
 */
export function hysteresisOf(polarity: Polarity, direction: Int8Array, constantA: number | undefined): Hysteresis | undefined {
  const isUp = onTheWayUp(direction, polarity.sign);
  const up = plotPoints(polarity, isUp);
  const down = plotPoints(polarity, (index) => !isUp(index));
  if (up.x.length < leastPoints || down.x.length < leastPoints) return undefined;
  const upVariance = varianceOf(up, constantA);
  const downVariance = varianceOf(down, constantA);
  const ratios: { value: number; weight: number; biasV: number; slope: number }[] = [];
  let next = 1;
  for (let k = 0; k < down.x.length; k++) {
    const x = down.x[k]!;
    while (next < up.x.length - 1 && up.x[next]! < x) next += 1;
    const from = up.x[next - 1]!;
    const to = up.x[next]!;
    if (x < from || x > to || !(to > from)) continue;
    const t = (x - from) / (to - from);
    const variance = downVariance[k]! + (1 - t) ** 2 * upVariance[next - 1]! + t ** 2 * upVariance[next]!;
    const slope = (up.y[up.y.length - 1]! - up.y[0]!) / (up.x[up.x.length - 1]! - up.x[0]!);
    ratios.push({ value: down.y[k]! - (1 - t) * up.y[next - 1]! - t * up.y[next]!, weight: 1 / variance, biasV: down.biasV[k]!, slope });
  }
  if (ratios.length < leastPoints) return undefined;
  const total = ratios.reduce((sum, ratio) => sum + ratio.weight, 0);
  const mean = (of: (ratio: (typeof ratios)[number]) => number): number => ratios.reduce((sum, ratio) => sum + (of(ratio) * ratio.weight) / total, 0);
  const lnRatio = mean((ratio) => ratio.value);
  const scatter = mean((ratio) => (ratio.value - lnRatio) ** 2);
  const effective = total ** 2 / ratios.reduce((sum, ratio) => sum + ratio.weight ** 2, 0);
  const lnRatioSe = Math.sqrt(scatter / Math.max(1, effective - 1));
  // ln I = a + 2·ln V + slope/V.
  const perVolt = mean((ratio) => 2 / ratio.biasV - ratio.slope / ratio.biasV ** 2);
  return { lnRatio, lnRatioSe, shiftV: lnRatio / perVolt, seen: Math.abs(lnRatio) > seenErrors * lnRatioSe && Math.abs(lnRatio) > seenRatio };
}

function varianceOf(points: PlotPoints, constantA: number | undefined): Float64Array {
  return variancesOf(pointNoise(points.x, points.y, points.currentA, constantA), points.currentA);
}
