/** The plain results of an I–V analysis, as `evenglow iv --json` prints them. */
import type { Notice } from '../problems/problem.ts';
import type { Hysteresis } from './hysteresis.ts';

/** One curve. What the curve does not give is absent; all numbers are finite. */
export interface CurveAnalysis {
  readonly name: string;
  /** Points with a bias and a current. */
  readonly points: number;
  readonly temperatureK?: number;
  /** The sign of bias whose line is better known; the numbers are of it. */
  readonly polarity?: 'positive' | 'negative';
  /** Biases from the low to the high end of the line, V, with their sign. */
  readonly used?: readonly [number, number];
  readonly usedPoints?: number;
  /** Line of ln(I/V²) over 1/V, I in A, V in V, both as magnitudes. */
  readonly slopeV?: number;
  readonly slopeSe?: number;
  readonly intercept?: number;
  readonly interceptSe?: number;
  /** Height at the given thickness; the error is that of the slope alone. */
  readonly barrierEv?: number;
  readonly barrierSe?: number;
  /** The given thickness, or the one at the given height; then with the error of the slope alone. */
  readonly thicknessNm?: number;
  readonly thicknessSe?: number;
  /** Tunnelling area by the intercept, and the standard error of its logarithm. */
  readonly effectiveAreaNm2?: number;
  readonly effectiveAreaLnSe?: number;
  /** Field at both ends of the line. */
  readonly fieldVPerNm?: readonly [number, number];
  /** Bias above which the current stays over five standard deviations of the noise. */
  readonly onsetV?: number;
  readonly offsetA?: number;
  /** Amplifier's noise, standard deviation. */
  readonly noiseA?: number;
  /** Noise that grows with the current: standard deviation of ln I about the line. */
  readonly noiseShare?: number;
  readonly leakage?: { readonly conductanceS: number; readonly conductanceSe: number; readonly seen: boolean };
  readonly hysteresis?: Hysteresis;
  readonly saturatedPoints?: number;
}

export interface TemperatureAnalysis {
  readonly verdict: 'tunnelling' | 'thermally-activated' | 'unclear';
  /** Largest over smallest current at `biasV`, minus 1. */
  readonly spreadShare: number;
  readonly biasV: number;
  readonly fromK: number;
  readonly toK: number;
  /** What tunnelling through this barrier would give for `spreadShare`; absent where the model has no answer. */
  readonly expectedShare?: number;
  /** Slope of ln I over −1/kT, eV. */
  readonly activationEv: number;
  readonly activationSe: number;
  /** The verdict as a sentence. */
  readonly words: string;
}

export interface CurvesAnalysis {
  readonly curves: readonly CurveAnalysis[];
  readonly temperature?: TemperatureAnalysis;
  readonly warnings: readonly Notice[];
}
