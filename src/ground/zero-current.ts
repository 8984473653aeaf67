/** Offset and noise of a current amplifier, read from pixels that carry no current. */
import { quantile } from '../stats/quantile.ts';
import { quantisationStep } from './quantisation.ts';
import { weakNoise } from './weak-noise.ts';
import { isNoise, leastPixels, peakOf, thinned } from './zero-peak.ts';
import type { Peak } from './zero-peak.ts';

export interface ZeroCurrent {
  /** Reading at zero current. */
  readonly offset: number;
  /** Its standard error; absent where the offset was not measured. */
  readonly offsetSe?: number;
  /** Standard deviation of the reading at zero current, at least that of rounding to the steps of the readings. */
  readonly noise: number;
  readonly noiseSe?: number;
  /** Step between neighbouring readings, where the map is digitised coarsely enough to show it. */
  readonly quantum?: number;
  /** Where the offset came from: spots blocked by a flaw, ground off the sample, the noise peak, a person, or nowhere (then 0 is assumed). */
  readonly from: 'blocked' | 'off the sample' | 'noise peak' | 'given' | 'assumed';
}

export interface KnownOfZero {
  /** Whether a pixel lies under a feature too tall to carry current; absent without a height map. */
  readonly blocked?: ((index: number) => boolean) | undefined;
  /** Whether a pixel lies beside the sample; absent without outlines. */
  readonly beside?: ((index: number) => boolean) | undefined;
  /** Clipping level. */
  readonly saturation?: number | undefined;
  /** Reading at zero current that a person gave. */
  readonly given?: number | undefined;
}

/** A reading at zero current is at most this part of the map's larger currents. */
const largestPart = 0.02;

/**
 * Finds the reading at zero current.
 *
 * 1. Under tall features (`blocked`) no current flows: the densest reading there is the offset. A feature that conducts is no reference; then much
 *    of the map would lie below "zero".
 * 2. The same for ground off the sample (`beside`), where it is insulating: then its readings are also small against the map's larger
 *    unsaturated currents (a fiftieth).
 * 3. Otherwise the densest readings on a linear scale may be the noise peak, because scatter of a real current grows with the current.
 *    They count only if they are as uncorrelated from line to line as amplifier noise, and if either they are small, or readings of the wrong sign
 *    show that zero lies within their scatter. An even terrace, however white its scatter, is neither.
 * 4. Otherwise offset 0 is assumed and the noise is what remains between neighbours on the weakest tenth.
 *
 * Where the readings come in steps, the noise is at least that of rounding, step/√12 (Widrow, IRE Trans. Circuit Theory 3, 266, 1956).
 *
 * @param values current times the bias's sign, row-major, NaN missing.
 */
export function findZeroCurrent(values: Float32Array, columns: number, known: KnownOfZero = {}): ZeroCurrent {
  const limit = (known.saturation ?? Number.POSITIVE_INFINITY) * (1 - 1e-4);
  const quantum = quantisationStep(values);
  const step = quantum === undefined ? {} : { quantum };
  const all = thinned(values, (i) => values[i]! < limit);
  const large = quantile(all, 0.9);
  if (known.given !== undefined) {
    const scatter = peakOf(all.filter((value) => Math.abs(value - known.given!) < largestPart * large), quantum);
    const noise = scatter.count >= leastPixels ? scatter.width : atLeast(weakNoise(values, columns), quantum);
    return { offset: known.given, noise, ...step, from: 'given' };
  }
  for (const [place, from] of [[known.blocked, 'blocked'], [known.beside, 'off the sample']] as const) {
    if (!place) continue;
    const there = thinned(values, (i) => values[i]! < limit && place(i));
    if (there.length < leastPixels) continue;
    const peak = peakOf(there, quantum);
    if (from === 'off the sample' && Math.abs(peak.centre) >= largestPart * large) continue;
    const below = thinned(values, (i) => values[i]! < peak.centre - 6 * peak.width).length;
    if (peak.width > 0 && below < 0.02 * there.length + leastPixels && isNoise(values, columns, peak, place, quantum)) return measured(peak, quantum, from);
  }
  const peak = peakOf(all, quantum);
  const small = Math.abs(peak.centre) < largestPart * large;
  const wrongSign = all.filter((value) => value < 0 && value > peak.centre - 6 * peak.width).length >= 3;
  const zero = small || (wrongSign && peak.centre < 4 * peak.width);
  if (peak.count >= leastPixels && peak.width > 0 && zero && isNoise(values, columns, peak, () => true, quantum)) return measured(peak, quantum, 'noise peak');
  return { offset: 0, noise: atLeast(weakNoise(values, columns), quantum), ...step, from: 'assumed' };
}

function measured(peak: Peak, quantum: number | undefined, from: ZeroCurrent['from']): ZeroCurrent {
  // Noise smaller than a step does not spread the readings evenly over several, so their number does not help.
  const held = quantum !== undefined && peak.width < quantum;
  return {
    offset: peak.centre, offsetSe: held ? quantum / Math.sqrt(12) : peak.centreSe,
    noise: peak.width, noiseSe: held ? quantum / Math.sqrt(12) : peak.widthSe,
    ...(quantum === undefined ? {} : { quantum }), from,
  };
}

function atLeast(noise: number, quantum: number | undefined): number {
  return Math.max(noise, (quantum ?? 0) / Math.sqrt(12));
}
