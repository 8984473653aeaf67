/** A seeded study: how often the 95 % intervals of slope and height hold the truth. */
import { fowlerNordheimB } from '../../src/barrier/model/constants.ts';
import { analyseCurves } from '../../src/iv/analyse-curves.ts';
import { seededRandom } from '../../src/stats/random.ts';
import { measureCurve } from './measure-curve.ts';
import type { MeasureOptions } from './measure-curve.ts';

export interface Coverage {
  readonly curves: number;
  /** Curves on which no line was found. */
  readonly without: number;
  readonly slope: number;
  readonly height: number;
  /** Median relative standard error of the slope. */
  readonly typicalError: number;
  /** Mean of (found − true)/standard error. */
  readonly meanPull: number;
}

/** One scenario: what differs from the plain sweep. */
export type Scenario = (draw: (low: number, high: number) => number) => Partial<MeasureOptions>;

/** `count` curves with drawn barrier, area, noise and number of points, each analysed by itself. */
export function coverageOf(seed: string, count: number, scenario: Scenario): Coverage {
  const random = seededRandom(seed);
  const draw = (low: number, high: number): number => low + (high - low) * random.uniform();
  let slopes = 0;
  let heights = 0;
  let found = 0;
  let pulls = 0;
  const errors: number[] = [];
  for (let k = 0; k < count; k++) {
    const thicknessNm = draw(3, 5);
    const heightEv = draw(2.2, 3);
    const massRatio = 0.5;
    const options: MeasureOptions = {
      barrier: { heightEv, massRatio, thicknessM: thicknessNm * 1e-9 }, areaNm2: 10 ** draw(1, 2.3), toV: draw(1.45, 1.75) * thicknessNm * (heightEv / 2.5) ** 1.5,
      points: Math.round(draw(60, 300)), noiseA: 10 ** draw(-13.3, -12.3), share: draw(0.01, 0.08), offsetA: draw(-5e-13, 5e-13), ...scenario(draw),
    };
    const [curve] = analyseCurves([measureCurve(random, options)], { thicknessNm, massRatio }).curves;
    if (curve?.slopeV === undefined || curve.barrierEv === undefined) continue;
    found += 1;
    const truth = -fowlerNordheimB * Math.sqrt(massRatio) * heightEv ** 1.5 * thicknessNm;
    if (Math.abs(curve.slopeV - truth) <= 1.96 * curve.slopeSe!) slopes += 1;
    if (Math.abs(curve.barrierEv - heightEv) <= 1.96 * curve.barrierSe!) heights += 1;
    pulls += (curve.slopeV - truth) / curve.slopeSe!;
    errors.push(curve.slopeSe! / Math.abs(truth));
  }
  errors.sort((a, b) => a - b);
  return { curves: count, without: count - found, slope: slopes / found, height: heights / found, typicalError: errors[errors.length >> 1]!, meanPull: pulls / found };
}
