/** verdict.json's section `texture`: the flawless ground's parameters of ISO 25178-2, and Sq with what levelling took added back. */
import type { Texture } from '../ground/measure-texture.ts';
import { rounded, toNm } from './units.ts';

/** Numbers in nm, pure numbers, or shares; `levellingBiasShare` is the share by which Sq is too low. Without an estimate `noEstimate` says why. */
export function texturePart(texture: Texture) {
  const { levelling } = texture;
  const estimate = typeof levelling === 'string' ? undefined : levelling;
  const sqCorrectedM = estimate && Math.sqrt(texture.sqM ** 2 + estimate.removedM2);
  return {
    pixels: texture.pixels,
    gradientPixels: texture.gradientPixels,
    sqNm: toNm(texture.sqM),
    saNm: toNm(texture.saM),
    ssk: rounded(texture.ssk),
    sku: rounded(texture.sku),
    spNm: toNm(texture.spM),
    svNm: toNm(texture.svM),
    szNm: toNm(texture.szM),
    sdq: rounded(texture.sdq),
    sdr: rounded(texture.sdr),
    sqCorrectedNm: sqCorrectedM && toNm(sqCorrectedM),
    levellingBiasShare: sqCorrectedM && rounded(1 - texture.sqM / sqCorrectedM),
    correlationNm: estimate && toNm(estimate.correlationM),
    correlationShape: estimate?.shape,
    roughnessNm: estimate && toNm(estimate.roughnessM),
    lineVarianceShare: estimate && rounded(estimate.lineShare),
    formVarianceShare: estimate && rounded(estimate.formShare),
    sqInsideTerracesNm: estimate?.sqInsideTerracesM === undefined ? undefined : toNm(estimate.sqInsideTerracesM),
    noEstimate: typeof levelling === 'string' ? levelling : undefined,
  };
}
