/** The pairs of barrier height and thickness that fit one map. */
import type { Barrier } from './barrier.ts';
import { equalCurrentCurve, equalSlopeCurve, massesOf, publishedRange } from './degeneracy.ts';
import type { Degeneracy } from './degeneracy.ts';
import { modelOfSection } from './model/choose-model.ts';
import { defaultSpread } from './model/density-interval.ts';
import type { BarrierSection } from './recipe.ts';
import { contactSdLn } from './thickness-anchors.ts';

/**
 * Curves at the published masses and the stated one: equal density at the scan's bias, with the stated contact area and its decade; and with maps at
 * several biases equal ratio of the reference's currents at the lowest and the highest, which come first. Undefined where the reference has no thickness.
 * Computed when it is asked for (some hundred solutions of the model), because no other number needs it.
 */
export function degeneracyOf({ reference, biases }: Barrier, section: BarrierSection, scanBiasV: number | undefined): Degeneracy | undefined {
  const { thicknessM, median } = reference;
  if (thicknessM === undefined || scanBiasV === undefined) return undefined;
  const model = modelOfSection(section);
  const material = { heightEv: section.heightEv, massRatio: section.massRatio };
  const masses = massesOf(material.massRatio);
  const areaSdLn = Math.log(defaultSpread.areaFactor95) / 1.959963984540054;
  const density = median / (section.tipAreaNm2 * 1e-18);
  const seen = biases?.terraces.find(({ step }) => step === 0);
  return {
    curves: [
      ...(biases && seen ? masses.map((mass) => equalSlopeCurve(model, material, mass, biases.lowV, biases.highV, seen.lnRatio, Math.hypot(contactSdLn, seen.lnRatioSe))) : []),
      ...masses.map((mass) => equalCurrentCurve(model, material, mass, Math.abs(scanBiasV), density, areaSdLn)),
    ],
    taken: { ...material, thicknessM },
    published: publishedRange,
  };
}
