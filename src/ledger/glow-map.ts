import { median } from '../stats/median.ts';
import { codeOf } from './book-causes.ts';
import type { Cause } from './ledger.ts';
import { causes } from './ledger.ts';

/**
 * Relative emission per pixel: proportional to the density, 1 at the median of usable ground, 0 under bubbles, shorts, residue and open spots and under a contact's metal,
 * which lets no light through; NaN under wrinkles (what they do is not known), where nothing was measured and outside the footprint. Without a density every value but the zeros is NaN.
 *
 * @param density density over the reference's, NaN unknown; @param metal 1 under a contact's metal, whatever else is booked there.
 */
export function glowMap(codes: Uint8Array, density: Float32Array | undefined, metal?: Uint8Array): Float32Array {
  const usable = codeOf('usable');
  const outside = codeOf('outside');
  const dark = flagsOf(['bubble', 'short', 'residue', 'open']);
  const unknown = flagsOf(['wrinkle', 'unmeasured', 'outside']);
  const norm = density ? median(density.filter((value, i) => codes[i] === usable && !Number.isNaN(value))) : Number.NaN;
  const glow = new Float32Array(codes.length).fill(Number.NaN);
  for (let i = 0; i < glow.length; i++) {
    const code = codes[i]!;
    if (dark[code] === 1 || (metal?.[i] === 1 && code !== outside)) glow[i] = 0;
    else if (unknown[code] === 0 && density && Number.isFinite(density[i]!)) glow[i] = density[i]! / (norm > 0 ? norm : 1);
  }
  return glow;
}

/** One flag per code. */
function flagsOf(named: readonly Cause[]): Uint8Array {
  return Uint8Array.from(causes, (cause) => (named.includes(cause) ? 1 : 0));
}
