/** What the thresholds of the flaws mean on this map. */
import type { SampleSummary, ThresholdsInForce } from '../../workers/api.ts';
import { figure, fixed, withUnit } from './format.ts';

/** Beside the height: "= 10.0 × this map’s noise (0.080 nm); this limit rules here". */
export function heightMeaning(nm: number, times: number, { heightNoiseNm }: ThresholdsInForce): string {
  if (heightNoiseNm === undefined || !(heightNoiseNm > 0)) return '';
  return `= ${fixed(nm / heightNoiseNm, 1)} × this map’s noise (${withUnit(heightNoiseNm, 'nm', 2)}); ${nm >= times * heightNoiseNm ? 'this limit rules here' : `the limit by noise, ${withUnit(times * heightNoiseNm, 'nm')}, rules here`}.`;
}

/** Beside the multiple of the noise: "= 0.48 nm on this map; the limit in nm, 0.80 nm, rules here". */
export function noiseMeaning(times: number, nm: number, { heightNoiseNm }: ThresholdsInForce): string {
  if (heightNoiseNm === undefined || !(heightNoiseNm > 0)) return '';
  const own = times * heightNoiseNm;
  return `= ${withUnit(own, 'nm')} on this map; ${own > nm ? 'this limit rules here' : `the limit in nm, ${withUnit(nm, 'nm')}, rules here`}.`;
}

/** Beside the drop: "to a third of its value; 0.63 layers of this map’s ladder (0.80 decades each); 12 × the noise of the log current (0.042 decades)". */
export function dropMeaning(decades: number, { layerDecades, layerFrom, currentNoiseDecades }: ThresholdsInForce, ladder: SampleSummary['ladder']): string {
  const step = ladder?.from === 'map' ? ladder.stepDecades : layerDecades;
  const whose = ladder?.from === 'map' || layerFrom === 'map' ? 'of this map’s ladder' : layerFrom === 'model' ? 'by the model' : 'at an assumed';
  const layers = step !== undefined && step > 0 ? `; ${figure(decades / step, 2)} layers ${whose} (${figure(step, 2)} decades each)` : '';
  const noise = currentNoiseDecades !== undefined && currentNoiseDecades > 0 ? `; ${figure(decades / currentNoiseDecades, 2)} × the noise of the log current (${figure(currentNoiseDecades, 2)} decades)` : '';
  return `A decade is a factor of ten: to 1/${figure(10 ** decades, 2)} of the current around${layers}${noise}.`;
}

/** Beside a number of layers: how many decades, and what factor. */
export function layersMeaning(layers: number, { layerDecades }: ThresholdsInForce): string {
  if (layerDecades === undefined) return '';
  return `= ${figure(layers * layerDecades, 2)} decades on this map, ${figure(10 ** (layers * layerDecades), 2)} times the current around.`;
}
