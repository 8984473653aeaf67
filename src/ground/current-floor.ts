import type { ZeroCurrent } from './zero-current.ts';

/** Detection limit in standard deviations of the noise (three: one reading in 700 of pure noise lies above, common practice). */
const floorSigmas = 3;
/** The floor of a digitised current in steps: at two steps rounding alone makes an error of 0.06 decades, at one step of 0.13. */
const floorSteps = 2;

/**
 * Current below which a map shows only noise, with its standard error (of noise and offset together). It is given, or three standard deviations of the noise, or two steps
 * of a digitised current, whichever is more.
 *
 * @param offsetFree for a map without noise, whose floor is its least positive current.
 */
export function currentFloor(zero: ZeroCurrent, given: number | undefined, offsetFree: Float32Array): { floorA: number; floorSeA?: number } {
  if (given !== undefined) return { floorA: given };
  const byNoise = floorSigmas * zero.noise;
  const bySteps = floorSteps * (zero.quantum ?? 0);
  if (!(byNoise > 0 || bySteps > 0)) return { floorA: leastPositive(offsetFree) };
  const floorA = Math.max(byNoise, bySteps);
  if (zero.offsetSe === undefined || zero.noiseSe === undefined) return { floorA };
  return { floorA, floorSeA: Math.hypot(byNoise >= bySteps ? floorSigmas * zero.noiseSe : 0, zero.offsetSe) };
}

/** Logs need a positive floor. */
function leastPositive(values: Float32Array): number {
  let least = Number.POSITIVE_INFINITY;
  for (const value of values) if (value > 0 && value < least) least = value;
  return Number.isFinite(least) ? least : 1e-15;
}
