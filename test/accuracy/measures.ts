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
  { name: 'pixels of bubbles, F1', value: ({ f1 }) => share(f1.bubble) },
  { name: 'pixels of residue, F1', value: ({ f1 }) => share(f1.residue) },
  { name: 'pixels of wrinkles, F1', value: ({ f1 }) => share(f1.wrinkle) },
  { name: 'bubbles of radius ≥ 3 px found', value: (pool) => share(pool.bubblesFound) },
  { name: 'bubbles reported that are bubbles', value: (pool) => share(pool.bubblesTrue) },
  { name: 'shorts found on unsaturated ground', value: (pool) => share(pool.shortsFound) },
  { name: 'shorts reported that are shorts', value: (pool) => share(pool.shortsTrue) },
  { name: 'pixels booked to their cause', value: (pool) => share(pool.right, 4) },
  { name: 'usable share, error per map, median', value: (pool) => share(pool.usableMedian, 4) },
  { name: 'usable share, error per map, worst', value: (pool) => share(pool.usableWorst, 4) },
  { name: 'levelled height, rms error over white noise, median', value: (pool) => share(pool.levelMedian, 2) },
  { name: 'levelled height, rms error over white noise, worst', value: (pool) => share(pool.levelWorst, 2) },
  { name: 'tip wear, error in decades, median', value: (pool) => share(pool.wearMedian, 3) },
  { name: 'tip wear, error in decades, worst', value: (pool) => share(pool.wearWorst, 3) },
  { name: 'amplifier lag, error in pixels, worst', value: (pool) => share(pool.lagWorst, 2) },
];

export const cleanMeasure: Measure = { name: 'maps without flaws on which none is reported', value: ({ withoutReport, scenes }) => (scenes > 0 ? `${withoutReport} of ${scenes}` : '–') };

export const intervalMeasures: readonly Measure[] = [
  { name: '95 % interval of the usable share holds the truth', value: (pool) => share(pool.covered) },
  { name: '95 % interval of the usable share, median width', value: (pool) => share(pool.widthMedian, 4) },
];
