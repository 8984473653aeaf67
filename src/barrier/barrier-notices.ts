/** What is worth saying about the reference and the ladder. */
import { notice } from '../problems/problem.ts';
import type { Notice } from '../problems/problem.ts';
import { breakdownVPerNm } from './model/barrier-warnings.ts';
import { fieldVPerNm } from './model/field.ts';
import type { DeviceDensity } from './barrier.ts';
import type { ReferenceChoice } from './reference.ts';
import type { Terraces } from './terraces.ts';

const naPerUm2 = (aPerM2: number): number => aPerM2 * 1e-3;

/** Remarks about the choice of the reference terrace. `layers` is its whole count where anything anchors it. */
export function referenceNotices(choice: ReferenceChoice, origin: number, device: DeviceDensity | undefined, layers: number | undefined): Notice[] {
  const found: Notice[] = [];
  if (choice.runnerUp) {
    found.push(notice('reference-runner-up', { layers: choice.runnerUp.step - origin, areaUm2: choice.runnerUp.areaM2 * 1e12, ownUm2: choice.chosen.areaM2 * 1e12 }));
  }
  if (device && !choice.inRange && !device.proposed) {
    found.push(notice(choice.reaches ? 'reference-may-glow' : 'reference-not-known-to-glow', {
      naPerUm2: naPerUm2(device.median), lowNaPerUm2: naPerUm2(device.low95), highNaPerUm2: naPerUm2(device.high95), biasV: device.biasV,
    }));
  }
  const passed = choice.passedOver[0];
  if (passed) found.push(notice('reference-passed-over', { layers: passed.step - origin, areaUm2: passed.areaM2 * 1e12 }));
  const { outranking } = choice;
  if (outranking && layers !== undefined) {
    found.push(notice('reference-layers-disputed', { referenceLayers: layers, layers: outranking.step - origin, areaUm2: outranking.areaM2 * 1e12 }));
  }
  return found;
}

/** What the scan itself may have done to the barrier: a field under the probe above the published breakdown is said. */
export function probeFieldNotices(scanBiasV: number | undefined, thicknessM: number | undefined): Notice[] {
  if (scanBiasV === undefined || thicknessM === undefined) return [];
  const field = fieldVPerNm(scanBiasV, thicknessM);
  return field > breakdownVPerNm ? [notice('probe-field', { fieldVPerNm: field, biasV: Math.abs(scanBiasV) })] : [];
}

/** A device bias that would put more than the published breakdown field on the reference terrace is warned of; from the recipe's limit on there is a milder warning. */
export function deviceFieldNotices(acrossV: number | undefined, thicknessM: number | undefined, limitVPerNm: number): Notice[] {
  if (acrossV === undefined || thicknessM === undefined) return [];
  const field = fieldVPerNm(acrossV, thicknessM);
  if (field > breakdownVPerNm) return [notice('device-field', { fieldVPerNm: field, acrossV })];
  return field > limitVPerNm ? [notice('device-field-limit', { fieldVPerNm: field, limitVPerNm, acrossV })] : [];
}

/** Remarks about the step of the ladder: a ladder that contradicts the model is said, not hidden, and so is a step that was not measured. */
export function ladderNotices(terraces: Terraces, modelStepDecades: number | undefined): Notice[] {
  const { stepDecades, from, layersPerGap } = terraces;
  if (from !== 'map') return [notice('ladder-one-terrace', { from, stepDecades })];
  if (modelStepDecades === undefined) return [];
  if (layersPerGap > 1) return [notice('ladder-skips', { layersPerGap, measured: stepDecades * layersPerGap, model: modelStepDecades })];
  const ratio = stepDecades / modelStepDecades;
  if (ratio > 0.75 && ratio < 1.33) return [];
  return [notice('ladder-contradicts', { measured: stepDecades, model: modelStepDecades })];
}
