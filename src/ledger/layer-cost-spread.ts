/** How far it is known what a layer costs in the device. */
import { anchorOf } from '../barrier/anchor.ts';
import type { Barrier } from '../barrier/barrier.ts';
import { defaultSpread } from '../barrier/model/density-interval.ts';
import { decadesPerLayer, thicknessFromDensity } from '../barrier/model/inverse.ts';
import type { BarrierSection } from '../barrier/recipe.ts';

export interface LayerCostQuestion {
  readonly barrier: Barrier;
  readonly section: BarrierSection;
  /** Part of the device's bias that does not fall across the barrier, volts. */
  readonly offsetV: number;
  /** Bias of the scan, volts; absent when nobody stated it. */
  readonly scanBiasV: number | undefined;
}

/**
 * Half-width of the 95 % interval of the decades that a layer costs at the device's bias, as a share of them. With it all log densities over the
 * reference's grow or shrink together. Parts, in quadrature:
 *
 * - the ladder: 1.96 standard errors of the map's own step (none where every pixel speaks for itself);
 * - where the device's bias is not the scan's: the model's step there with barrier height, mass and contact area (which set the
 *   reference's thickness unless another anchor does) at the ends of their 95 % ranges (`defaultSpread`), one at a time. With
 *   `withinTerrace: barrier` it is the step there over the step at the scan's bias.
 *
 * An end where the model does not hold is left out.
 */
export function layerCostSpread({ barrier, section, offsetV, scanBiasV }: LayerCostQuestion): number {
  const { ladder, device, reference } = barrier;
  const byPixel = section.withinTerrace === 'barrier' || ladder.from === 'assumed';
  const fromLadder = byPixel || !(ladder.stepDecades > 0) ? 0 : (1.96 * ladder.stepSeDecades) / ladder.stepDecades;
  if (!device || scanBiasV === undefined) return fromLadder;

  const taken = barrier.anchors.find((anchor) => anchor.taken)?.kind;
  const byArea = section.referenceLayers === undefined && (taken === 'area' || reference.thicknessM === undefined);
  const cost = (changed: Partial<BarrierSection>): number => {
    const anchor = anchorOf({ ...section, ...changed }, { offsetV, targetAPerM2: 1 }, scanBiasV);
    if (!anchor) return Number.NaN;
    const { model, material, layerM } = anchor;
    const scanV = Math.abs(scanBiasV);
    const deviceV = anchor.acrossV(device.biasV);
    if (Math.abs(deviceV - scanV) < 1e-9) return 1;
    const areaM2 = (changed.tipAreaNm2 ?? section.tipAreaNm2) * 1e-18;
    const thicknessM = byArea ? thicknessFromDensity(model, material, scanV, reference.median / areaM2) : section.referenceLayers === undefined ? reference.thicknessM! : section.referenceLayers * layerM;
    const at = (biasV: number): number => decadesPerLayer(model, { ...material, thicknessM }, biasV, layerM);
    return byPixel ? at(deviceV) / at(scanV) : at(deviceV);
  };
  const middle = cost({});
  const massFactor = Math.exp(1.96 * defaultSpread.massSdRatio);
  const heightEv = 1.96 * defaultSpread.heightSdEv;
  const ends: readonly (readonly [Partial<BarrierSection>, Partial<BarrierSection>])[] = [
    [{ heightEv: section.heightEv - heightEv }, { heightEv: section.heightEv + heightEv }],
    [{ massRatio: section.massRatio / massFactor }, { massRatio: section.massRatio * massFactor }],
    [{ tipAreaNm2: section.tipAreaNm2 / defaultSpread.areaFactor95 }, { tipAreaNm2: section.tipAreaNm2 * defaultSpread.areaFactor95 }],
  ];
  const parts = ends.map((pair) => Math.max(0, ...pair.map((end) => Math.abs(cost(end) / middle - 1)).filter(Number.isFinite)));
  return Math.hypot(fromLadder, ...parts);
}
