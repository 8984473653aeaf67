/** The density the reference would carry in the device, or why there is none. */
import type { CurrentGround } from '../ground/ground.ts';
import { notice } from '../problems/problem.ts';
import type { Notice } from '../problems/problem.ts';
import type { Anchor, Anchored, DeviceQuestion } from './anchor.ts';
import type { DeviceDensity, NoDensity } from './barrier.ts';
import { fieldVPerNm } from './model/field.ts';
import { defaultThicknessRange } from './model/inverse.ts';
import type { BarrierSection } from './recipe.ts';

export interface DeviceAnswer {
  readonly device?: DeviceDensity;
  /** Given exactly where `device` is absent. */
  readonly noDensity?: NoDensity;
  readonly notices: readonly Notice[];
}

export interface DensityContext {
  readonly current: Pick<CurrentGround, 'unit' | 'biasV'>;
  readonly surface: 'barrier' | 'stack';
  readonly section: Pick<BarrierSection, 'model' | 'heightEv'>;
  readonly device: DeviceQuestion;
  readonly anchor: Anchor | undefined;
  /** Median current of the reference in the file's unit, and what it was anchored to; absent without a reference. */
  readonly reference: { readonly median: number; readonly anchored: Anchored | undefined } | undefined;
}

/**
 * Density on the reference at the device's bias, given or proposed, A/m². Never without a median above 0 and a finite interval; where it is absent a remark
 * says why and what to change.
 */
export function deviceDensity(context: DensityContext): DeviceAnswer {
  const { current, surface, section, device, anchor, reference } = context;
  const notices: Notice[] = [];
  if (current.unit !== 'A') notices.push(notice('current-relative', {}));
  else if (!current.biasV) notices.push(notice('bias-missing', {}));
  if (surface === 'stack') notices.push(notice('barrier-stack-surface', {}));
  const none = (noDensity: NoDensity, ...more: Notice[]): DeviceAnswer => ({ noDensity, notices: [...notices, ...more] });
  if (surface === 'stack') return none('stack-surface');
  if (current.unit !== 'A') return none('current-relative');
  if (!current.biasV) return none('bias-missing');
  if (!reference) return none('no-ground');

  const { model, heightEv } = section;
  const scanBiasV = current.biasV;
  if (!anchor) return none('model', notice('model-out-of-range', { model, heightEv, biasV: scanBiasV, scanBiasV, where: 'scan' }));
  if (!reference.anchored) {
    const { minM, maxM } = defaultThicknessRange;
    return none('model', notice('model-no-thickness', { model, biasV: scanBiasV, currentA: reference.median, fromNm: minM * 1e9, toNm: maxM * 1e9 }));
  }
  const { offsetV, targetAPerM2 } = device;
  const biasV = device.biasV ?? anchor.proposeBias(reference.median, targetAPerM2);
  if (Number.isNaN(biasV)) return none('device-bias', notice('device-bias-not-found', { model, targetNaPerUm2: targetAPerM2 * 1e-3, scanBiasV }));
  if (biasV === 0 || anchor.acrossV(biasV) === 0) return none('device-bias', notice('device-bias-no-density', { biasV, offsetV, scanBiasV }));
  const density = anchor.density(reference.median, biasV);
  if (!density) return none('model', notice('model-out-of-range', { model, heightEv, biasV, scanBiasV, where: 'device' }));
  const { thicknessM } = reference.anchored;
  const fields = { probeFieldVPerNm: fieldVPerNm(scanBiasV, thicknessM), fieldVPerNm: fieldVPerNm(anchor.acrossV(biasV), thicknessM) };
  return { device: { biasV, proposed: device.biasV === undefined, ...density, ...fields }, notices };
}
