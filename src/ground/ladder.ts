/** The layer ladder: equal steps of log current between terraces of whole layers, measured from the map. */

import { histogramPeaks } from '../stats/histogram-peaks.ts';

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

/** Standard deviation of the kernel that smooths the histogram, decades. */
const smoothDecades = 0.05;
/** Peaks with less than a hundredth of the ground are no terraces worth a rung. */
const rule = { bin: 0.01, smooth: smoothDecades, leastShare: 0.01, valleyShare: 0.8 } as const;

/**
 * Finds the terraces as peaks of the histogram of log current and the common step between them.
 *
 * The step is the largest one of which all gaps between neighbouring peaks are whole multiples to within a fifth of it;
 * it is then refined by least squares of peak position over layer number, weighted by share.
 *
 * @param log10 log10 current; @param use admits uncensored, unflawed ground. NaN is skipped.
 */
export function measureLadder(log10: Float32Array, use: (index: number) => boolean): LadderFit {
  const found = histogramPeaks(log10, use, rule).map(({ at, share }) => ({ log10: at, share })).reverse();
  if (found.length < 2) return { peaks: found.map((peak) => ({ ...peak, rung: 0 })) };
  return fitStep(found);
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
