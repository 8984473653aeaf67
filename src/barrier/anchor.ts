/** The link between a current under the probe, a thickness, and a density in the device. */
import { modelOfSection } from './model/choose-model.ts';
import { defaultSpread, densityInterval } from './model/density-interval.ts';
import type { DensityInterval } from './model/density-interval.ts';
import { biasFromDensity, decadesPerLayer, thicknessFromDensity } from './model/inverse.ts';
import type { BarrierMaterial, TunnelModel } from './model/tunnel-model.ts';
import type { BarrierSection } from './recipe.ts';

export interface DeviceQuestion {
  /** Device bias in volts; absent: to be proposed. */
  readonly biasV?: number | undefined;
  /** Part of the bias that does not fall across the barrier, volts. */
  readonly offsetV: number;
  /** Density a proposed bias should give, A/m². */
  readonly targetAPerM2: number;
}

/** Thickness and whole layers of the reference terrace. */
export interface Anchored {
  readonly thicknessM: number;
  readonly layers: number;
}

/** A/m², with its 95 % interval. */
export interface DensityWithInterval {
  readonly median: number;
  readonly low95: number;
  readonly high95: number;
}

/** What else than the recipe is known of thickness and contact. */
export interface AnchorGiven {
  /** Contact area found from the map itself, m², with the factor that it lies within (95 %); in place of the recipe's. */
  readonly area?: { readonly areaM2: number; readonly factor95: number };
  /** Thickness by place on the ladder where each terrace was measured by itself, metres. */
  readonly terraceM?: (step: number) => number;
  /** Whole layers of the ladder's first (thinnest measured) terrace. */
  readonly firstLayers?: number;
  /** Standard deviation of the thickness of counted layers, metres; absent: exact. */
  readonly thicknessSdM?: number;
}

export interface Anchor {
  readonly model: TunnelModel;
  readonly material: BarrierMaterial;
  readonly scanBiasV: number;
  readonly layerM: number;
  /** Decades per layer at the scan's bias, near the middle of what such barriers are (4 nm), by the model. */
  readonly modelStepDecades: number;
  /** Layers of the reference terrace where the recipe states them. */
  readonly knownLayers?: number;
  /** Layers of the ladder's first terrace where something counted them. */
  readonly firstLayers?: number;
  /** Contact area that currents are read with, m². */
  readonly areaM2: number;
  /** Thickness and layers of a reference that carries `currentA` under the probe (or the known count); undefined outside the model. */
  fix(currentA: number): Anchored | undefined;
  /**
   * Density at a device bias of a terrace that carries `currentA` under the probe, with its 95 % interval, A/m². Its thickness is that of `layers`
   * (by default the known count), or follows from the current where no count is known. Undefined outside the model, at a device bias of 0, and
   * wherever the median is not above 0.
   */
  density(currentA: number, deviceBiasV: number, layers?: number): DensityWithInterval | undefined;
  /** Bias with the scan's sign at which `density(currentA, bias).median` is `densityAPerM2`, looked for up to 50 V across the barrier; NaN where there is none. */
  proposeBias(currentA: number, densityAPerM2: number): number;
  /** Volts that fall across the barrier at a device bias, as a magnitude. */
  acrossV(deviceBiasV: number): number;
}

const middleThicknessM = 4e-9;

/** Whole layers of a terrace `step` layers thicker than one of `layers`: at least one, and at most what a byte holds. */
export function layersAt(layers: number, step: number): number {
  return Math.max(1, Math.min(255, layers + step));
}

/**
 * Builds the anchor from the recipe; undefined without a scan bias (or without amperes, which the caller knows), or where the
 * chosen model does not hold at that bias. `given` is what the map itself or a device adds.
 */
export function anchorOf(section: BarrierSection, device: DeviceQuestion, scanBiasV: number | undefined, given: AnchorGiven = {}): Anchor | undefined {
  if (scanBiasV === undefined || scanBiasV === 0) return undefined;
  const model = modelOfSection(section);
  const material = { heightEv: section.heightEv, massRatio: section.massRatio };
  const layerM = section.layerNm * 1e-9;
  const scanV = Math.abs(scanBiasV);
  const areaM2 = given.area?.areaM2 ?? section.tipAreaNm2 * 1e-18;
  const spread = { ...defaultSpread, ...(given.area ? { areaFactor95: given.area.factor95 } : {}) };
  const modelStepDecades = decadesPerLayer(model, { ...material, thicknessM: middleThicknessM }, scanV, layerM);
  if (!Number.isFinite(modelStepDecades)) return undefined;
  const acrossV = (biasV: number): number => Math.max(0, Math.abs(biasV) - device.offsetV);
  const known = section.referenceLayers;
  const interval = (currentA: number, deviceV: number, layers: number | undefined): DensityInterval => densityInterval({
    model, material, deviceBiasV: deviceV, probe: { currentA, biasV: scanV, areaM2 }, spread,
    ...(layers === undefined ? {} : { thicknessM: layers * layerM, ...(given.thicknessSdM === undefined ? {} : { thicknessSdM: given.thicknessSdM }) }),
  });
  return {
    model,
    material,
    scanBiasV,
    layerM,
    modelStepDecades,
    acrossV,
    areaM2,
    ...(known === undefined ? {} : { knownLayers: known }),
    ...(given.firstLayers === undefined ? {} : { firstLayers: given.firstLayers }),
    fix(currentA) {
      const thicknessM = known === undefined ? thicknessFromDensity(model, material, scanV, currentA / areaM2) : known * layerM;
      // Layers are whole: the thickness handed on is that of the nearest count, the rest belongs to the contact's area.
      const layers = Math.max(1, Math.round(thicknessM / layerM));
      return Number.isFinite(thicknessM) ? { thicknessM: layers * layerM, layers } : undefined;
    },
    density(currentA, deviceBiasV, layers = known) {
      if (deviceBiasV === 0) return undefined;
      const { medianAPerM2: median, low95APerM2: low95, high95APerM2: high95 } = interval(currentA, acrossV(deviceBiasV), layers);
      return median > 0 && Number.isFinite(low95) && Number.isFinite(high95) ? { median, low95, high95 } : undefined;
    },
    proposeBias(currentA, densityAPerM2) {
      // Thickness and material behind the median do not depend on the device's bias: solved once, they give the median at any bias.
      const { thicknessM, material: fitted } = interval(currentA, scanV, known);
      const biasV = biasFromDensity(model, { ...fitted, thicknessM }, densityAPerM2) + device.offsetV;
      return biasV > 0 ? Math.sign(scanBiasV) * biasV : Number.NaN;
    },
  };
}
