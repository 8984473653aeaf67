/**
 * Fowler–Nordheim's closed form for a triangular barrier, meant for |V| > φ:
 *   J = (A/(φ m)) F² exp(−B √m φ^1.5 / F),  F = V/d
 * with the 1/m prefactor of Lenzlinger & Snow, J. Appl. Phys. 40, 278 (1969), which many papers
 * leave out. Optionally with the image charge of Murphy & Good: v(f) in the exponent and t(f)⁻²
 * before it (Forbes & Deane, Proc. R. Soc. A 463, 2907, 2007). Below φ the formula is still
 * evaluated, but takes the barrier for a longer triangle than it is and lies too low: see
 * `barrierWarnings`.
 */
import type { BarrierPrefactor } from '../recipe.ts';
import { fowlerNordheimA, fowlerNordheimB, imageChargeEv2NmPerV } from './constants.ts';
import { imageField, imageS, imageT, imageTSlope, imageV } from './image-charge.ts';
import { isBarrier, noSlopes } from './tunnel-model.ts';
import type { BarrierShape, DensitySlopes, TunnelModel } from './tunnel-model.ts';

export interface FowlerNordheimOptions {
  /** `inverse-mass` (default) divides the prefactor by the mass ratio, `none` leaves it out. */
  readonly massPrefactor?: BarrierPrefactor;
  /** Relative permittivity seen by the image charge, at least 1; absent: no image charge. */
  readonly imagePermittivity?: number;
}

/** The model with its options fixed. With image charge, NaN where the field pulls the barrier below the Fermi level (f > 1). */
export function fowlerNordheimModel(options: FowlerNordheimOptions = {}): TunnelModel {
  const { massPrefactor = 'inverse-mass', imagePermittivity } = options;

  function lnDensity(barrier: BarrierShape, biasV: number): number {
    const bias = Math.abs(biasV);
    if (!isBarrier(barrier) || !(bias < Number.POSITIVE_INFINITY)) return Number.NaN;
    if (bias === 0) return Number.NEGATIVE_INFINITY;
    const { heightEv, massRatio } = barrier;
    const field = bias / (barrier.thicknessM * 1e9);
    const prefactor = (fowlerNordheimA * 1e18) / (massPrefactor === 'inverse-mass' ? heightEv * massRatio : heightEv);
    const exponent = (fowlerNordheimB * Math.sqrt(massRatio) * heightEv * Math.sqrt(heightEv)) / field;
    const bare = Math.log(prefactor) + 2 * Math.log(field);
    if (imagePermittivity === undefined) return bare - exponent;
    const f = imageField(field, heightEv, imagePermittivity);
    return bare - 2 * Math.log(imageT(f)) - imageV(f) * exponent;
  }

  /** ln J = const + 2 ln F − 2 ln t(f) − v(f)·b/F depends on bias and thickness through F = V/d alone: d ln J/d ln F serves both. */
  function slopes(barrier: BarrierShape, biasV: number): DensitySlopes {
    const bias = Math.abs(biasV);
    if (!isBarrier(barrier) || !(bias > 0 && bias < Number.POSITIVE_INFINITY)) return noSlopes;
    const { heightEv, massRatio, thicknessM } = barrier;
    const field = bias / (thicknessM * 1e9);
    const exponent = (fowlerNordheimB * Math.sqrt(massRatio) * heightEv * Math.sqrt(heightEv)) / field;
    let lnPerLnField = 2 + exponent;
    if (imagePermittivity !== undefined) {
      const f = imageField(field, heightEv, imagePermittivity);
      lnPerLnField = 2 - (2 * imageTSlope(f)) / imageT(f) + imageS(f) * exponent;
    }
    return { lnPerV: lnPerLnField / bias, lnPerM: -lnPerLnField / thicknessM };
  }

  return {
    name: 'fowler-nordheim',
    lnDensity,
    slopes,
    density: (barrier, biasV) => Math.exp(lnDensity(barrier, biasV)),
    thinnestM: (material, biasV) =>
      imagePermittivity === undefined ? 0 : (1e-9 * imageChargeEv2NmPerV * Math.abs(biasV)) / (imagePermittivity * material.heightEv ** 2),
  };
}
