/** The link between a current under the probe, a thickness, and a density in the device. */
import { chooseModel } from './model/choose-model.ts';
import { densityInterval } from './model/density-interval.ts';
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

export interface Anchor {
  readonly model: TunnelModel;
  readonly material: BarrierMaterial;
  readonly scanBiasV: number;
  readonly layerM: number;
  /** Decades per layer at the scan's bias, near the middle of what such barriers are (4 nm), by the model. */
  readonly modelStepDecades: number;
  /** Thickness and layers of a terrace that carries `currentA` under the probe (or the known count); undefined outside the model. */
  fix(currentA: number): Anchored | undefined;
  /** Density at a device bias of a terrace that carries `currentA` under the probe, with its 95 % interval, A/m²; undefined outside the model. */
  density(currentA: number, deviceBiasV: number): { median: number; low95: number; high95: number } | undefined;
  /** Bias with the scan's sign at which a thickness carries a density; NaN outside the model. */
  proposeBias(thicknessM: number, densityAPerM2: number): number;
  /** Volts that fall across the barrier at a device bias, as a magnitude. */
  acrossV(deviceBiasV: number): number;
}

const middleThicknessM = 4e-9;

/**
 * Builds the anchor from the recipe; undefined without a scan bias (or without amperes, which the caller knows), or where the
 * chosen model does not hold at that bias.
 */
export function anchorOf(section: BarrierSection, device: DeviceQuestion, scanBiasV: number | undefined): Anchor | undefined {
  if (scanBiasV === undefined || scanBiasV === 0) return undefined;
  const model = chooseModel(section.model);
  const material = { heightEv: section.heightEv, massRatio: section.massRatio };
  const layerM = section.layerNm * 1e-9;
  const scanV = Math.abs(scanBiasV);
  const areaM2 = section.tipAreaNm2 * 1e-18;
  const modelStepDecades = decadesPerLayer(model, { ...material, thicknessM: middleThicknessM }, scanV, layerM);
  if (!Number.isFinite(modelStepDecades)) return undefined;
  const acrossV = (biasV: number): number => Math.max(0, Math.abs(biasV) - device.offsetV);
  const known = section.referenceLayers;
  return {
    model,
    material,
    scanBiasV,
    layerM,
    modelStepDecades,
    acrossV,
    fix(currentA) {
      const thicknessM = known === undefined ? thicknessFromDensity(model, material, scanV, currentA / areaM2) : known * layerM;
      // Layers are whole: the thickness handed on is that of the nearest count, the rest belongs to the contact's area.
      const layers = Math.max(1, Math.round(thicknessM / layerM));
      return Number.isFinite(thicknessM) ? { thicknessM: layers * layerM, layers } : undefined;
    },
    density(currentA, deviceBiasV) {
      const found = densityInterval({
        model, material, deviceBiasV: acrossV(deviceBiasV), probe: { currentA, biasV: scanV, areaM2 },
        ...(known === undefined ? {} : { thicknessM: known * layerM }),
      });
      if (!Number.isFinite(found.medianAPerM2)) return undefined;
      return { median: found.medianAPerM2, low95: found.low95APerM2, high95: found.high95APerM2 };
    },
    proposeBias(thicknessM, densityAPerM2) {
      return Math.sign(scanBiasV) * (biasFromDensity(model, { ...material, thicknessM }, densityAPerM2) + device.offsetV);
    },
  };
}
