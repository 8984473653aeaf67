/** The layer ladder: equal steps of log current between terraces of whole layers, measured from the map. */

export interface LadderFit {
  /** Positions of the terraces' peaks in log10 current, highest current first. */
  readonly peaks: readonly LadderPeak[];
  /** Decades per layer with standard error; absent with fewer than two peaks. */
  readonly stepDecades?: number;
  readonly stepSeDecades?: number;
}

export interface LadderPeak {
  readonly log10: number;
  /** Share of the histogram between the valleys around the peak. */
  readonly share: number;
  /** Whole layers from the first (thinnest) peak. */
  readonly rung: number;
}

const binDecades = 0.01;
/** Standard deviation of the kernel that smooths the histogram. */
const smoothDecades = 0.05;
/** A peak with a smaller share of the ground is no terrace worth a rung. */
const leastShare = 0.01;
/** A valley must fall at least to this share of the lower of its two peaks. */
const valleyShare = 0.8;

/**
 * Finds the terraces as peaks of the histogram of log current and the common step between them.
 *
 * The step is the largest one of which all gaps between neighbouring peaks are whole multiples to within a fifth of it;
 * it is then refined by least squares of peak position over layer number, weighted by share.
 *
 * @param log10 log10 current; @param use admits uncensored, unflawed ground. NaN is skipped.
 */
export function measureLadder(log10: Float32Array, use: (index: number) => boolean): LadderFit {
  const histogram = smoothedHistogram(log10, use);
  if (!histogram) return { peaks: [] };
  const found = findPeaks(histogram.counts, histogram.low);
  if (found.length < 2) return { peaks: found.map((peak) => ({ ...peak, rung: 0 })) };
  return fitStep(found);
}

function smoothedHistogram(log10: Float32Array, use: (index: number) => boolean): { counts: Float64Array; low: number } | undefined {
  let low = Number.POSITIVE_INFINITY;
  let high = Number.NEGATIVE_INFINITY;
  for (let i = 0; i < log10.length; i++) {
    const value = log10[i]!;
    if (Number.isNaN(value) || !use(i)) continue;
    if (value < low) low = value;
    if (value > high) high = value;
  }
  if (!(high >= low)) return undefined;
  const margin = 4 * smoothDecades;
  low -= margin;
  const bins = Math.ceil((high + margin - low) / binDecades) + 1;
  const raw = new Float64Array(bins);
  let total = 0;
  for (let i = 0; i < log10.length; i++) {
    const value = log10[i]!;
    if (Number.isNaN(value) || !use(i)) continue;
    raw[Math.floor((value - low) / binDecades)]!++;
    total++;
  }
  return { counts: gaussianBlur(raw, smoothDecades / binDecades, 1 / total), low };
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

/** Maxima whose valleys on both sides are deep enough, merged upwards until all are; highest current first. */
function findPeaks(counts: Float64Array, low: number): { log10: number; share: number }[] {
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
    return { log10: low + (top + 0.5) * binDecades, share };
  });
  return peaks.filter((peak) => peak.share >= leastShare).reverse();
}

function valley(counts: Float64Array, from: number, to: number): { at: number; depth: number } {
  let at = from;
  for (let i = from; i <= to; i++) if (counts[i]! < counts[at]!) at = i;
  return { at, depth: counts[at]! };
}

function fitStep(found: readonly { log10: number; share: number }[]): LadderFit {
  const gaps = found.slice(1).map((peak, k) => found[k]!.log10 - peak.log10);
  const candidates = gaps.flatMap((gap) => [gap, gap / 2, gap / 3]).sort((a, b) => b - a);
  const step = candidates.find((s) => gaps.every((gap) => Math.abs(gap / s - Math.max(1, Math.round(gap / s))) < 0.2)) ?? Math.min(...gaps);
  let rung = 0;
  const peaks = found.map((peak, k) => {
    if (k > 0) rung += Math.max(1, Math.round(gaps[k - 1]! / step));
    return { ...peak, rung };
  });
  // Weighted straight line of position over layer number.
  let w = 0;
  let mx = 0;
  let my = 0;
  for (const p of peaks) {
    w += p.share;
    mx += p.share * p.rung;
    my += p.share * p.log10;
  }
  mx /= w;
  my /= w;
  let sxx = 0;
  let sxy = 0;
  for (const p of peaks) {
    sxx += p.share * (p.rung - mx) ** 2;
    sxy += p.share * (p.rung - mx) * (p.log10 - my);
  }
  const slope = sxy / sxx;
  let rss = 0;
  for (const p of peaks) rss += p.share * (p.log10 - my - slope * (p.rung - mx)) ** 2;
  // Two peaks leave no residual: then half the smoothing kernel's width stands for the error of each.
  const variance = peaks.length > 2 ? (rss / w) * (peaks.length / (peaks.length - 2)) : (smoothDecades / 2) ** 2;
  return { peaks, stepDecades: -slope, stepSeDecades: Math.sqrt((variance * w) / (sxx * peaks.length)) };
}
