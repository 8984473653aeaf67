/** Peaks of a smoothed histogram: the levels that a map's ground stands on. */

export interface Peak {
  readonly at: number;
  /** Share of the histogram between the valleys around the peak. */
  readonly share: number;
}

export interface PeakRule {
  /** Width of a bin, in the values' unit. */
  readonly bin: number;
  /** Standard deviation of the kernel that smooths the histogram, in the values' unit. */
  readonly smooth: number;
  /** A peak with a smaller share of the values is dropped. */
  readonly leastShare: number;
  /** A valley must fall at least to this share of the lower of its two peaks. */
  readonly valleyShare: number;
}

/** A histogram of so many values has less noise than the smoothing takes out. */
const enoughValues = 260_000;

/**
 * Peaks of the histogram of the values that `use` admits, smoothed by a Gaussian; shallow valleys are merged away until all that are left are deep
 * enough. Lowest value first; empty where nothing is admitted. NaN and infinite values are skipped. Of large maps every n-th value is taken.
 */
export function histogramPeaks(values: Float32Array, use: (index: number) => boolean, rule: PeakRule): Peak[] {
  const histogram = smoothedHistogram(values, use, rule);
  return histogram ? findPeaks(histogram.counts, histogram.low, rule) : [];
}

function smoothedHistogram(values: Float32Array, use: (index: number) => boolean, { bin, smooth }: PeakRule): { counts: Float64Array; low: number } | undefined {
  const step = Math.max(1, Math.floor(values.length / enoughValues));
  let low = Number.POSITIVE_INFINITY;
  let high = Number.NEGATIVE_INFINITY;
  for (let i = 0; i < values.length; i += step) {
    const value = values[i]!;
    if (!Number.isFinite(value) || !use(i)) continue;
    if (value < low) low = value;
    if (value > high) high = value;
  }
  if (!(high >= low)) return undefined;
  const margin = 4 * smooth;
  low -= margin;
  const bins = Math.ceil((high + margin - low) / bin) + 1;
  const raw = new Float64Array(bins);
  let total = 0;
  for (let i = 0; i < values.length; i += step) {
    const value = values[i]!;
    if (!Number.isFinite(value) || !use(i)) continue;
    raw[Math.floor((value - low) / bin)]!++;
    total++;
  }
  return { counts: gaussianBlur(raw, smooth / bin, 1 / total), low };
}

function gaussianBlur(values: Float64Array, sigma: number, scale: number): Float64Array {
  const reach = Math.ceil(4 * sigma);
  const kernel = Float64Array.from({ length: 2 * reach + 1 }, (_, k) => Math.exp(-((k - reach) ** 2) / (2 * sigma * sigma)));
  const norm = kernel.reduce((sum, k) => sum + k, 0);
  const out = new Float64Array(values.length);
  for (let i = 0; i < values.length; i++) {
    let sum = 0;
    for (let k = -reach; k <= reach; k++) sum += (values[i + k] ?? 0) * kernel[k + reach]!;
    out[i] = (sum * scale) / norm;
  }
  return out;
}

function findPeaks(counts: Float64Array, low: number, { bin, leastShare, valleyShare }: PeakRule): Peak[] {
  let tops: number[] = [];
  for (let i = 1; i + 1 < counts.length; i++) if (counts[i]! > 0 && counts[i]! >= counts[i - 1]! && counts[i]! > counts[i + 1]!) tops.push(i);
  for (;;) {
    let worst = -1;
    let worstRatio = valleyShare;
    for (let k = 0; k + 1 < tops.length; k++) {
      const ratio = valley(counts, tops[k]!, tops[k + 1]!).depth / Math.min(counts[tops[k]!]!, counts[tops[k + 1]!]!);
      if (ratio > worstRatio) {
        worstRatio = ratio;
        worst = k;
      }
    }
    if (worst < 0) break;
    const lower = counts[tops[worst]!]! < counts[tops[worst + 1]!]! ? worst : worst + 1;
    tops = tops.filter((_, k) => k !== lower);
  }
  const cuts = [0, ...tops.slice(1).map((top, k) => valley(counts, tops[k]!, top).at), counts.length];
  const peaks = tops.map((top, k) => {
    let share = 0;
    for (let i = cuts[k]!; i < cuts[k + 1]!; i++) share += counts[i]!;
    return { at: low + (top + 0.5) * bin, share };
  });
  return peaks.filter((peak) => peak.share >= leastShare);
}

function valley(counts: Float64Array, from: number, to: number): { at: number; depth: number } {
  let at = from;
  for (let i = from; i <= to; i++) if (counts[i]! < counts[at]!) at = i;
  return { at, depth: counts[at]! };
}
