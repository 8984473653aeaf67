/**
 * Simmons' formula for direct tunnelling through a rectangular barrier, 0 < |V| < φ
 * (J. G. Simmons, J. Appl. Phys. 34, 1793, 1963):
 *   J = (e²/2πh s²)·{(φ−V/2)·exp(−a√(φ−V/2)) − (φ+V/2)·exp(−a√(φ+V/2))},  a = 2√(2mₑm e)/ħ·s.
 * It replaces the barrier by its mean height and carries no 1/m.
 */
import { simmonsA, waveNumberPerRootEv } from './constants.ts';
import { isBarrier } from './tunnel-model.ts';
import type { BarrierShape, TunnelModel } from './tunnel-model.ts';

export const simmonsModel: TunnelModel = {
  name: 'simmons',
  density: (barrier, biasV) => Math.exp(lnSimmonsDensity(barrier, biasV)),
  lnDensity: lnSimmonsDensity,
  // The formula assumes an opaque barrier; its density peaks at a√φ between 2.6 (V → 0) and 3.5 (V → φ)
  // and turns negative below that. From a√φ = 4 on it falls with thickness at every bias below φ.
  thinnestM: (material, biasV) =>
    Math.abs(biasV) < material.heightEv ? (4e-9 / (2 * waveNumberPerRootEv)) / Math.sqrt(material.massRatio * material.heightEv) : Number.NaN,
};

/**
 * Natural logarithm of the density in A/m². NaN for |V| ≥ φ, where the formula does not hold, and
 * for barriers so thin (a√φ below about 2) that it turns negative.
 */
export function lnSimmonsDensity(barrier: BarrierShape, biasV: number): number {
  const bias = Math.abs(biasV);
  if (!isBarrier(barrier) || !(bias < barrier.heightEv)) return Number.NaN;
  if (bias === 0) return Number.NEGATIVE_INFINITY;
  const decay = 2 * waveNumberPerRootEv * Math.sqrt(barrier.massRatio) * barrier.thicknessM * 1e9;
  const forward = barrier.heightEv - bias / 2;
  const backward = barrier.heightEv + bias / 2;
  const rootForward = Math.sqrt(forward);
  const gap = (decay * bias) / (Math.sqrt(backward) + rootForward);
  // forward − backward·e^−gap, without the loss of digits at small bias.
  const braces = -backward * Math.expm1(-gap) - bias;
  return Math.log((simmonsA / barrier.thicknessM ** 2) * braces) - decay * rootForward;
}
