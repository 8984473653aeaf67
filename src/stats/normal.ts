/** The normal distribution. */
import { gammaQ } from './gamma.ts';

/** Φ(z), the chance of a standard normal number below z, with full relative precision in both tails. */
export function normalCumulative(z: number): number {
  if (Number.isNaN(z)) return Number.NaN;
  const tail = 0.5 * gammaQ(0.5, (z * z) / 2);
  return z < 0 ? tail : 1 - tail;
}

/**
 * Φ⁻¹(p): Abramowitz & Stegun 26.2.23 (1964) as a start, then Halley's steps. −Infinity at 0,
 * Infinity at 1, NaN outside.
 */
export function normalQuantile(p: number): number {
  if (!(p >= 0 && p <= 1)) return Number.NaN;
  if (p === 0.5) return 0;
  if (p > 0.5) return -normalQuantile(1 - p);
  if (p === 0) return Number.NEGATIVE_INFINITY;
  const t = Math.sqrt(-2 * Math.log(p));
  let z = -(t - (2.515517 + t * (0.802853 + t * 0.010328)) / (1 + t * (1.432788 + t * (0.189269 + t * 0.001308))));
  for (let round = 0; round < 3; round++) {
    const step = (normalCumulative(z) - p) * Math.sqrt(2 * Math.PI) * Math.exp((z * z) / 2);
    z -= step / (1 + (z * step) / 2);
  }
  return z;
}
