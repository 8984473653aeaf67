/** Height that one gap of the layer ladder adds. */
import { median } from '../stats/median.ts';

/** Part of the step within which a pixel counts to a terrace's height. */
const peakPart = 0.25;
/** Distance between the pixels of a pair: beyond the width of a border as a round tip draws it, within reach of any drift. */
export const leastApartPx = 6;
const apartM = 60e-9;
/** But no further than this part of a line: over that a form that leans on the steps hides them. */
const apartShare = 1 / 16;
const leastPairs = 30;
/** A height this near to whole layers, in layers, counts them. */
const wholePart = 0.35;
const farLayers = 3.5;

/** Columns between the two pixels of a pair, for a map of this pitch and so many columns. */
export function pairDistancePx(pitchXM: number, columns: number): number {
  return Math.max(leastApartPx, Math.min(Math.ceil(apartM / pitchXM - 1e-9), Math.floor(apartShare * columns)));
}

/**
 * Height that one gap of the ladder adds, metres: median over pairs of pixels a few columns apart on one line that stand on different terraces. Near
 * the border and on one line, so that neither the form nor the lines' offsets, which both lean on steps, come into it.
 *
 * @param levelled metres, NaN missing; @param log10 log10 current; @param use admits flawless ground. NaN with fewer than `leastPairs` pairs.
 */
export function heightPerGap(
  levelled: Float32Array, log10: Float32Array, columns: number, peaks: readonly { readonly log10: number; readonly rung: number }[], stepDecades: number, use: (index: number) => boolean, apartPx = leastApartPx,
): number {
  const place = (i: number): number => {
    for (const peak of peaks) if (Math.abs(log10[i]! - peak.log10) < peakPart * stepDecades) return use(i) ? peak.rung : Number.NaN;
    return Number.NaN;
  };
  const steps: number[] = [];
  // Most pairs stand on one terrace.
  for (let i = nextPair(log10, columns, 0, 0.5 * stepDecades, apartPx); i >= 0; i = nextPair(log10, columns, i + 1, 0.5 * stepDecades, apartPx)) {
    const gaps = place(i + apartPx) - place(i);
    const step = (levelled[i + apartPx]! - levelled[i]!) / gaps;
    if (Number.isFinite(step)) steps.push(step);
  }
  return steps.length < leastPairs ? Number.NaN : median(steps);
}

/**
 * Layers between each peak and the next by the height, from such pairs; NaN where hardly any pair crosses that border, on a line or from line to line; undefined where
 * only pairs from line to line do, or where the height is not near to whole layers.
 *
 * @param peaks by falling current, at least two.
 */
export function layersBetween(
  levelled: Float32Array, log10: Float32Array, columns: number, peaks: readonly number[], layerM: number, use: (index: number) => boolean, apartPx = leastApartPx,
): (number | undefined)[] {
  const reach = peaks.map((peak, k) => peakPart * Math.min(k > 0 ? peaks[k - 1]! - peak : Number.POSITIVE_INFINITY, k + 1 < peaks.length ? peak - peaks[k + 1]! : Number.POSITIVE_INFINITY));
  const place = (i: number): number => {
    for (let k = 0; k < peaks.length; k++) if (Math.abs(log10[i]! - peaks[k]!) < reach[k]!) return use(i) ? k : -1;
    return -1;
  };
  const least = Math.min(...reach);
  const steps: number[][] = peaks.slice(1).map(() => []);
  for (let i = nextPair(log10, columns, 0, least, apartPx); i >= 0; i = nextPair(log10, columns, i + 1, least, apartPx)) {
    const here = place(i);
    const there = place(i + apartPx);
    if (here < 0 || there < 0 || Math.abs(there - here) !== 1) continue;
    const up = (levelled[i + apartPx]! - levelled[i]!) * (there - here);
    if (up === up) steps[Math.min(here, there)]!.push(up);
  }
  const seenAcross = steps.some((list) => list.length < leastPairs) ? bordersAcrossLines(log10, columns, place, least, peaks.length, apartPx) : undefined;
  return steps.map((list, k) => {
    // Over a border along the lines the height tells nothing, because the lines' offsets lean on it; but the border is there.
    if (list.length < leastPairs) return seenAcross![k]! < leastPairs ? Number.NaN : undefined;
    const layers = median(list) / layerM;
    // What lies this far off is told from a layer or two however it fits.
    if (Math.abs(layers) > farLayers) return Math.round(layers);
    return Math.abs(layers - Math.round(layers)) < wholePart ? Math.round(layers) : undefined;
  });
}

/** By gap between peaks: pairs of pixels in one column that stand on either side of it. */
function bordersAcrossLines(log10: Float32Array, columns: number, place: (i: number) => number, least: number, peaks: number, apartPx: number): Uint32Array {
  const seen = new Uint32Array(peaks - 1);
  const step = apartPx * columns;
  for (let i = 0; i + step < log10.length; i++) {
    if (!(Math.abs(log10[i + step]! - log10[i]!) > least)) continue;
    const here = place(i);
    const there = place(i + step);
    if (here >= 0 && there >= 0 && Math.abs(there - here) === 1) seen[Math.min(here, there)]!++;
  }
  return seen;
}

/** The first pixel from `i` on whose log current differs from that of its partner on the same line by more than `least`; −1 without any. */
function nextPair(log10: Float32Array, columns: number, i: number, least: number, apartPx: number): number {
  for (let lineEnd = (Math.floor(i / columns) + 1) * columns; i < log10.length; i = lineEnd, lineEnd += columns) {
    for (const last = lineEnd - apartPx; i < last; i++) if (Math.abs(log10[i + apartPx]! - log10[i]!) > least) return i;
  }
  return -1;
}
