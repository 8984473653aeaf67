/** Remarks on a barrier that is asked outside what is known about it. */
import { notice } from '../../problems/problem.ts';
import type { Notice } from '../../problems/problem.ts';
import { fieldVPerNm, regime } from './field.ts';
import type { BarrierShape, TunnelModel } from './tunnel-model.ts';

/** Breakdown of hBN along its stacking axis, V/nm, about (Hattori et al., ACS Nano 9, 916, 2015). */
export const breakdownVPerNm = 1.2;
const usualThicknessM = { from: 1e-9, to: 10e-9 };
/** A decimal such as 4.8 V over 4 nm must count as 1.2 V/nm in spite of rounding. */
const slack = 1e-9;

/**
 * Remarks for a barrier at a bias: field at or above breakdown, thickness outside 1–10 nm, and a
 * model used outside the biases, fields or thicknesses its formula is meant for. Empty when none applies.
 */
export function barrierWarnings(model: TunnelModel, barrier: BarrierShape, biasV: number): Notice[] {
  const notices: Notice[] = [];
  const { thicknessM, heightEv } = barrier;
  const field = fieldVPerNm(biasV, thicknessM);
  const field3 = field.toPrecision(3);
  const thicknessNm = (thicknessM * 1e9).toPrecision(3);
  if (field >= breakdownVPerNm * (1 - slack)) notices.push(notice('barrier-breakdown', { fieldVPerNm: field3 }));
  if (thicknessM < usualThicknessM.from * (1 - slack) || thicknessM > usualThicknessM.to * (1 + slack)) {
    notices.push(notice('barrier-thickness-range', { thicknessNm }));
  }
  const direct = regime(biasV, heightEv) === 'direct';
  if (model.name === 'simmons' && (!direct || biasV === 0)) notices.push(notice('barrier-simmons-range', { biasV, heightEv }));
  if (model.name === 'simmons' && direct) {
    const thinnestM = model.thinnestM(barrier, biasV);
    if (thicknessM < thinnestM) notices.push(notice('barrier-simmons-thin', { thicknessNm, thinnestNm: (thinnestM * 1e9).toPrecision(3) }));
  }
  if (model.name === 'fowler-nordheim' && direct) notices.push(notice('barrier-fowler-range', { biasV, heightEv }));
  if (model.name === 'fowler-nordheim' && thicknessM < model.thinnestM(barrier, biasV)) notices.push(notice('barrier-image-lost', { fieldVPerNm: field3 }));
  return notices;
}
