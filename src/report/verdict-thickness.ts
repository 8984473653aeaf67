/** The thickness's part of verdict.json: what anchors it, and the terraces by maps at several biases. */
import type { Barrier, DeviceDensity } from '../barrier/barrier.ts';
import type { BiasThickness } from '../barrier/bias-thickness.ts';
import { rounded, toNm } from './units.ts';
import { shiftPart } from './verdict-current.ts';

const known = (value: number | undefined): number | undefined => (value === undefined ? undefined : rounded(value));

/** Undefined where nothing anchors a thickness. `layerM` is the recipe's layer spacing. */
export function thicknessPart({ anchors, biases }: Barrier, layerM: number) {
  if (anchors.length === 0 && biases === undefined) return undefined;
  return {
    anchors: anchors.map(({ kind, taken, thicknessM, sdM, materialSdM, sentence }) => ({
      kind, taken, thicknessNm: toNm(thicknessM), sdNm: toNm(sdM), materialSdNm: toNm(materialSdM), layers: rounded(thicknessM / layerM), layersSd: rounded(sdM / layerM), sentence,
    })),
    biases: biases && biasesPart(biases, layerM),
  };
}

/** Thickness at the stated barrier height and mass; `steepnessEv15Nm` is √m·φ^1.5·d, which needs neither. */
function biasesPart({ biasesV, lowV, highV, terraces, further }: BiasThickness, layerM: number) {
  return {
    biasesV: biasesV.map(rounded),
    lowV: rounded(lowV),
    highV: rounded(highV),
    terraces: terraces.map((terrace) => ({
      step: terrace.step, pixels: terrace.pixels, usedShare: rounded(terrace.usedShare),
      thicknessNm: toNm(terrace.thicknessM), seNm: toNm(terrace.seM), pixelSeNm: toNm(terrace.pixelSeM), layers: rounded(terrace.thicknessM / layerM),
      lnRatio: rounded(terrace.lnRatio), lnRatioSe: rounded(terrace.lnRatioSe),
      steepnessEv15Nm: known(terrace.steepnessEv15Nm), steepnessSeEv15Nm: known(terrace.steepnessSe),
    })),
    maps: further.map(({ source, biasV, noiseA, wearDecades, shift }) => ({ source, biasV: rounded(biasV), noiseA: rounded(noiseA), wearDecades: rounded(wearDecades), shift: shift && shiftPart(shift) })),
  };
}

/** The mean fields that a density is carried over between. */
export function fieldsPart({ probeFieldVPerNm, fieldVPerNm }: DeviceDensity) {
  return { probeFieldVPerNm: rounded(probeFieldVPerNm), fieldVPerNm: rounded(fieldVPerNm), fieldRatio: rounded(fieldVPerNm / probeFieldVPerNm) };
}
