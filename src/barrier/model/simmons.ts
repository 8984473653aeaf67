/**
 * Simmons' formula for direct tunnelling through a rectangular barrier, 0 < |V| < φ
 * (J. G. Simmons, J. Appl. Phys. 34, 1793, 1963):
 *   J = (e²/2πh s²)·{(φ−V/2)·exp(−a√(φ−V/2)) − (φ+V/2)·exp(−a√(φ+V/2))},  a = 2√(2mₑm e)/ħ·s.
 * It replaces the barrier by its mean height and carries no 1/m.
 */
import { simmonsA, waveNumberPerRootEv } from './constants.ts';
import { isBarrier, noSlopes } from './tunnel-model.ts';
import type { BarrierShape, DensitySlopes, TunnelModel } from './tunnel-model.ts';

export const simmonsModel: TunnelModel = {
  name: 'simmons',
  density: (barrier, biasV) => Math.exp(lnSimmonsDensity(barrier, biasV)),
  lnDensity: lnSimmonsDensity,
  slopes: simmonsSlopes,
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
  const { decay, rootForward, braces } = termsOf(barrier, bias);
  return Math.log((simmonsA / barrier.thicknessM ** 2) * braces) - decay * rootForward;
}

/** Parts of the formula; `braces` is {…} times exp(a√(φ−V/2)), without the loss of digits at small bias. */
function termsOf(barrier: BarrierShape, bias: number) {
  const decay = 2 * waveNumberPerRootEv * Math.sqrt(barrier.massRatio) * barrier.thicknessM * 1e9;
  const forward = barrier.heightEv - bias / 2;
  const backward = barrier.heightEv + bias / 2;
  const rootForward = Math.sqrt(forward);
  const rootBackward = Math.sqrt(backward);
  const gap = (decay * bias) / (rootBackward + rootForward);
  return { decay, forward, backward, rootForward, rootBackward, gap, braces: -backward * Math.expm1(-gap) - bias };
}

/** Derivatives of the formula term by term; NaN where it gives no density. */
function simmonsSlopes(barrier: BarrierShape, biasV: number): DensitySlopes {
  const bias = Math.abs(biasV);
  if (!isBarrier(barrier) || !(bias > 0 && bias < barrier.heightEv)) return noSlopes;
  const { decay, forward, backward, rootForward, rootBackward, gap, braces } = termsOf(barrier, bias);
  if (!(braces > 0)) return noSlopes;
  const left = Math.exp(-gap);
  const byBias = (decay * rootForward) / 4 - 0.5 + left * ((decay * rootBackward) / 4 - 0.5);
  // (φ+V/2)^1.5·e^−gap − (φ−V/2)^1.5, again without the difference of like numbers.
  const byDecay = backward * rootBackward * Math.expm1(-gap) + (bias * (backward + rootBackward * rootForward + forward)) / (rootBackward + rootForward);
  return { lnPerV: byBias / braces, lnPerM: (-2 + (decay * byDecay) / braces) / barrier.thicknessM };
}
