/** The rows of the table: what is measured, how it is written, and what is aimed at. */
import type { Pool } from './score-pool.ts';

export interface Measure {
  readonly name: string;
  readonly value: (pool: Pool) => string;
  /** What is aimed at, in words; absent where nothing is promised. */
  readonly family?: string;
  readonly harder?: string;
}

const share = (value: number, digits = 3): string => (Number.isNaN(value) ? '–' : value.toFixed(digits));

export const measures: readonly Measure[] = [
  { name: 'pixels of bubbles, F1', value: ({ f1 }) => share(f1.bubble), family: '≥ 0.95', harder: '≥ 0.85' },
  { name: 'pixels of residue, F1', value: ({ f1 }) => share(f1.residue), family: '≥ 0.85', harder: '≥ 0.75' },
  { name: 'pixels of wrinkles, F1', value: ({ f1 }) => share(f1.wrinkle), family: '≥ 0.85', harder: '≥ 0.75' },
  { name: 'bubbles of radius ≥ 3 px found', value: (pool) => share(pool.bubblesFound), family: '≥ 0.97', harder: '≥ 0.90' },
  { name: 'bubbles reported that are bubbles', value: (pool) => share(pool.bubblesTrue), family: '≥ 0.95', harder: '≥ 0.90' },
  { name: 'bubbles found and told apart from others', value: (pool) => share(pool.bubblesParted) },
  { name: 'shorts found on unsaturated ground', value: (pool) => share(pool.shortsFound), family: '≥ 0.97', harder: '≥ 0.90' },
  { name: 'shorts reported that are shorts', value: (pool) => share(pool.shortsTrue), family: '≥ 0.95', harder: '≥ 0.90' },
  { name: 'pixels booked to their cause', value: (pool) => share(pool.right, 4) },
  { name: 'usable share, error per map, median', value: (pool) => share(pool.usableMedian, 4), family: '≤ 0.01', harder: '≤ 0.02' },
  { name: 'usable share, error per map, worst', value: (pool) => share(pool.usableWorst, 4), family: '≤ 0.03', harder: '≤ 0.06' },
  { name: 'levelled height, rms error over white noise, median', value: (pool) => share(pool.levelMedian, 2), family: '≤ 1.5', harder: '≤ 2' },
  { name: 'levelled height, rms error over white noise, worst', value: (pool) => share(pool.levelWorst, 2), family: '≤ 1.5', harder: '≤ 2' },
  { name: 'tip wear, error in decades, median', value: (pool) => share(pool.wearMedian, 3), family: '≤ 0.1', harder: '≤ 0.1' },
  { name: 'tip wear, error in decades, worst', value: (pool) => share(pool.wearWorst, 3), family: '≤ 0.1', harder: '≤ 0.1' },
  { name: 'amplifier lag, error in pixels, worst', value: (pool) => share(pool.lagWorst, 2) },
];

export const cleanMeasure: Measure = { name: 'maps without flaws on which none is reported', value: ({ withoutReport, scenes }) => (scenes > 0 ? `${withoutReport} of ${scenes}` : '–'), harder: '≥ 19 of 20' };

export const intervalMeasures: readonly Measure[] = [
  { name: '95 % interval of the usable share holds the truth', value: (pool) => share(pool.covered), family: '≥ 0.90' },
  { name: '95 % interval of the usable share, median width', value: (pool) => share(pool.widthMedian, 4), family: '≤ 0.08' },
];
