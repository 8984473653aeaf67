import assert from 'node:assert/strict';
import { test } from 'node:test';
import { fowlerNordheimB } from '../../src/barrier/model/constants.ts';
import { wkbModel } from '../../src/barrier/model/wkb.ts';
import { analyseCurves } from '../../src/iv/analyse-curves.ts';
import type { IvCurve } from '../../src/iv/curve.ts';
import { seededRandom } from '../../src/stats/random.ts';
import { assertClose } from '../fixtures/assert-close.ts';
import { refused } from '../read/refused.ts';
import { measureCurve } from './measure-curve.ts';
import type { MeasureOptions } from './measure-curve.ts';

const barrier = { heightEv: 2.5, massRatio: 0.5, thicknessM: 4e-9 };
const trueSlope = -fowlerNordheimB * Math.sqrt(0.5) * 2.5 ** 1.5 * 4;
const plain: MeasureOptions = { barrier, areaNm2: 20, toV: 6, points: 121, noiseA: 1e-13, share: 0.02 };
const measure = (seed: string, change: Partial<MeasureOptions> = {}) => measureCurve(seededRandom(seed), { ...plain, ...change });
const one = (curve: IvCurve, options = {}) => {
  const { curves, warnings } = analyseCurves([curve], { thicknessNm: 4, ...options });
  return { ...curves[0]!, codes: warnings.map((warning) => warning.code) };
};
const within = (value: number | undefined, truth: number, se: number | undefined, errors = 3.5) =>
  assert.ok(value !== undefined && se !== undefined && Math.abs(value - truth) <= errors * se, `${value} ± ${se}, expected ${truth}`);

test('a usual sweep: slope, height, area and noise within their errors; the line begins above the floor', () => {
  const curve = one(measure('usual', { offsetA: 4e-13 }));
  within(curve.slopeV, trueSlope, curve.slopeSe);
  within(curve.barrierEv, 2.5, curve.barrierSe);
  // φ goes as |slope|^⅔.
  assertClose(curve.barrierSe! / curve.barrierEv!, ((2 / 3) * curve.slopeSe!) / Math.abs(curve.slopeV!), 1e-9);
  assert.ok(Math.abs(Math.log(curve.effectiveAreaNm2! / 20)) <= 3.5 * curve.effectiveAreaLnSe!);
  assertClose(curve.noiseA, 1e-13, 0.25);
  assertClose(curve.noiseShare, 0.02, 0.5);
  assertClose(curve.offsetA, 4e-13, 0.15);
  assert.ok(curve.slopeSe! < 0.01 * Math.abs(trueSlope));
  assert.ok(curve.used![0] > 4 && curve.used![0] < 4.6 && curve.used![1] === 6, String(curve.used));
  assert.deepEqual(curve.codes, ['iv-breakdown']);
});

test('onset: where the true current passes five times the noise', () => {
  const density = (bias: number) => Math.exp(Math.log(1.541434e-6 / (2.5 * 0.5)) + 2 * Math.log(bias / 4) + trueSlope / bias) * 20;
  let expected = 3;
  while (density(expected) < 5e-13) expected += 0.001;
  assertClose(one(measure('onset')).onsetV, expected, 0.025);
  const onsets = Array.from({ length: 60 }, (_, k) => one(measure(`onset ${k}`, { share: 0.005 })).onsetV!);
  // A third of the step between points.
  assertClose(onsets.reduce((sum, value) => sum + value / 60, 0), expected, 0, 'mean onset', 0.017);
  // A quieter amplifier sees an earlier onset; a sweep that starts above the floor sees none.
  assert.ok(one(measure('onset', { noiseA: 2e-14 })).onsetV! < expected - 0.2);
  assert.equal(one(measure('onset', { fromV: 4.6, noiseA: 1e-15 })).onsetV, undefined);
});

test('negative bias, an amplifier that turns the sign, and mA in place of nA change nothing but signs', () => {
  const curve = measure('sign');
  const straight = one(curve);
  const turned = one({ ...curve, biasV: curve.biasV.map((v) => -v), currentA: curve.currentA.map((i) => -i) });
  assert.equal(turned.polarity, 'negative');
  assertClose(turned.slopeV, straight.slopeV!, 1e-9);
  assert.deepEqual(turned.used, straight.used!.map((v) => -v));
  const inverted = one({ ...curve, currentA: curve.currentA.map((i) => -i) });
  assertClose(inverted.slopeV, straight.slopeV!, 1e-9);
  const louder = one({ ...curve, currentA: curve.currentA.map((i) => i * 1e6) });
  assertClose(louder.slopeV, straight.slopeV!, 1e-6);
  assertClose(louder.intercept, straight.intercept! + Math.log(1e6), 1e-6);
});

test('both polarities: one line is reported, the other named', () => {
  const up = measure('plus');
  const down = measure('minus', { toV: -5.4, points: 108 });
  const curve = one({ name: 'both', biasV: Float64Array.from([...down.biasV].reverse().concat([...up.biasV])), currentA: Float64Array.from([...down.currentA].reverse().concat([...up.currentA])) });
  assert.equal(curve.polarity, 'positive');
  within(curve.slopeV, trueSlope, curve.slopeSe);
  assert.ok(curve.codes.includes('iv-other-polarity'));
});

test('hysteresis: none on equal ways; a way down that carries more is seen, named, and kept out of the line', () => {
  const quiet = one(measure('ways', { both: true }));
  assert.equal(quiet.hysteresis?.seen, false);
  const curve = one(measure('ways', { both: true, downFactor: 1.5 }));
  assert.equal(curve.hysteresis?.seen, true);
  within(curve.hysteresis?.lnRatio, Math.log(1.5), curve.hysteresis?.lnRatioSe);
  assert.ok(curve.hysteresis!.shiftV > 0.05 && curve.hysteresis!.shiftV < 0.3);
  assert.ok(curve.codes.includes('iv-hysteresis'));
  within(curve.intercept, one(measure('ways')).intercept!, curve.interceptSe);
  assert.ok(curve.usedPoints! < 0.6 * quiet.usedPoints!, `${curve.usedPoints} of ${quiet.usedPoints}`);
  const less = analyseCurves([measure('ways', { both: true, downFactor: 0.6 })]);
  assert.match(less.warnings.find((warning) => warning.code === 'iv-hysteresis')!.message, /on the way up the current is 1\.[67]\d* times/);
});

test('leakage: an ohmic part is measured, named and taken off; without one none is claimed', () => {
  const curve = one(measure('leak', { leakS: 1e-12 }));
  within(curve.leakage?.conductanceS, 1e-12, curve.leakage?.conductanceSe);
  assert.equal(curve.leakage?.seen, true);
  assert.ok(curve.codes.includes('iv-leakage'));
  within(curve.slopeV, trueSlope, curve.slopeSe);
  let claimed = 0;
  for (let k = 0; k < 40; k++) if (one(measure(`no leak ${k}`, { offsetA: 5e-13 })).leakage?.seen === true) claimed += 1;
  assert.ok(claimed <= 1, `${claimed} of 40`);
});

test('saturated points are left out and counted', () => {
  const curve = one(measure('limit', { limitA: 5e-11 }));
  assert.ok(curve.saturatedPoints! > 8);
  assert.ok(curve.used![1] < 5.6);
  assert.ok(curve.codes.includes('iv-saturated'));
  within(curve.slopeV, trueSlope, curve.slopeSe);
});

test('a series resistance bends the top: the line ends below it and says so', () => {
  const curve = measure('series', { noiseA: 1e-14, share: 0.01 });
  const bent = one({ ...curve, currentA: curve.currentA.map((i) => (i > 2e-11 ? 2e-11 * (1 + Math.log(i / 2e-11) / 3) : i)) });
  assert.ok(bent.codes.includes('iv-top-bent'), String(bent.codes));
  within(bent.slopeV, trueSlope, bent.slopeSe, 4);
});

test('WKB through the whole barrier, free of noise: the line stays where the barrier is a triangle', () => {
  const curve = one(measure('device', { areaNm2: 1e8, noiseA: 0, share: 0, density: (shape, bias) => wkbModel.density(shape, bias) }));
  assert.ok(curve.used![0] > 2.5, String(curve.used));
  // WKB lies a few per cent below the closed form, and so does the height by its slope.
  assertClose(curve.barrierEv, 2.5, 0.02);
});

test('without a thickness it follows from the height; a wrong area is contradicted, a right one is not', () => {
  const { curves } = analyseCurves([measure('thickness')]);
  within(curves[0]!.thicknessNm, 4, curves[0]!.thicknessSe);
  assert.equal(curves[0]!.barrierEv, undefined);
  assert.ok(!one(measure('area'), { areaNm2: 20 }).codes.includes('iv-area'));
  assert.ok(one(measure('area'), { areaNm2: 20000 }).codes.includes('iv-area'));
});

test('no line: only noise, too few points, or a current that does not tunnel; never a number that is not finite', () => {
  const noise = one(measure('noise', { areaNm2: 1e-6 }));
  assert.equal(noise.slopeV, undefined);
  assert.ok(noise.codes.includes('iv-few-points'));
  const few = one({ name: 'few', biasV: Float64Array.of(5, 6), currentA: Float64Array.of(1e-12, 1e-11) });
  assert.ok(few.codes.includes('iv-few-points'));
  const ohmic = one({ name: 'ohmic', biasV: Float64Array.from({ length: 50 }, (_, k) => (k + 1) / 10), currentA: Float64Array.from({ length: 50 }, (_, k) => (k + 1) * 1e-10) });
  assert.equal(ohmic.barrierEv, undefined);
  assert.ok(ohmic.codes.some((code) => ['iv-few-points', 'iv-nowhere-straight', 'iv-wrong-slope'].includes(code)), String(ohmic.codes));
  const zeros = one({ name: 'zeros', biasV: Float64Array.from({ length: 50 }, (_, k) => k / 10), currentA: new Float64Array(50) });
  assert.equal(zeros.slopeV, undefined);
  const empty = one({ name: 'empty', biasV: new Float64Array(0), currentA: new Float64Array(0) });
  assert.equal(empty.points, 0);
  for (const result of [noise, few, ohmic, zeros, empty]) {
    assert.doesNotMatch(JSON.stringify(result), /null/);
    JSON.stringify(result, (_, value: unknown) => (assert.ok(typeof value !== 'number' || Number.isFinite(value), result.name), value));
  }
});

test('options out of range are refused by name', async () => {
  assert.match((await refused(() => analyseCurves([], { thicknessNm: -1 }))).message, /--thickness-nm: -1 must be/);
  assert.match((await refused(() => analyseCurves([], { heightEv: 0 }))).message, /--height-ev: 0 must be/);
  assert.match((await refused(() => analyseCurves([], { areaNm2: 0 }))).message, /--area-nm2: 0 must be/);
});
