/** Height that one gap of the layer ladder adds. */
import { median } from '../stats/median.ts';
import type { LadderPeak } from './ladder.ts';

/** Part of the step within which a pixel counts to a terrace's height. */
const peakPart = 0.25;
/** Distance between the pixels of a pair: beyond the width of a border, within reach of any drift. */
const apartPx = 6;
const leastPairs = 30;

/**
 * Height that one gap of the ladder adds, metres: median over pairs of pixels a few columns apart on one line that stand on different terraces. Near
 * the border and on one line, so that neither the form nor the lines' offsets, which both lean on steps, come into it.
 *
 * @param levelled metres, NaN missing; @param log10 log10 current; @param use admits flawless ground. NaN with fewer than `leastPairs` pairs.
 */
export function heightPerGap(
  levelled: Float32Array, log10: Float32Array, columns: number, peaks: readonly LadderPeak[], stepDecades: number, use: (index: number) => boolean,
): number {
  const place = (i: number): number => {
    for (const peak of peaks) if (Math.abs(log10[i]! - peak.log10) < peakPart * stepDecades) return use(i) ? peak.rung : Number.NaN;
    return Number.NaN;
  };
  const steps: number[] = [];
  for (let i = 0; i + apartPx < levelled.length; i++) {
    if (i % columns >= columns - apartPx) continue;
    // Cheap test first: most pairs stand on one terrace.
    if (!(Math.abs(log10[i + apartPx]! - log10[i]!) > 0.5 * stepDecades)) continue;
    const gaps = place(i + apartPx) - place(i);
    const step = (levelled[i + apartPx]! - levelled[i]!) / gaps;
    if (Number.isFinite(step)) steps.push(step);
  }
  return steps.length < leastPairs ? Number.NaN : median(steps);
}
