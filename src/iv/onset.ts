/** The bias at which a curve leaves the noise. */
import type { LowBias } from './low-bias.ts';
import { floorFactor } from './plot-points.ts';
import type { Polarity } from './plot-points.ts';

/**
 * Onset: the magnitude of the bias, V, above which the current without offset and ohmic part stays over
 * five standard deviations of the amplifier's noise. Told from the running median of five points and
 * placed between two of them by ln I. It depends on the amplifier; a better one sees an earlier onset.
 * Undefined when the sweep does not show both sides of it.
 */
export function onsetOf(polarity: Polarity, low: LowBias | undefined): number | undefined {
  if (low === undefined || !(low.noiseA > 0)) return undefined;
  const { biasV, currentA } = polarity;
  const level = floorFactor * low.noiseA;
  const smooth = currentA.map((_, k) => {
    const window = Array.from(currentA.subarray(Math.max(0, k - 2), k + 3)).sort((a, b) => a - b);
    return window[window.length >> 1]!;
  });
  const below = smooth.findIndex((value) => value < level);
  if (below <= 0) return undefined;
  const above = below - 1;
  const under = smooth[below]! > 0 ? Math.log(level / smooth[below]!) : level - smooth[below]!;
  const over = smooth[below]! > 0 ? Math.log(smooth[above]! / level) : smooth[above]! - level;
  return biasV[below]! + ((biasV[above]! - biasV[below]!) * under) / (under + over);
}
