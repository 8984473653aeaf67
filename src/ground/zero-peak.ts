/** The peak of readings that an amplifier's noise makes around one level. */
import { madScale } from '../stats/mad.ts';
import { medianInPlace } from '../stats/median.ts';
import { selectInPlace } from '../stats/select.ts';

export interface Peak {
  readonly centre: number;
  readonly centreSe: number;
  /** Standard deviation. */
  readonly width: number;
  readonly widthSe: number;
  /** Readings within three widths of the centre. */
  readonly count: number;
}

/** Least number of pixels a noise peak must be read from. */
export const leastPixels = 30;
/** Share of a sample whose shortest interval marks its densest place. */
const denseShare = 0.01;
/** Standard errors of median and scaled MAD of n normal numbers, times √n over the standard deviation (Huber, Robust Statistics, 1981: √(π/2) and 1.167). */
const errors = { median: 1.2533, mad: 1.167 } as const;

/** Finite values of admitted pixels, thinned to at most about 100 000. */
export function thinned(values: Float32Array, use: (index: number) => boolean): Float64Array {
  const step = Math.max(1, Math.floor(values.length / 100_000));
  const out = new Float64Array(Math.ceil(values.length / step));
  let count = 0;
  for (let i = 0; i < values.length; i += step) if (!Number.isNaN(values[i]!) && use(i)) out[count++] = values[i]!;
  return out.slice(0, count);
}

/**
 * Densest place of a sample (middle of the shortest interval with a hundredth of it), its robust width from the side below, then refined by the
 * median within three widths. With a `quantum`, the step of digitised readings, the width is at least that of rounding and the centre is a mean, because
 * the median of a few levels is one of them.
 */
export function peakOf(sample: Float64Array, quantum = 0): Peak {
  if (sample.length === 0) return { centre: Number.NaN, centreSe: Number.NaN, width: 0, widthSe: Number.NaN, count: 0 };
  const rounding = quantum / Math.sqrt(12);
  let centre = densest(sample);
  let width = 0;
  let count = 0;
  let below = 0;
  const buffer = new Float64Array(sample.length);
  for (let round = 0; round < 6; round++) {
    below = distancesBelow(sample, centre, quantum / 2, width === 0 ? Number.POSITIVE_INFINITY : 4 * width, buffer);
    width = Math.max(rounding, below === 0 ? 0 : madScale * selectInPlace(buffer, below >> 1, below));
    count = valuesAround(sample, centre, Math.max(3 * width, 1.5 * quantum), buffer);
    if (count === 0) break;
    if (quantum > 0) ({ centre, width } = moments(buffer.subarray(0, count), rounding));
    else centre = medianInPlace(buffer, count);
  }
  return { centre, centreSe: (errors.median * width) / Math.sqrt(count), width, widthSe: (errors.mad * width) / Math.sqrt(below), count };
}

/** Distances from the centre, those below `limit`, of the values up to `above` over it, into the buffer; returns how many. */
function distancesBelow(sample: Float64Array, centre: number, above: number, limit: number, into: Float64Array): number {
  let count = 0;
  for (let k = 0; k < sample.length; k++) {
    const value = sample[k]!;
    const distance = Math.abs(centre - value);
    if (value <= centre + above && distance < limit) into[count++] = distance;
  }
  return count;
}

/** The values nearer to the centre than `reach`, into the buffer; returns how many. */
function valuesAround(sample: Float64Array, centre: number, reach: number, into: Float64Array): number {
  let count = 0;
  for (let k = 0; k < sample.length; k++) if (Math.abs(sample[k]! - centre) < reach) into[count++] = sample[k]!;
  return count;
}

function moments(around: Float64Array, rounding: number): { centre: number; width: number } {
  let centre = 0;
  for (const value of around) centre += value / around.length;
  let variance = 0;
  for (const value of around) variance += (value - centre) ** 2 / around.length;
  return { centre, width: Math.max(rounding, Math.sqrt(variance)) };
}

function densest(sample: Float64Array): number {
  const sorted = sample.slice().sort();
  const n = Math.min(sorted.length, Math.max(leastPixels, Math.ceil(denseShare * sorted.length)));
  let best = 0;
  for (let i = 0; i + n <= sorted.length; i++) if (sorted[i + n - 1]! - sorted[i]! < sorted[best + n - 1]! - sorted[best]!) best = i;
  return sorted[best + (n >> 1)]!;
}

/**
 * Whether neighbours in the lower half of the peak, among admitted pixels, are as uncorrelated as noise (|r| < 0.3). A faint terrace just above zero reaches into the
 * upper half and would correlate it. Neighbours are taken across the lines: along a line a slow amplifier correlates its own noise. Readings that all fall on
 * one step of a digitised current show no scatter and pass.
 */
export function isNoise(values: Float32Array, columns: number, peak: Peak, use: (index: number) => boolean, quantum = 0): boolean {
  let n = 0;
  let xy = 0;
  let xx = 0;
  const limit = Math.max(3 * peak.width, quantum);
  const top = peak.centre + quantum / 2;
  const inHalf = (value: number): boolean => value <= top && value >= peak.centre - limit;
  const middle = quantum > 0 ? meanWhere(values, inHalf, use) : peak.centre - Math.sqrt(2 / Math.PI) * peak.width;
  for (let i = columns; i < values.length; i++) {
    const here = values[i]!;
    const there = values[i - columns]!;
    if (!inHalf(here) || !inHalf(there) || !use(i) || !use(i - columns)) continue;
    const a = here - middle;
    const b = there - middle;
    n++;
    xy += a * b;
    xx += (a * a + b * b) / 2;
  }
  return n >= leastPixels && (Math.abs(xy) < 0.3 * xx || (quantum > 0 && xx < n * (quantum / 100) ** 2));
}

/** Deviations are from the mean of the lower half: 0.8 standard deviations below the centre for a normal peak, but anywhere for a few levels. */
function meanWhere(values: Float32Array, admitted: (value: number) => boolean, use: (index: number) => boolean): number {
  let sum = 0;
  let n = 0;
  for (let i = 0; i < values.length; i++) {
    if (!admitted(values[i]!) || !use(i)) continue;
    sum += values[i]!;
    n++;
  }
  return sum / n;
}
