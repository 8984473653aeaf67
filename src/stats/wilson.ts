import { normalQuantile } from './normal.ts';

/**
 * Wilson's score interval of a share, `hits` of `trials` (E. B. Wilson, J. Am. Stat. Assoc. 22,
 * 209, 1927). 0 to 1 for no trials; NaN when hits are negative or exceed trials.
 */
export function wilsonInterval(hits: number, trials: number, confidence = 0.95): { low: number; high: number } {
  if (!(hits >= 0 && hits <= trials)) return { low: Number.NaN, high: Number.NaN };
  if (trials === 0) return { low: 0, high: 1 };
  const z = normalQuantile((1 + confidence) / 2);
  const share = hits / trials;
  const spread = (z * z) / trials;
  const centre = (share + spread / 2) / (1 + spread);
  const half = (z * Math.sqrt((share * (1 - share)) / trials + spread / (4 * trials))) / (1 + spread);
  // At no hits and at all hits the ends are 0 and 1; rounding must not move them.
  return { low: hits === 0 ? 0 : centre - half, high: hits === trials ? 1 : centre + half };
}
