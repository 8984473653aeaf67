/** Offset and noise of a current amplifier, read from pixels that carry no current. */
import { madScale } from '../stats/mad.ts';
import { medianInPlace } from '../stats/median.ts';
import { quantile } from '../stats/quantile.ts';

export interface ZeroCurrent {
  /** Reading at zero current. */
  readonly offset: number;
  /** Standard deviation of the reading at zero current. */
  readonly noise: number;
  /** Where the offset came from: blocked spots, the noise peak, or nowhere (then 0 is assumed). */
  readonly from: 'blocked' | 'noise peak' | 'assumed';
}

/** Least number of pixels a noise peak must be read from. */
const leastPixels = 30;
/** A reading at zero current is at most this part of the map's larger currents. */
const largestPart = 0.02;
/** Share of a sample whose shortest interval marks its densest place. */
const denseShare = 0.01;

/**
 * Finds the reading at zero current.
 *
 * 1. Under tall features (`blocked`) no current flows: the densest reading there is the offset.
 * 2. Without such features, the densest readings on a linear scale may be the noise peak, because scatter of a real current grows with
 *    the current. They count only if neighbouring pixels are uncorrelated, as amplifier noise is, and if either they are small against the map's
 *    larger unsaturated currents (a fiftieth), or readings of the wrong sign show that zero lies within their scatter. An even terrace, however
 *    white its scatter, is neither.
 * 3. Otherwise offset 0 is assumed and the noise is what remains between neighbours on the weakest tenth.
 *
 * @param values current times the bias's sign, row-major, NaN missing.
 * @param known `blocked`: whether a pixel lies under a feature too tall to carry current (absent without a height map); `saturation`: the clipping level.
 */
export function findZeroCurrent(values: Float32Array, columns: number, known: { readonly blocked?: ((index: number) => boolean) | undefined; readonly saturation?: number | undefined } = {}): ZeroCurrent {
  const limit = (known.saturation ?? Number.POSITIVE_INFINITY) * (1 - 1e-4);
  const { blocked } = known;
  if (blocked) {
    const under = thinned(values, (i) => blocked(i));
    if (under.length >= leastPixels) {
      const peak = peakOf(under);
      const below = thinned(values, (i) => values[i]! < peak.centre - 6 * peak.width);
      // A feature that conducts is no reference: then much of the map would lie below "zero".
      if (peak.width > 0 && below.length < 0.02 * under.length + leastPixels && isWhite(values, columns, peak, blocked)) {
        return { offset: peak.centre, noise: peak.width, from: 'blocked' };
      }
    }
  }
  const all = thinned(values, (i) => values[i]! < limit);
  const peak = peakOf(all);
  const small = Math.abs(peak.centre) < largestPart * quantile(all, 0.9);
  const wrongSign = all.filter((value) => value < 0 && value > peak.centre - 6 * peak.width).length >= 3;
  if (peak.count >= leastPixels && peak.width > 0 && (small || (wrongSign && peak.centre < 4 * peak.width)) && isWhite(values, columns, peak, () => true)) {
    return { offset: peak.centre, noise: peak.width, from: 'noise peak' };
  }
  return { offset: 0, noise: weakNoise(values, columns), from: 'assumed' };
}

interface Peak {
  readonly centre: number;
  readonly width: number;
  readonly count: number;
}

/** Finite values of admitted pixels, thinned to at most about 100 000. */
function thinned(values: Float32Array, use: (index: number) => boolean): Float64Array {
  const step = Math.max(1, Math.floor(values.length / 100_000));
  const out: number[] = [];
  for (let i = 0; i < values.length; i += step) if (!Number.isNaN(values[i]!) && use(i)) out.push(values[i]!);
  return Float64Array.from(out);
}

/** Densest place of a sample (middle of the shortest interval with a hundredth of it), its robust width from the side below, then refined by the median within three widths. */
function peakOf(sample: Float64Array): Peak {
  if (sample.length === 0) return { centre: Number.NaN, width: 0, count: 0 };
  let centre = densest(sample);
  let width = 0;
  let count = 0;
  for (let round = 0; round < 6; round++) {
    const below = sample.filter((v) => v <= centre).map((v) => centre - v).sort();
    const near = below.filter((d) => width === 0 || d < 4 * width);
    width = near.length === 0 ? 0 : madScale * near[near.length >> 1]!;
    const around = sample.filter((v) => Math.abs(v - centre) < 3 * width);
    count = around.length;
    if (count === 0) break;
    centre = medianInPlace(around, count);
  }
  return { centre, width, count };
}

function densest(sample: Float64Array): number {
  const sorted = Float64Array.from(sample).sort();
  const n = Math.min(sorted.length, Math.max(leastPixels, Math.ceil(denseShare * sorted.length)));
  let best = 0;
  for (let i = 0; i + n <= sorted.length; i++) if (sorted[i + n - 1]! - sorted[i]! < sorted[best + n - 1]! - sorted[best]!) best = i;
  return sorted[best + (n >> 1)]!;
}

/**
 * Whether horizontal neighbours in the lower half of the peak, among admitted pixels, are uncorrelated (|r| < 0.3). A faint terrace just above zero reaches
 * into the upper half and would correlate it.
 */
function isWhite(values: Float32Array, columns: number, peak: Peak, use: (index: number) => boolean): boolean {
  let n = 0;
  let xy = 0;
  let xx = 0;
  const limit = 3 * peak.width;
  // Deviations from the middle of the lower half: 0.8 standard deviations below the centre for a normal peak.
  const middle = peak.centre - Math.sqrt(2 / Math.PI) * peak.width;
  const inHalf = (value: number): boolean => value <= peak.centre && value >= peak.centre - limit;
  for (let i = 1; i < values.length; i++) {
    if (i % columns === 0 || !use(i) || !use(i - 1)) continue;
    if (!inHalf(values[i - 1]!) || !inHalf(values[i]!)) continue;
    const a = values[i - 1]! - middle;
    const b = values[i]! - middle;
    n++;
    xy += a * b;
    xx += (a * a + b * b) / 2;
  }
  return n >= leastPixels && Math.abs(xy) < 0.3 * xx;
}

/** Robust noise between neighbours on the weakest tenth of the map. */
function weakNoise(values: Float32Array, columns: number): number {
  const sorted = thinned(values, () => true).map(Math.abs).sort();
  const limit = sorted[Math.floor(sorted.length / 10)] ?? Number.NaN;
  const differences: number[] = [];
  for (let i = 1; i < values.length; i++) {
    if (i % columns !== 0 && Math.abs(values[i]!) <= limit && Math.abs(values[i - 1]!) <= limit) differences.push(Math.abs(values[i]! - values[i - 1]!));
  }
  const buffer = Float64Array.from(differences);
  const noise = (madScale * medianInPlace(buffer, buffer.length)) / Math.SQRT2;
  return Number.isNaN(noise) ? 0 : noise;
}
