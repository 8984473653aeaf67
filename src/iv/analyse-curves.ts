/** Current–voltage curves of one barrier: a line and what follows from it for each, and a temperature check over all. */
import { Problem } from '../problems/problem.ts';
import { median } from '../stats/median.ts';
import { analyseCurve } from './analyse-curve.ts';
import type { CurvesAnalysis } from './curve-analysis.ts';
import type { IvCurve } from './curve.ts';
import { checkTemperatures } from './temperature-check.ts';

export interface IvOptions {
  /** Known thickness, nm: heights follow from the slopes. Absent: thicknesses follow from `heightEv`. */
  readonly thicknessNm?: number;
  /** Area that the current flows through, nm²: compared with the one that the intercept implies. */
  readonly areaNm2?: number;
  /** Barrier height, eV; 2.5. Used where no thickness is given. */
  readonly heightEv?: number;
  /** Tunnelling mass over the electron mass; 0.5. */
  readonly massRatio?: number;
}

/**
 * Analyses curves that belong to one barrier. Throws `Problem('barrier-argument')`, naming the command
 * line's option, for an option out of range; a curve without a line is a warning.
 */
export function analyseCurves(curves: readonly IvCurve[], options: IvOptions = {}): CurvesAnalysis {
  const { thicknessNm, areaNm2, heightEv = 2.5, massRatio = 0.5 } = options;
  between('--thickness-nm', thicknessNm ?? 1, 0.05, 100, ' nm');
  between('--area-nm2', areaNm2 ?? 1, 1e-3, 1e15, ' nm²');
  between('--height-ev', heightEv, 0.2, 10, ' eV');
  between('--mass', massRatio, 0.01, 5, '');
  const question = { heightEv, massRatio, ...(thicknessNm === undefined ? {} : { thicknessNm }), ...(areaNm2 === undefined ? {} : { areaNm2 }) };
  const analysed = curves.map((curve) => analyseCurve(curve, question));
  const results = analysed.map((one) => one.analysis);
  const typical = (values: readonly (number | undefined)[]): number | undefined => {
    const present = values.filter((value) => value !== undefined);
    return present.length === 0 ? undefined : median(present);
  };
  const material = { heightEv: typical(results.map((one) => one.barrierEv)) ?? heightEv, massRatio };
  const check = checkTemperatures(analysed, material, typical(results.map((one) => one.thicknessNm)));
  return {
    curves: results,
    ...(check.temperature === undefined ? {} : { temperature: check.temperature }),
    warnings: [...analysed.flatMap((one) => one.warnings), ...check.warnings],
  };
}

function between(name: string, value: number, min: number, max: number, unit: string): void {
  if (!(value >= min && value <= max)) throw new Problem('barrier-argument', { name, value: String(value), reason: `must be a number from ${min} to ${max}${unit}` });
}
