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
/** Or this part, where hardly a border between them is seen: one terrace whose contact varies slowly. */
const borderlessPart = 0.4;
/** A small peak that lies more layers than this from its neighbour is a film. */
const mostLayers = 3;
const filmShare = 0.05;
/** Peaks with less than a hundredth of the ground are no terraces worth a rung. */
const rule = { bin: 0.01, smooth: smoothDecades, leastShare: 0.01, valleyShare: 0.8 } as const;

/** What the height says about the terraces. */
export interface LadderHeight {
  /** Metres, NaN missing. */
  readonly levelled: Float32Array;
  readonly columns: number;
  readonly layerM: number;
  /** Columns between the pixels of a pair (`pairDistancePx`). */
  readonly apartPx?: number;
}

/**
 * Finds the terraces as peaks of the histogram of log current and the common step between them.
 *
 * How many layers lie between two neighbouring peaks the height tells where enough borders between them are seen; two peaks on one level are one
 * terrace whose contact varies, and a small one many layers away is a film. Where it does not tell, the step is the largest one of which all gaps are whole multiples to within a fifth of it. The
 * step is then refined by least squares of peak position over layer number, weighted by share. Equal numbers of layers in every gap
 * count as one here: what the current alone would not show is not decided by the ladder.
 *
 * @param log10 log10 current; @param use admits uncensored, unflawed ground. NaN is skipped.
 */
export function measureLadder(log10: Float32Array, use: (index: number) => boolean, height?: LadderHeight): LadderFit {
  let found = histogramPeaks(log10, use, rule).map(({ at, share }) => ({ log10: at, share })).reverse();
  for (;;) {
    if (found.length < 2) return { peaks: found.map((peak) => ({ ...peak, rung: 0 })) };
    const layers = height ? layersBetween(height.levelled, log10, height.columns, found.map((peak) => peak.log10), height.layerM, use, height.apartPx) : found.slice(1).map(() => undefined);
    const film = layers.findIndex((n, k) => n !== undefined && Math.abs(n) > mostLayers && Math.min(found[k]!.share, found[k + 1]!.share) < filmShare);
    if (film >= 0) {
      const drop = found[film]!.share < found[film + 1]!.share ? film : film + 1;
      found = found.filter((_, k) => k !== drop);
      continue;
    }
    const widest = Math.max(...found.slice(1).map((peak, k) => found[k]!.log10 - peak.log10));
    const level = layers.findIndex((n, k) => n !== undefined && found[k]!.log10 - found[k + 1]!.log10 < (n === 0 ? sameTerracePart : Number.isNaN(n) ? borderlessPart : 0) * widest);
    if (level < 0) return fitStep(found, layers);
    const [a, b] = [found[level]!, found[level + 1]!];
    const share = a.share + b.share;
    found = [...found.slice(0, level), { log10: (a.share * a.log10 + b.share * b.log10) / share, share }, ...found.slice(level + 2)];
  }
}

/** Layers in each gap: by the height, and where it does not tell by the step that follows from where it does; without any height by the largest common step. */
function layersOfGaps(gaps: readonly number[], byHeight: readonly (number | undefined)[]): number[] {
  let decades = 0;
  let layers = 0;
  gaps.forEach((gap, k) => {
    const n = byHeight[k];
    if (n === undefined || !(n > 0)) return;
    decades += gap;
    layers += n;
  });
  const told = layers > 0 ? decades / layers : undefined;
  const candidates = gaps.flatMap((gap) => [gap, gap / 2, gap / 3]).sort((a, b) => b - a);
  const step = told ?? candidates.find((s) => gaps.every((gap) => Math.abs(gap / s - Math.max(1, Math.round(gap / s))) < 0.2)) ?? Math.min(...gaps);
  const counts = gaps.map((gap, k) => (byHeight[k] !== undefined && byHeight[k]! > 0 ? byHeight[k]! : Math.max(1, Math.round(gap / step))));
  return counts.every((n) => n === counts[0]) ? counts.map(() => 1) : counts;
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
