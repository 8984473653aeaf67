import assert from 'node:assert/strict';
import { test } from 'node:test';
import { describeBarrier, describeFromCurrent } from '../../../src/barrier/model/describe.ts';
import { Problem } from '../../../src/problems/problem.ts';
import { assertClose } from '../../fixtures/assert-close.ts';

test('forwards: the fields of the contract, in its units', () => {
  const got = describeBarrier({ thicknessNm: 4, biasV: 4 });
  assert.deepEqual(Object.keys(got), ['model', 'thicknessNm', 'layers', 'biasV', 'heightEv', 'massRatio', 'fieldVPerNm', 'regime', 'densityAPerCm2', 'densityNaPerUm2', 'warnings']);
  assertClose(got.densityAPerCm2, 0.599775, 1e-4);
  assertClose(got.densityNaPerUm2, 5.99775, 1e-4);
  assert.deepEqual({ ...got, densityAPerCm2: 0, densityNaPerUm2: 0 }, {
    model: 'wkb', thicknessNm: 4, layers: 12, biasV: 4, heightEv: 2.5, massRatio: 0.5, fieldVPerNm: 1, regime: 'fowler-nordheim', densityAPerCm2: 0, densityNaPerUm2: 0, warnings: [],
  });
});

test('backwards: thickness, layers and the range a decade of contact area leaves', () => {
  const got = describeFromCurrent({ currentA: 1e-12, tipAreaNm2: 17, biasV: 5 });
  assertClose(got.densityAPerCm2, (1e-12 / 17e-18) * 1e-4, 1e-9);
  assert.equal(got.layers, Math.round(got.thicknessNm / 0.333));
  assert.ok(got.thicknessLowNm! < got.thicknessNm && got.thicknessNm < got.thicknessHighNm!);
  const again = describeBarrier({ thicknessNm: got.thicknessHighNm!, biasV: 5 });
  assertClose(again.densityAPerCm2! * Math.sqrt(10), got.densityAPerCm2!, 1e-9);
});

test('negative bias wants a negative current', () => {
  const positive = describeFromCurrent({ currentA: 1e-12, tipAreaNm2: 17, biasV: 5 });
  const negative = describeFromCurrent({ currentA: -1e-12, tipAreaNm2: 17, biasV: -5 });
  assertClose(negative.thicknessNm, positive.thicknessNm, 1e-12);
  assert.throws(() => describeFromCurrent({ currentA: 1e-12, tipAreaNm2: 17, biasV: -5 }), /--current-a: 1e-12 must be a current in A/);
});

test('image charge works for Fowler–Nordheim and raises the density', () => {
  const bare = describeBarrier({ thicknessNm: 4, biasV: 4, model: 'fowler-nordheim' });
  const image = describeBarrier({ thicknessNm: 4, biasV: 4, model: 'fowler-nordheim', imagePermittivity: 3.4 });
  assert.ok(image.densityAPerCm2! > bare.densityAPerCm2!);
  assert.equal(image.imagePermittivity, 3.4);
  assert.throws(() => describeBarrier({ thicknessNm: 4, biasV: 4, imagePermittivity: 3.4 }), Problem);
});

test('a model without an answer leaves the density out and says why; JSON stays free of null', () => {
  const got = describeBarrier({ thicknessNm: 3, biasV: 4, model: 'simmons' });
  assert.equal('densityAPerCm2' in got, false);
  assert.deepEqual(got.warnings.map((entry) => entry.code), ['barrier-breakdown', 'barrier-simmons-range']);
  assert.ok(!JSON.stringify(got).includes('null'));
  assert.throws(() => describeFromCurrent({ currentA: 1e-12, tipAreaNm2: 17, biasV: 4, model: 'simmons' }), /use --model wkb/);
});

test('arguments out of range are named with the value', () => {
  assert.throws(() => describeBarrier({ thicknessNm: -1, biasV: 4 }), /--thickness-nm: -1 must be a number from 0.05 to 100 nm/);
  assert.throws(() => describeBarrier({ thicknessNm: 4, biasV: 0 }), /--bias-v: 0 must be a bias other than 0 V/);
  assert.throws(() => describeBarrier({ thicknessNm: Number.NaN, biasV: 1 }), /--thickness-nm: NaN/);
  assert.throws(() => describeBarrier({ thicknessNm: 4, biasV: 1, heightEv: 0 }), /--height-ev: 0/);
  assert.throws(() => describeBarrier({ thicknessNm: 4, biasV: 1, massRatio: 9 }), /--mass: 9/);
  assert.throws(() => describeFromCurrent({ currentA: 1, tipAreaNm2: 17, biasV: 4 }), (error: unknown) => error instanceof Problem && error.code === 'barrier-no-thickness');
});

test('prefactor and temperature: half the density at m 0.5, ×1.160 at 300 K, only where they have a meaning', () => {
  const asked = { thicknessNm: 4, biasV: 4, model: 'fowler-nordheim' } as const;
  const got = describeBarrier({ ...asked, prefactor: 'none', temperatureK: 300 });
  assertClose(got.densityAPerCm2! * 2, describeBarrier(asked).densityAPerCm2!, 1e-12);
  assertClose(got.temperatureFactor, 1.16, 1e-3);
  assert.equal('prefactor' in describeBarrier(asked), false);
  assert.equal('temperatureFactor' in describeBarrier({ ...asked, model: 'wkb', biasV: 1, temperatureK: 300 }), false);
  assert.throws(() => describeBarrier({ ...asked, model: 'wkb', prefactor: 'none' }), /--prefactor: none cannot be used with the model wkb/);
});
