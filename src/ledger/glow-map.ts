import { median } from '../stats/median.ts';
import { codeOf } from './book-causes.ts';

/**
 * Relative emission per pixel: proportional to the density, 1 at the median of usable ground, 0 under bubbles, shorts, residue and open spots; NaN under wrinkles
 * (what they do is not known), where nothing was measured and outside the footprint. Without a density every value but the zeros is NaN.
 *
 * @param density density over the reference's, NaN unknown.
 */
export function glowMap(codes: Uint8Array, density: Float32Array | undefined): Float32Array {
  const usable = codeOf('usable');
  const dark = new Set([codeOf('bubble'), codeOf('short'), codeOf('residue'), codeOf('open')]);
  const unknown = new Set([codeOf('wrinkle'), codeOf('unmeasured'), codeOf('outside')]);
  const norm = density ? median(density.filter((value, i) => codes[i] === usable && !Number.isNaN(value))) : Number.NaN;
  const glow = new Float32Array(codes.length).fill(Number.NaN);
  for (let i = 0; i < glow.length; i++) {
    const code = codes[i]!;
    if (dark.has(code)) glow[i] = 0;
    else if (!unknown.has(code) && density) glow[i] = density[i]! / (norm > 0 ? norm : 1);
  }
  return glow;
}
