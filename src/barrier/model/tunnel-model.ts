/** What every tunnelling model offers: density of a flat barrier between equal electrodes at a bias. */
import type { BarrierModelName } from '../recipe.ts';

/** What the barrier is made of. */
export interface BarrierMaterial {
  /** From the emitting electrode's Fermi level to the band edge, eV, above 0. */
  readonly heightEv: number;
  /** Effective mass in the barrier over the electron mass, above 0. */
  readonly massRatio: number;
}

/** A barrier of one thickness. */
export interface BarrierShape extends BarrierMaterial {
  /** Metres, above 0. */
  readonly thicknessM: number;
}

/** How ln density changes; multiply by the density for the derivatives of the density itself. */
export interface DensitySlopes {
  /** d ln J / d|V| in 1/V; `density · lnPerV` is the differential conductance per area, A/(V m²). */
  readonly lnPerV: number;
  /** d ln J / dd in 1/m, below 0 wherever thickness can be inverted. */
  readonly lnPerM: number;
}

/**
 * A model of the current through one barrier: forwards here, backwards through the functions of `inverse.ts`, which take any model. The sign of the bias is ignored (the barrier is
 * symmetric); densities are magnitudes.
 */
export interface TunnelModel {
  readonly name: BarrierModelName;
  /** Density in A/m²; 0 at zero bias; NaN where the model does not hold or an argument is NaN or not positive. */
  density(barrier: BarrierShape, biasV: number): number;
  /** Natural logarithm of the density in A/m², finite also where the density underflows; −Infinity at zero bias. */
  lnDensity(barrier: BarrierShape, biasV: number): number;
  /** Derivatives of ln density in closed form (for WKB by the same quadrature); NaN where `lnDensity` is, and at zero bias. */
  slopes(barrier: BarrierShape, biasV: number): DensitySlopes;
  /**
   * Thickness in metres below which the model's density is not defined or no longer falls with
   * thickness; inversion starts here. 0 where no such bound exists, NaN where the model does not
   * hold at this bias at all.
   */
  thinnestM(material: BarrierMaterial, biasV: number): number;
}

/** True when all three numbers of a barrier are above 0 (false for NaN). */
export function isBarrier(barrier: BarrierShape): boolean {
  return barrier.thicknessM > 0 && barrier.heightEv > 0 && barrier.massRatio > 0;
}

/** Where a model gives no density it gives no slope. */
export const noSlopes: DensitySlopes = { lnPerV: Number.NaN, lnPerM: Number.NaN };
