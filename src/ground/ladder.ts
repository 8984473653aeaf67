/** The layer ladder: equal steps of log current between terraces of whole layers, measured from the map. */

import { layersBetween } from './gap-height.ts';
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
/** Two peaks on one level are one terrace when they lie nearer than this part of the widest gap. */
const sameTerracePart = 0.75;
/** Peaks with less than a hundredth of the ground are no terraces worth a rung. */
const rule = { bin: 0.01, smooth: smoothDecades, leastShare: 0.01, valleyShare: 0.8 } as const;

/** What the height says about the terraces. */
export interface LadderHeight {
  /** Metres, NaN missing. */
  readonly levelled: Float32Array;
  readonly columns: number;
  readonly layerM: number;
}

/**
 * Finds the terraces as peaks of the histogram of log current and the common step between them.
 *
 * How many layers lie between two neighbouring peaks the height tells where enough borders between them are seen; two peaks on one level are one
 * terrace whose contact varies. Where it does not tell, the step is the largest one of which all gaps are whole multiples to within a fifth of it. The
 * step is then refined by least squares of peak position over layer number, weighted by share. Equal numbers of layers in every gap
 * count as one here: what the current alone would not show is not decided by the ladder.
 *
 * @param log10 log10 current; @param use admits uncensored, unflawed ground. NaN is skipped.
 */
export function measureLadder(log10: Float32Array, use: (index: number) => boolean, height?: LadderHeight): LadderFit {
  let found = histogramPeaks(log10, use, rule).map(({ at, share }) => ({ log10: at, share })).reverse();
  if (found.length < 2) return { peaks: found.map((peak) => ({ ...peak, rung: 0 })) };
  for (;;) {
    const layers = height ? layersBetween(height.levelled, log10, height.columns, found.map((peak) => peak.log10), height.layerM, use) : found.slice(1).map(() => undefined);
    const widest = Math.max(...found.slice(1).map((peak, k) => found[k]!.log10 - peak.log10));
    const level = layers.findIndex((n, k) => n === 0 && found[k]!.log10 - found[k + 1]!.log10 < sameTerracePart * widest);
    if (level < 0) return fitStep(found, layers);
    const [a, b] = [found[level]!, found[level + 1]!];
    const share = a.share + b.share;
    found = [...found.slice(0, level), { log10: (a.share * a.log10 + b.share * b.log10) / share, share }, ...found.slice(level + 2)];
  }
}

/** Layers in each gap: by the height where it tells every gap, otherwise by the largest common step. */
function layersOfGaps(gaps: readonly number[], byHeight: readonly (number | undefined)[]): number[] {
  if (byHeight.every((n) => n !== undefined && n > 0)) {
    const layers = byHeight as number[];
    return layers.every((n) => n === layers[0]) ? layers.map(() => 1) : [...layers];
  }
  const candidates = gaps.flatMap((gap) => [gap, gap / 2, gap / 3]).sort((a, b) => b - a);
  const step = candidates.find((s) => gaps.every((gap) => Math.abs(gap / s - Math.max(1, Math.round(gap / s))) < 0.2)) ?? Math.min(...gaps);
  return gaps.map((gap) => Math.max(1, Math.round(gap / step)));
}

function fitStep(found: readonly { log10: number; share: number }[], byHeight: readonly (number | undefined)[]): LadderFit {
  const layers = layersOfGaps(found.slice(1).map((peak, k) => found[k]!.log10 - peak.log10), byHeight);
  let rung = 0;
  const peaks = found.map((peak, k) => {
    if (k > 0) rung += layers[k - 1]!;
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
