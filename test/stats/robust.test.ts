import assert from 'node:assert/strict';
import { test } from 'node:test';
import { median as referenceMedian, quantileSorted } from 'simple-statistics';
import { medianAbsoluteDeviation, scaledMad } from '../../src/stats/mad.ts';
import { median, medianInPlace } from '../../src/stats/median.ts';
import { quantile } from '../../src/stats/quantile.ts';
import { seededRandom } from '../../src/stats/random.ts';
import { presentValues, selectInPlace } from '../../src/stats/select.ts';
import { assertClose } from '../fixtures/assert-close.ts';

const ten = [3.5, -1, 7, 2, 2, 9, 11, -4, 0.5, 6];

test('median: odd, even, missing values, nothing', () => {
  assert.equal(median([5, 1, 3]), 3);
  assert.equal(median(ten), 2.75);
  assert.equal(median([Number.NaN, 4, Number.NaN, 2]), 3);
  assert.ok(Number.isNaN(median([])));
  assert.ok(Number.isNaN(median([Number.NaN])));
  assert.equal(median([-Infinity, 1, Infinity]), 1);
});

test('the input of median, quantile and MAD is left as it was', () => {
  const input = Float32Array.from(ten);
  median(input);
  quantile(input, 0.3);
  scaledMad(input);
  assert.deepEqual([...input], ten);
});

test('selection equals sorting for random, sorted, reversed and equal values', () => {
  const random = seededRandom('select');
  const shapes = [
    Float64Array.from({ length: 501 }, () => random.normal()),
    Float64Array.from({ length: 500 }, () => random.integer(5)),
    Float64Array.from({ length: 300 }, (_, k) => k),
    Float64Array.from({ length: 300 }, (_, k) => -k),
    new Float64Array(200),
  ];
  for (const values of shapes) {
    const sorted = values.slice().sort();
    for (const k of [0, 1, 17, values.length >> 1, values.length - 1]) assert.equal(selectInPlace(values.slice(), k), sorted[k]);
    assert.equal(median(values), referenceMedian([...values]));
    assert.equal(medianInPlace(values.slice(), 100), median(values.subarray(0, 100)));
  }
});

test('[F] quantile of type 7 from NumPy 2.4', () => {
  for (const [p, expected] of [[0, -4], [0.1, -1.3], [0.25, 0.875], [0.5, 2.75], [0.9, 9.2], [1, 11]] as const) assertClose(quantile(ten, p), expected, 1e-12);
  assert.equal(quantile([Number.NaN, 8], 0.3), 8);
  assert.ok(Number.isNaN(quantile([], 0.5)));
  assert.ok(Number.isNaN(quantile(ten, 1.1)));
});

test('a quantile lies between its neighbours in the sorted values', () => {
  const random = seededRandom('quantile');
  const values = Float32Array.from({ length: 999 }, () => random.normal());
  const sorted = [...values].sort((a, b) => a - b);
  for (let p = 0; p <= 1; p += 0.05) {
    const got = quantile(values, p);
    const place = (values.length - 1) * p;
    assert.ok(got >= sorted[Math.floor(place)]! && got <= sorted[Math.ceil(place)]!);
  }
  assert.equal(quantile(values, 0.5), quantileSorted(sorted, 0.5));
});

test('MAD with its median; normal deviates give their standard deviation', () => {
  assert.deepEqual(medianAbsoluteDeviation(ten), { median: 2.75, mad: 3.5 });
  const random = seededRandom('mad');
  const values = Float64Array.from({ length: 40000 }, () => 3 + 2 * random.normal());
  assertClose(scaledMad(values), 2, 0.03);
  assert.equal(presentValues([1, Number.NaN, 2]).length, 2);
});
