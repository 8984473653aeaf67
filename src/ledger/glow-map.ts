import { medianInPlace } from '../stats/median.ts';
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
  const norm = density ? medianInPlace(valuesOf(density, codes, usable)) : Number.NaN;
  const glow = new Float32Array(codes.length).fill(Number.NaN);
  if (density) {
    const one = norm > 0 ? norm : 1;
    for (let i = 0; i < glow.length; i++) if (unknown[codes[i]!] === 0 && Number.isFinite(density[i]!)) glow[i] = density[i]! / one;
  }
  for (let i = 0; i < glow.length; i++) if (dark[codes[i]!] === 1) glow[i] = 0;
  if (metal) for (let i = 0; i < glow.length; i++) if (metal[i] === 1 && codes[i] !== outside) glow[i] = 0;
  return glow;
}

/** The known values of the pixels with a code. */
function valuesOf(values: Float32Array, codes: Uint8Array, code: number): Float64Array {
  const out = new Float64Array(values.length);
  let count = 0;
  for (let i = 0; i < values.length; i++) if (codes[i] === code && values[i] === values[i]) out[count++] = values[i]!;
  return out.subarray(0, count);
}

/** One flag per code. */
function flagsOf(named: readonly Cause[]): Uint8Array {
  return Uint8Array.from(causes, (cause) => (named.includes(cause) ? 1 : 0));
}
