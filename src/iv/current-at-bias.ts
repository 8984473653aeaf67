/** ln I of a curve at one bias, smoothed over its neighbourhood. */
import { leastSquares } from '../stats/least-squares.ts';
import type { PlotPoints } from './plot-points.ts';
import { variancesOf } from './point-noise.ts';
import type { PointNoise } from './point-noise.ts';

const leastPoints = 5;

/**
 * ln I (A) at `biasV` with its standard error: value of the weighted parabola of ln(I/V²) over 1/V
 * through the points between `fromV` and `toV` (a Fowler–Nordheim plot is all but straight, one of
 * activated hopping bends slowly). Undefined for fewer than five points.
 */
export function lnCurrentAt(points: PlotPoints, noise: PointNoise, biasV: number, fromV: number, toV: number): { lnCurrent: number; se: number } | undefined {
  const inside = Array.from(points.biasV.keys()).filter((k) => points.biasV[k]! >= fromV * (1 - 1e-9) && points.biasV[k]! <= toV * (1 + 1e-9));
  if (inside.length < leastPoints) return undefined;
  const variance = variancesOf(noise, points.currentA);
  const root = inside.map((k) => 1 / Math.sqrt(variance[k]!));
  const scale = 1 / fromV - 1 / toV || 1;
  const u = inside.map((k) => (points.x[k]! - 1 / biasV) / scale);
  const fit = leastSquares([root, u.map((v, j) => v * root[j]!), u.map((v, j) => v * v * root[j]!)], inside.map((k, j) => points.y[k]! * root[j]!), false);
  const lnCurrent = fit.coefficients[0]! + 2 * Math.log(biasV);
  return Number.isFinite(lnCurrent) ? { lnCurrent, se: fit.standardErrors[0]! } : undefined;
}
