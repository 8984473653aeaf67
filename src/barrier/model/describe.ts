/** One barrier at one bias in the words of `evenglow barrier --json`, forwards and backwards. */
import { Problem } from '../../problems/problem.ts';
import type { Notice } from '../../problems/problem.ts';
import type { BarrierModelName, BarrierPrefactor } from '../recipe.ts';
import { barrierWarnings } from './barrier-warnings.ts';
import { chooseModel } from './choose-model.ts';
import { defaultSpread } from './density-interval.ts';
import { regime } from './field.ts';
import type { Regime } from './field.ts';
import { layersFromThickness, thicknessFromDensity, usableRange } from './inverse.ts';
import { temperatureFactor } from './temperature-factor.ts';
import type { BarrierMaterial, TunnelModel } from './tunnel-model.ts';

interface Asked {
  readonly biasV: number;
  readonly heightEv?: number;
  readonly massRatio?: number;
  readonly model?: BarrierModelName;
  readonly imagePermittivity?: number;
  /** For the model fowler-nordheim. */
  readonly prefactor?: BarrierPrefactor;
  /** Asks for the factor x/sin x of this temperature. */
  readonly temperatureK?: number;
  /** Spacing of the layers, nm. */
  readonly layerNm?: number;
}

export interface ForwardQuestion extends Asked {
  readonly thicknessNm: number;
}

export interface InverseQuestion extends Asked {
  readonly currentA: number;
  readonly tipAreaNm2: number;
}

/** Densities are absent where the model gives none; the warnings then say why. */
export interface BarrierDescription {
  readonly model: BarrierModelName;
  readonly thicknessNm: number;
  readonly layers: number;
  readonly biasV: number;
  readonly heightEv: number;
  readonly massRatio: number;
  readonly imagePermittivity?: number;
  /** Given where it was asked for. */
  readonly prefactor?: BarrierPrefactor;
  readonly temperatureK?: number;
  /** Absent in the direct regime and where thermionic emission takes over. */
  readonly temperatureFactor?: number;
  readonly fieldVPerNm: number;
  readonly regime: Regime;
  readonly densityAPerCm2?: number;
  readonly densityNaPerUm2?: number;
  readonly warnings: readonly Notice[];
}

/** The inverse adds what was measured and the thickness range that the contact area's decade leaves. */
export interface InverseDescription extends BarrierDescription {
  readonly currentA: number;
  readonly tipAreaNm2: number;
  /** Thickness and layers with the area divided and multiplied by √10; absent where outside the model's range. */
  readonly thicknessLowNm?: number;
  readonly thicknessHighNm?: number;
  readonly layersLow?: number;
  readonly layersHigh?: number;
}

interface Setting {
  readonly name: BarrierModelName;
  readonly model: TunnelModel;
  readonly material: BarrierMaterial;
  readonly biasV: number;
  readonly layerNm: number;
  readonly asked: Asked;
}

/**
 * Density from thickness. Throws `Problem('barrier-argument')`, naming the command line's option,
 * for a value out of range or an image charge asked of a model without one.
 */
export function describeBarrier(question: ForwardQuestion): BarrierDescription {
  const setting = settingOf(question);
  between('--thickness-nm', question.thicknessNm, 0.05, 100, ' nm');
  return describe(setting, question.thicknessNm);
}

/**
 * Thickness and layers from a current through a contact area. Throws `Problem('barrier-argument')`
 * for values out of range or a current against the bias's sign, `Problem('barrier-no-thickness')`
 * when no thickness from 0.2 to 20 nm fits.
 */
export function describeFromCurrent(question: InverseQuestion): InverseDescription {
  const setting = settingOf(question);
  const { currentA, tipAreaNm2 } = question;
  between('--tip-area-nm2', tipAreaNm2, 0.01, 1e6, ' nm²');
  if (!Number.isFinite(currentA) || !(currentA * Math.sign(setting.biasV) > 0)) {
    throw new Problem('barrier-argument', { name: '--current-a', value: String(currentA), reason: 'must be a current in A, not 0, with the sign of the bias' });
  }
  const density = Math.abs(currentA) / (tipAreaNm2 * 1e-18);
  const solve = (densityAPerM2: number): number => thicknessFromDensity(setting.model, setting.material, setting.biasV, densityAPerM2) * 1e9;
  const thicknessNm = solve(density);
  if (Number.isNaN(thicknessNm)) throw noThickness(setting, density);
  const low = solve(density * defaultSpread.areaFactor95);
  const high = solve(density / defaultSpread.areaFactor95);
  return {
    ...describe(setting, thicknessNm),
    currentA,
    tipAreaNm2,
    ...(Number.isNaN(low) ? {} : { thicknessLowNm: low, layersLow: layersFromThickness(low, setting.layerNm) }),
    ...(Number.isNaN(high) ? {} : { thicknessHighNm: high, layersHigh: layersFromThickness(high, setting.layerNm) }),
  };
}

function describe(setting: Setting, thicknessNm: number): BarrierDescription {
  const { name, model, material, biasV, layerNm, asked: { imagePermittivity, prefactor, temperatureK } } = setting;
  const barrier = { ...material, thicknessM: thicknessNm * 1e-9 };
  const density = model.density(barrier, biasV);
  const warmed = temperatureK === undefined || regime(biasV, material.heightEv) === 'direct' ? Number.NaN
    : temperatureFactor(temperatureK, Math.abs(biasV) / thicknessNm, material.heightEv, material.massRatio);
  return {
    model: name,
    thicknessNm,
    layers: layersFromThickness(thicknessNm, layerNm),
    biasV,
    ...material,
    ...(imagePermittivity === undefined ? {} : { imagePermittivity }),
    ...(prefactor === undefined ? {} : { prefactor }),
    ...(temperatureK === undefined ? {} : { temperatureK }),
    ...(Number.isFinite(warmed) ? { temperatureFactor: warmed } : {}),
    fieldVPerNm: Math.abs(biasV) / thicknessNm,
    regime: regime(biasV, material.heightEv),
    // 1 A/m² = 1e-4 A/cm² = 1e-3 nA/µm².
    ...(Number.isFinite(density) ? { densityAPerCm2: density * 1e-4, densityNaPerUm2: density * 1e-3 } : {}),
    warnings: barrierWarnings(model, barrier, biasV),
  };
}

function settingOf(asked: Asked): Setting {
  const { biasV, heightEv = 2.5, massRatio = 0.5, model: name = 'wkb', imagePermittivity, prefactor, temperatureK = 0, layerNm = 0.333 } = asked;
  if (biasV === 0) throw new Problem('barrier-argument', { name: '--bias-v', value: '0', reason: 'must be a bias other than 0 V' });
  between('--bias-v', biasV, -100, 100, ' V');
  between('--height-ev', heightEv, 0.2, 10, ' eV');
  between('--mass', massRatio, 0.01, 5, '');
  between('--layer-nm', layerNm, 0.05, 2, ' nm');
  between('--temperature-k', temperatureK, 0, 5000, ' K');
  if (prefactor !== undefined && name !== 'fowler-nordheim') {
    throw new Problem('barrier-argument', { name: '--prefactor', value: prefactor, reason: `cannot be used with the model ${name}, which has no such choice; use --model fowler-nordheim or leave it out` });
  }
  const model = chooseModel(name, { ...(imagePermittivity === undefined ? {} : { imagePermittivity }), ...(prefactor === undefined ? {} : { massPrefactor: prefactor }) });
  return { name, model, material: { heightEv, massRatio }, biasV, layerNm, asked };
}

function between(name: string, value: number, min: number, max: number, unit: string): void {
  if (!(value >= min && value <= max)) {
    throw new Problem('barrier-argument', { name, value: String(value), reason: `must be a number from ${min} to ${max}${unit}` });
  }
}

function noThickness(setting: Setting, densityAPerM2: number): Problem {
  const { name, model, material, biasV } = setting;
  const range = usableRange(model, material, biasV);
  if (range === undefined) {
    return new Problem('barrier-argument', { name: '--bias-v', value: String(biasV), reason: `is outside what the model ${name} holds for at a height of ${material.heightEv} eV; use --model wkb` });
  }
  const perCm2 = (thicknessM: number): string => (model.density({ ...material, thicknessM }, biasV) * 1e-4).toPrecision(3);
  return new Problem('barrier-no-thickness', {
    density: (densityAPerM2 * 1e-4).toPrecision(3),
    biasV,
    fromNm: (range.minM * 1e9).toPrecision(3),
    toNm: (range.maxM * 1e9).toPrecision(3),
    lowest: perCm2(range.maxM),
    highest: perCm2(range.minM),
  });
}
