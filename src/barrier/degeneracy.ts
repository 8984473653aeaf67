/** Thickness and barrier height cannot be told apart by a current alone: the pairs that fit a map equally well. */
import { thicknessFromLnDensity } from './model/inverse.ts';
import type { BarrierMaterial, TunnelModel } from './model/tunnel-model.ts';
import { thicknessFromRatio } from './two-bias.ts';

/**
 * What has been published of hBN: the hole barrier at graphene is about 2.5 eV by photoemission, fits of tunnel currents give
 * 1.5 to 3.1 eV with masses of 0.26 to 0.5.
 */
export const publishedRange = { heightEv: { from: 1.5, to: 3.1 }, massRatio: { from: 0.26, to: 0.5 } } as const;

/** Pairs of height and thickness at one mass. */
export interface EqualCurve {
  /** `slope`: the same ratio of currents at two biases; `current`: the same density at one bias. */
  readonly by: 'slope' | 'current';
  readonly massRatio: number;
  readonly points: readonly EqualPoint[];
}

/** Thickness with its 95 % range, which the contact's area (or its change between scans) leaves; metres. Ends where the model does not hold are absent. */
export interface EqualPoint {
  readonly heightEv: number;
  readonly thicknessM: number;
  readonly low95M?: number;
  readonly high95M?: number;
}

export interface Degeneracy {
  readonly curves: readonly EqualCurve[];
  /** The pair that layers and densities were computed with. */
  readonly taken: BarrierMaterial & { readonly thicknessM: number };
  readonly published: typeof publishedRange;
}

const points = 33;

/** Heights of the curves: the published range, widened to hold the stated one. */
function heights(stated: number): number[] {
  const from = Math.min(publishedRange.heightEv.from, stated);
  const to = Math.max(publishedRange.heightEv.to, stated);
  return Array.from({ length: points }, (_, k) => from + ((to - from) * k) / (points - 1));
}

/** Masses of the curves: both ends of the published range and the stated one. */
export function massesOf(stated: number): number[] {
  return [...new Set([publishedRange.massRatio.from, publishedRange.massRatio.to, stated])].sort((a, b) => a - b);
}

function curve(by: EqualCurve['by'], massRatio: number, stated: number, solve: (material: BarrierMaterial, moved: -1 | 0 | 1) => number): EqualCurve {
  const found = heights(stated).flatMap((heightEv): EqualPoint[] => {
    const [low, middle, high] = ([-1, 0, 1] as const).map((moved) => solve({ heightEv, massRatio }, moved)) as [number, number, number];
    if (Number.isNaN(middle)) return [];
    return [{ heightEv, thicknessM: middle, ...(Number.isNaN(low) ? {} : { low95M: low }), ...(Number.isNaN(high) ? {} : { high95M: high }) }];
  });
  return { by, massRatio, points: found };
}

/**
 * Thickness over barrier height at which the model carries the same density at one bias; `lnSd` is the standard deviation of ln density, the
 * contact area's. Heights at which no thickness of 0.2 to 20 nm fits, or the model does not hold, have no point.
 */
export function equalCurrentCurve(model: TunnelModel, stated: BarrierMaterial, massRatio: number, biasV: number, densityAPerM2: number, lnSd: number): EqualCurve {
  // More density means a thinner barrier.
  return curve('current', massRatio, stated.heightEv, (material, moved) => thicknessFromLnDensity(model, material, biasV, Math.log(densityAPerM2) - moved * 1.959963984540054 * lnSd));
}

/** The same for the ratio of currents at two biases; above the barrier's height that is one value of √m·φ^1.5·d. */
export function equalSlopeCurve(model: TunnelModel, stated: BarrierMaterial, massRatio: number, firstV: number, secondV: number, lnRatio: number, lnSd: number): EqualCurve {
  const sign = Math.sign(Math.abs(secondV) - Math.abs(firstV));
  return curve('slope', massRatio, stated.heightEv, (material, moved) => thicknessFromRatio(model, material, firstV, secondV, lnRatio + sign * moved * 1.959963984540054 * lnSd));
}
