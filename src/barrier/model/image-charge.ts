/**
 * Corrections of the triangular barrier by the image charge: v(f) in the exponent, t(f) in the
 * prefactor, with complete elliptic integrals (Forbes & Deane, Proc. R. Soc. A 463, 2907, 2007):
 *   v = √(1+√f)·[E(k²) − √f·K(k²)],  t = v − (4/3) f dv/df = [(1+√f)·E(k²) − √f·K(k²)]/√(1+√f),
 *   k² = (1−√f)/(1+√f).
 */
import { imageChargeEv2NmPerV } from './constants.ts';
import { completeElliptic } from './elliptic.ts';

/** Scaled field f = (e/4πε₀ε_r)·F/φ²: 0 without field, 1 where the barrier's top sinks to the Fermi level. */
export function imageField(fieldVPerNm: number, heightEv: number, permittivity: number): number {
  return (imageChargeEv2NmPerV * fieldVPerNm) / (permittivity * heightEv * heightEv);
}

/** v(f) for 0 ≤ f ≤ 1: 1 at 0, 0 at 1; NaN outside. */
export function imageV(f: number): number {
  if (f === 0) return 1;
  const y = Math.sqrt(f);
  const { first, second } = completeElliptic((1 - y) / (1 + y));
  return Math.sqrt(1 + y) * (second - y * first);
}

/** t(f) for 0 ≤ f ≤ 1: 1 at 0, π/(2√2) at 1; NaN outside. */
export function imageT(f: number): number {
  if (f === 0) return 1;
  const y = Math.sqrt(f);
  const { first, second } = completeElliptic((1 - y) / (1 + y));
  return ((1 + y) * second - y * first) / Math.sqrt(1 + y);
}

/** s(f) = v − f dv/df = (v + 3t)/4 for 0 ≤ f ≤ 1: what v becomes in the slope of a Fowler–Nordheim plot (Forbes & Deane 2007); NaN outside. */
export function imageS(f: number): number {
  return (imageV(f) + 3 * imageT(f)) / 4;
}

/** f dt/df for 0 ≤ f < 1, = [t − v/(1−f)]/4, from f(1−f) v″ = (3/16) v (Forbes & Deane 2007); 0 at 0, NaN outside. */
export function imageTSlope(f: number): number {
  return f === 0 ? 0 : f < 1 ? (imageT(f) - imageV(f) / (1 - f)) / 4 : Number.NaN;
}
