/** Invented measured curves with known truth, for the tests of src/iv. */
import { fowlerNordheimModel } from '../../src/barrier/model/fowler-nordheim.ts';
import type { BarrierShape } from '../../src/barrier/model/tunnel-model.ts';
import type { IvCurve } from '../../src/iv/curve.ts';
import type { Random } from '../../src/stats/random.ts';

const model = fowlerNordheimModel();

export interface MeasureOptions {
  readonly name?: string;
  readonly barrier: BarrierShape;
  readonly areaNm2: number;
  readonly fromV?: number;
  readonly toV: number;
  /** Points of one way. */
  readonly points: number;
  readonly both?: boolean;
  /** Amplifier's noise, A; and noise over current. */
  readonly noiseA?: number;
  readonly share?: number;
  readonly offsetA?: number;
  readonly leakS?: number;
  readonly limitA?: number;
  /** Factor on the tunnel current on the way down. */
  readonly downFactor?: number;
  /** Factor on the tunnel current. */
  readonly factor?: number;
  readonly temperatureK?: number;
  readonly density?: (barrier: BarrierShape, biasV: number) => number;
}

/** A sweep as an amplifier would record it. */
export function measureCurve(random: Random, options: MeasureOptions): IvCurve {
  const { barrier, areaNm2, fromV = 0, toV, points, noiseA = 0, share = 0, offsetA = 0, leakS = 0, limitA = Number.POSITIVE_INFINITY } = options;
  const up = Array.from({ length: points }, (_, k) => fromV + ((toV - fromV) * k) / (points - 1));
  const biasV = options.both === true ? [...up, ...[...up].reverse()] : up;
  const density = options.density ?? ((shape, bias) => model.density(shape, bias));
  const currentA = biasV.map((bias, k) => {
    const way = k < points ? 1 : (options.downFactor ?? 1);
    const tunnel = bias === 0 ? 0 : Math.sign(bias) * density(barrier, bias) * areaNm2 * 1e-18 * way * (options.factor ?? 1);
    const seen = (tunnel + leakS * bias) * (1 + share * random.normal()) + offsetA + noiseA * random.normal();
    return Math.max(-limitA, Math.min(limitA, seen));
  });
  return {
    name: options.name ?? 'curve', biasV: Float64Array.from(biasV), currentA: Float64Array.from(currentA),
    ...(options.temperatureK === undefined ? {} : { temperatureK: options.temperatureK }),
  };
}
