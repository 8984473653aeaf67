import assert from 'node:assert/strict';
import { test } from 'node:test';
import { boltzmannEvPerK } from '../../src/barrier/model/constants.ts';
import { temperatureFactor } from '../../src/barrier/model/temperature-factor.ts';
import { activationOf } from '../../src/iv/activation.ts';
import { analyseCurves } from '../../src/iv/analyse-curves.ts';
import { sweepDirections } from '../../src/iv/sweeps.ts';
import { seededRandom } from '../../src/stats/random.ts';
import { assertClose } from '../fixtures/assert-close.ts';
import { measureCurve } from './measure-curve.ts';
import type { MeasureOptions } from './measure-curve.ts';

const barrier = { heightEv: 2.5, massRatio: 0.5, thicknessM: 4e-9 };
const plain: MeasureOptions = { barrier, areaNm2: 20, toV: 6, points: 121, noiseA: 1e-13, share: 0.03 };
const check = (seed: string, temperaturesK: readonly number[], factor: (temperatureK: number) => number) => {
  const random = seededRandom(seed);
  return analyseCurves(temperaturesK.map((temperatureK) => measureCurve(random, { ...plain, temperatureK, name: `${temperatureK} K`, factor: factor(temperatureK) })), { thicknessNm: 4 });
};

test('tunnelling with its own temperature factor is called tunnelling', () => {
  for (let k = 0; k < 20; k++) {
    const { temperature, warnings } = check(`tunnel ${k}`, [77, 150, 300], (temperatureK) => temperatureFactor(temperatureK, 1.3, 2.5, 0.5));
    assert.equal(temperature?.verdict, 'tunnelling', `${k}: ${temperature?.words}`);
    assert.ok(temperature.spreadShare < 0.3 && temperature.expectedShare! > 0.05 && temperature.expectedShare! < 0.2);
    assert.ok(!warnings.some((warning) => warning.code.startsWith('iv-temperature') || warning.code.startsWith('iv-thermally')));
  }
});

test('an activated current is called so, with its energy within its error', () => {
  for (const [energyEv, lowestK] of [[0.05, 220], [0.2, 220], [0.4, 260]] as const) {
    const factor = (temperatureK: number) => Math.exp(-energyEv * (1 / (boltzmannEvPerK * temperatureK) - 1 / (boltzmannEvPerK * 300)));
    const { temperature, warnings } = check(`activated ${energyEv}`, [lowestK, 280, 300], factor);
    assert.equal(temperature?.verdict, 'thermally-activated', temperature?.words);
    assert.ok(Math.abs(temperature.activationEv - energyEv) < 3.5 * temperature.activationSe, `${temperature.activationEv} ± ${temperature.activationSe}`);
    assert.ok(temperature.activationSe < 0.02);
    assert.match(warnings.at(-1)!.message, /thermally activated .*trap-assisted/);
  }
});

test('what decides nothing stays open: a small span, a fall, a scatter', () => {
  const small = check('small', [295, 300], () => 1).temperature;
  assert.equal(small?.verdict, 'unclear');
  assert.match(small.words, /small a span/);
  const fall = check('fall', [77, 300], (temperatureK) => (temperatureK > 200 ? 0.5 : 1)).temperature;
  assert.equal(fall?.verdict, 'unclear');
  const scatter = check('scatter', [77, 150, 220, 300], (temperatureK) => (temperatureK === 150 ? 2 : 1)).temperature;
  assert.equal(scatter?.verdict, 'unclear');
  assert.equal(check('one', [300, 300.5], () => 1).temperature, undefined);
});

test('curves that share no bias are said to, and not compared', () => {
  const random = seededRandom('apart');
  const curves = [measureCurve(random, { ...plain, temperatureK: 77, toV: 4.6 }), measureCurve(random, { ...plain, temperatureK: 300, fromV: 5 })];
  const { temperature, warnings } = analyseCurves(curves);
  assert.equal(temperature, undefined);
  assert.ok(warnings.some((warning) => warning.code === 'iv-temperature-apart'));
});

test('activation from exact currents, and its error from two', () => {
  const temperatures = [200, 250, 300];
  const exact = temperatures.map((temperatureK) => ({ lnCurrent: 3 - 0.3 / (boltzmannEvPerK * temperatureK), se: 0.01 }));
  assertClose(activationOf(temperatures, exact).activationEv, 0.3, 1e-9);
  const span = 1 / (boltzmannEvPerK * 200) - 1 / (boltzmannEvPerK * 300);
  assertClose(activationOf([200, 300], [exact[0]!, exact[2]!]).activationSe, (0.01 * Math.SQRT2) / span, 1e-3);
});

test('directions of a sweep: turns beyond its noise, in both polarities, and a dwell', () => {
  assert.deepEqual([...sweepDirections(Float64Array.of(0, 1, 2, 3, 2, 1, 0, -1, -2, -1, 0))], [1, 1, 1, 1, -1, -1, -1, -1, -1, 1, 1]);
  assert.deepEqual([...sweepDirections(Float64Array.of(0, 1, 0.99, 2, 3))], [1, 1, 1, 1, 1]);
  assert.deepEqual([...sweepDirections(Float64Array.of(2, 2, 2))], [0, 0, 0]);
});
