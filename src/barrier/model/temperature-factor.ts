/** How temperature raises field emission over its value at absolute zero. */
import { boltzmannEvPerK, waveNumberPerRootEv } from './constants.ts';

/**
 * Factor x/sin x on the Fowler–Nordheim density, x = πkT·2√(2mφ)/(ħeF) (Murphy & Good,
 * Phys. Rev. 102, 1464, 1956, without image charge): 1 at T = 0. NaN for x ≥ π, where thermionic
 * emission takes over and the expansion has no meaning.
 */
export function temperatureFactor(temperatureK: number, fieldVPerNm: number, heightEv: number, massRatio: number): number {
  const x = (Math.PI * boltzmannEvPerK * temperatureK * 2 * waveNumberPerRootEv * Math.sqrt(massRatio * heightEv)) / fieldVPerNm;
  if (x === 0) return 1;
  return x > 0 && x < Math.PI ? x / Math.sin(x) : Number.NaN;
}
