/** Field and regime of a barrier under bias, and the WKB exponent of its trapezoid. */
import { waveNumberPerRootEv } from './constants.ts';
import type { BarrierShape } from './tunnel-model.ts';

export type Regime = 'direct' | 'fowler-nordheim';

/**
 * `direct` while the whole barrier stays above the emitter's Fermi level (|V| < φ), else
 * `fowler-nordheim` (the far part of the barrier is below it and the barrier is a triangle).
 */
export function regime(biasV: number, heightEv: number): Regime {
  return Math.abs(biasV) < heightEv ? 'direct' : 'fowler-nordheim';
}

/** Mean field |V|/d in V/nm. */
export function fieldVPerNm(biasV: number, thicknessM: number): number {
  return Math.abs(biasV) / (thicknessM * 1e9);
}

/**
 * WKB transmission exponent G of the trapezoidal barrier at an energy E ≤ 0 from the emitter's
 * Fermi level, T = exp(−G): G = 2·(2/3)·(√(2mₑm e)/ħ)·(d/V)·[(φ−E)^1.5 − (φ−V−E)₊^1.5].
 * The difference of powers is rewritten so that V → 0 loses no digits. At V = 0 the rectangle.
 */
export function wkbExponent(barrier: BarrierShape, biasV: number, energyEv = 0): number {
  const decay = 2 * waveNumberPerRootEv * Math.sqrt(barrier.massRatio) * barrier.thicknessM * 1e9;
  return trapezoidExponent(decay, barrier.heightEv, Math.abs(biasV), -energyEv);
}

/**
 * The same exponent from `decay` = 2·√(2mₑm e)/ħ·d in eV^−1/2 and the depth ε = −E ≥ 0 below the
 * Fermi level. With u² = φ+ε and w² = φ+ε−V: (u³−w³)/V = (u²+uw+w²)/(u+w).
 */
export function trapezoidExponent(decay: number, heightEv: number, bias: number, depthEv: number): number {
  const top = heightEv + depthEv;
  const u = Math.sqrt(top);
  const far = top - bias;
  if (far <= 0) return ((2 / 3) * decay * top * u) / bias;
  const w = Math.sqrt(far);
  return ((2 / 3) * decay * (top + u * w + far)) / (u + w);
}
