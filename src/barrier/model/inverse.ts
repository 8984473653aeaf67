/** Backwards through a model: thickness from density, bias from density, layers from thickness. */
import { findRoot } from '../../stats/root.ts';
import type { BarrierMaterial, BarrierShape, TunnelModel } from './tunnel-model.ts';

/** Thicknesses within which an inversion looks, metres. */
export interface ThicknessRange {
  readonly minM: number;
  readonly maxM: number;
}

/** Inversion looks between 0.2 nm (less than one layer of hBN) and 20 nm (no measurable current). */
export const defaultThicknessRange: ThicknessRange = { minM: 0.2e-9, maxM: 20e-9 };

/** The part of `range` in which the model's density is defined and falls with thickness; undefined where there is none. */
export function usableRange(model: TunnelModel, material: BarrierMaterial, biasV: number, range: ThicknessRange = defaultThicknessRange): ThicknessRange | undefined {
  // Right at the model's bound the density may be the limit of a 0/0; stay a hair inside.
  const minM = Math.max(range.minM, model.thinnestM(material, biasV) * (1 + 1e-9));
  return minM < range.maxM && biasV !== 0 ? { minM, maxM: range.maxM } : undefined;
}

/**
 * Thickness in metres at which the model carries `densityAPerM2` at `biasV`. Density falls
 * strictly with thickness, so the answer is unique; Brent's method on ln density, to 1e-12 of
 * itself. NaN where the density is not positive, the model does not hold at this bias, or the
 * answer lies outside `range`.
 */
export function thicknessFromDensity(
  model: TunnelModel,
  material: BarrierMaterial,
  biasV: number,
  densityAPerM2: number,
  range: ThicknessRange = defaultThicknessRange,
): number {
  return thicknessFromLnDensity(model, material, biasV, Math.log(densityAPerM2), range);
}

/** `thicknessFromDensity` for a density given as its natural logarithm (A/m²), also where the density itself would underflow. */
export function thicknessFromLnDensity(
  model: TunnelModel,
  material: BarrierMaterial,
  biasV: number,
  lnDensity: number,
  range: ThicknessRange = defaultThicknessRange,
): number {
  if (!Number.isFinite(lnDensity)) return Number.NaN;
  const usable = usableRange(model, material, biasV, range);
  if (usable === undefined) return Number.NaN;
  const { heightEv, massRatio } = material;
  const excess = (thicknessNm: number): number => model.lnDensity({ thicknessM: thicknessNm * 1e-9, heightEv, massRatio }, biasV) - lnDensity;
  return findRoot(excess, usable.minM * 1e9, usable.maxM * 1e9, 1e-12) * 1e-9;
}

/**
 * Bias in volts (positive) at which the barrier carries `densityAPerM2`, looked for between 1 mV
 * and `maxBiasV`; density grows with bias in every model. NaN outside.
 */
export function biasFromDensity(model: TunnelModel, barrier: BarrierShape, densityAPerM2: number, maxBiasV = 50): number {
  const target = Math.log(densityAPerM2);
  if (!Number.isFinite(target)) return Number.NaN;
  let high = maxBiasV;
  // Simmons' formula ends at φ, the image charge where the barrier vanishes: bring the upper end inside.
  if (Number.isNaN(model.lnDensity(barrier, high))) high = lastDefined(model, barrier, 1e-3, maxBiasV);
  return findRoot((biasV) => model.lnDensity(barrier, biasV) - target, 1e-3, high, 1e-12);
}

/** Largest bias at which the model still has a density, by bisection. */
function lastDefined(model: TunnelModel, barrier: BarrierShape, low: number, high: number): number {
  let inside = low;
  let outside = high;
  for (let step = 0; step < 60; step++) {
    const middle = (inside + outside) / 2;
    if (Number.isNaN(model.lnDensity(barrier, middle))) outside = middle;
    else inside = middle;
  }
  return inside;
}

/** Nearest whole number of layers; NaN for NaN. */
export function layersFromThickness(thicknessM: number, layerM: number): number {
  return Math.round(thicknessM / layerM);
}

/**
 * Decades of density lost when one layer of `layerM` is added to `barrier` at `biasV`. NaN where
 * the model does not hold.
 */
export function decadesPerLayer(model: TunnelModel, barrier: BarrierShape, biasV: number, layerM: number): number {
  const { thicknessM, heightEv, massRatio } = barrier;
  return (model.lnDensity(barrier, biasV) - model.lnDensity({ thicknessM: thicknessM + layerM, heightEv, massRatio }, biasV)) / Math.LN10;
}
