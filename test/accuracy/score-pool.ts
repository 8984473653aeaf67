/** Pools the scores of many scenes into measures. */
import { codeOf } from '../../src/ledger/book-causes.ts';
import { causes } from '../../src/ledger/ledger.ts';
import { median } from '../../src/stats/median.ts';
import type { Count, SceneScore } from './score-scene.ts';

const side = causes.length;

/** Measures of a pool of scenes; NaN where there was nothing to measure. */
export interface Pool {
  readonly scenes: number;
  readonly f1: { readonly bubble: number; readonly residue: number; readonly wrinkle: number };
  readonly bubblesFound: number;
  readonly bubblesTrue: number;
  /** Share of the bubbles there that are found and have a flaw of their own. */
  readonly bubblesParted: number;
  readonly shortsFound: number;
  readonly shortsTrue: number;
  /** Share of pixels booked to their true cause. */
  readonly right: number;
  readonly usableMedian: number;
  readonly usableWorst: number;
  readonly levelMedian: number;
  readonly levelWorst: number;
  readonly wearMedian: number;
  readonly wearWorst: number;
  readonly lagWorst: number;
  readonly covered: number;
  readonly widthMedian: number;
  readonly withoutReport: number;
}

export function poolScores(scores: readonly SceneScore[]): Pool {
  const confusion = Array.from({ length: side * side }, () => 0);
  for (const score of scores) score.confusion.forEach((pixels, k) => (confusion[k]! += pixels));
  const usableErrors = scores.map(({ usable }) => Math.abs(usable[0] - usable[1]));
  const wears = scores.map(({ wear }) => Math.abs(wear[0] - wear[1]));
  const levels = scores.map(({ levelRatio }) => levelRatio);
  const intervals = scores.flatMap(({ interval, usable }) => (interval ? [{ interval, truth: usable[1] }] : []));
  const lags = scores.flatMap(({ lag }) => (lag[0] === null ? [] : [Math.abs(lag[0] - lag[1])]));
  return {
    scenes: scores.length,
    f1: { bubble: f1(confusion, codeOf('bubble')), residue: f1(confusion, codeOf('residue')), wrinkle: f1(confusion, codeOf('wrinkle')) },
    bubblesFound: ratio(scores, 'bubbles', 'found', 'there'),
    bubblesTrue: ratio(scores, 'bubbles', 'true', 'claimed'),
    bubblesParted: ratio(scores, 'bubbles', 'parted', 'there'),
    shortsFound: ratio(scores, 'shorts', 'found', 'there'),
    shortsTrue: ratio(scores, 'shorts', 'true', 'claimed'),
    right: causes.reduce((sum, _, k) => sum + confusion[k * side + k]!, 0) / confusion.reduce((sum, pixels) => sum + pixels, 0),
    usableMedian: median(usableErrors),
    usableWorst: worst(usableErrors),
    levelMedian: median(levels),
    levelWorst: worst(levels),
    wearMedian: median(wears),
    wearWorst: worst(wears),
    lagWorst: worst(lags),
    covered: intervals.filter(({ interval, truth }) => interval[0] <= truth && truth <= interval[1]).length / intervals.length,
    widthMedian: median(intervals.map(({ interval }) => interval[1] - interval[0])),
    withoutReport: scores.filter(({ flawsReported }) => flawsReported === 0).length,
  };
}

/** 2·right over (there + found), pixels of one code. */
export function f1(confusion: readonly number[], code: number): number {
  let [there, found] = [0, 0];
  for (let k = 0; k < side; k++) {
    there += confusion[code * side + k]!;
    found += confusion[k * side + code]!;
  }
  return (2 * confusion[code * side + code]!) / (there + found);
}

function ratio(scores: readonly SceneScore[], what: 'bubbles' | 'shorts', over: keyof Count, under: keyof Count): number {
  const sum = (key: keyof Count): number => scores.reduce((total, score) => total + score[what][key], 0);
  return sum(over) / sum(under);
}

function worst(values: readonly number[]): number {
  return values.length > 0 ? Math.max(...values) : Number.NaN;
}
