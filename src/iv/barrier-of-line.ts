/** What the line of a Fowler–Nordheim plot says of the barrier. */
import { fowlerNordheimA, fowlerNordheimB } from '../barrier/model/constants.ts';
import type { BarrierMaterial } from '../barrier/model/tunnel-model.ts';

/** Slope and intercept of ln(I/V²) over 1/V with their errors; V, and I in A. */
export interface PlotLine {
  readonly slope: number;
  readonly slopeSe: number;
  readonly intercept: number;
  readonly interceptSe: number;
  readonly covariance: number;
}

/** A value and the standard error that the line alone gives it: mass and what was given count as exact. */
export interface Estimate {
  readonly value: number;
  readonly se: number;
}

/** Barrier height in eV from the slope −B·√m·φ^1.5·d (Fowler & Nordheim, Proc. R. Soc. A 119, 173, 1928) at a known thickness in nm. NaN for a slope that is not negative. */
export function heightOfLine(line: PlotLine, thicknessNm: number, massRatio: number): Estimate {
  const value = (-line.slope / (fowlerNordheimB * Math.sqrt(massRatio) * thicknessNm)) ** (2 / 3);
  return { value, se: ((2 / 3) * value * line.slopeSe) / Math.abs(line.slope) };
}

/** Thickness in nm from the same slope at a known height. NaN for a slope that is not negative. */
export function thicknessOfLine(line: PlotLine, { heightEv, massRatio }: BarrierMaterial): Estimate {
  const value = line.slope < 0 ? -line.slope / (fowlerNordheimB * Math.sqrt(massRatio) * heightEv ** 1.5) : Number.NaN;
  return { value, se: (value * line.slopeSe) / Math.abs(line.slope) };
}

/**
 * Tunnelling area in nm² from the intercept ln(A·area/(φ·m·d²)), with the 1/m of Lenzlinger & Snow,
 * J. Appl. Phys. 40, 278 (1969), and the standard error of its logarithm. The intercept lies far outside the
 * measured 1/V: the area is good to a factor at best.
 *
 * @param known which of height and thickness was given; the other one comes from the slope and moves with it.
 */
export function areaOfLine(line: PlotLine, heightEv: number, thicknessNm: number, massRatio: number, known: 'height' | 'thickness'): { readonly areaNm2: number; readonly lnSe: number } {
  const areaNm2 = (Math.exp(line.intercept) * heightEv * massRatio * thicknessNm ** 2) / fowlerNordheimA;
  // ln area = intercept + (2/3)·ln|slope| at a known thickness, intercept + 2·ln|slope| at a known height.
  const bySlope = (known === 'thickness' ? 2 / 3 : 2) / line.slope;
  const variance = line.interceptSe ** 2 + (bySlope * line.slopeSe) ** 2 + 2 * bySlope * line.covariance;
  return { areaNm2, lnSe: Math.sqrt(Math.max(0, variance)) };
}
