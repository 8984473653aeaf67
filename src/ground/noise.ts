import { madScale } from '../stats/mad.ts';
import { medianInPlace } from '../stats/median.ts';

/**
 * Robust standard deviation of the pixel noise: 1.4826 × median |difference of horizontal neighbours| / √2, over at
 * most about 60 000 pairs that `use` admits. Slopes and features add little because the median ignores the steep few.
 * NaN when no pair is finite.
 */
export function pixelNoise(values: Float32Array, columns: number, rows: number, use: (index: number) => boolean = () => true): number {
  const step = Math.max(1, Math.floor((columns * rows) / 60_000));
  const differences = new Float64Array(Math.ceil((columns * rows) / step));
  let count = 0;
  for (let i = 1; i < columns * rows; i += step) {
    if (i % columns === 0 || !use(i) || !use(i - 1)) continue;
    const d = Math.abs(values[i]! - values[i - 1]!);
    if (!Number.isNaN(d)) differences[count++] = d;
  }
  return (madScale * medianInPlace(differences, count)) / Math.SQRT2;
}
