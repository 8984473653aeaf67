/** Activation energy from currents at several temperatures. */
import { boltzmannEvPerK } from '../barrier/model/constants.ts';

/**
 * Weighted line of ln I over −1/kT (Arrhenius, Z. Phys. Chem. 4, 226, 1889): its slope in eV with its
 * standard error, which grows with the scatter about the line where that exceeds the errors given. The
 * slope is negative when the current falls with temperature.
 */
export function activationOf(temperaturesK: readonly number[], currents: readonly { readonly lnCurrent: number; readonly se: number }[]): { activationEv: number; activationSe: number } {
  const x = temperaturesK.map((temperatureK) => -1 / (boltzmannEvPerK * temperatureK));
  const w = currents.map(({ se }) => 1 / (se ** 2 + 1e-12));
  const total = w.reduce((sum, value) => sum + value, 0);
  const mean = (values: readonly number[]): number => values.reduce((sum, value, k) => sum + (value * w[k]!) / total, 0);
  const meanX = mean(x);
  const meanY = mean(currents.map(({ lnCurrent }) => lnCurrent));
  const xx = x.reduce((sum, value, k) => sum + w[k]! * (value - meanX) ** 2, 0);
  const xy = x.reduce((sum, value, k) => sum + w[k]! * (value - meanX) * (currents[k]!.lnCurrent - meanY), 0);
  const activationEv = xy / xx;
  const squares = x.reduce((sum, value, k) => sum + w[k]! * (currents[k]!.lnCurrent - meanY - activationEv * (value - meanX)) ** 2, 0);
  const excess = x.length > 2 ? Math.max(1, squares / (x.length - 2)) : 1;
  return { activationEv, activationSe: Math.sqrt(excess / xx) };
}
