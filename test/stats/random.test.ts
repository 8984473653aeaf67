import assert from 'node:assert/strict';
import { test } from 'node:test';
import { hashWords, seededRandom } from '../../src/stats/random.ts';

test('the same seed gives the same numbers, another seed others', () => {
  const draw = (seed: string) => Array.from({ length: 5 }, ((random) => () => random.uniform())(seededRandom(seed)));
  assert.deepEqual(draw('a'), draw('a'));
  assert.notDeepEqual(draw('a'), draw('b'));
  assert.notDeepEqual(draw(''), draw('\u0000'));
  assert.equal(new Set([...'abcdefghij'].map((seed) => hashWords(seed).join())).size, 10);
});

test('uniform numbers fill [0, 1) evenly: chi-square of 100 bins', () => {
  const random = seededRandom('uniform');
  const counts = new Float64Array(100);
  for (let k = 0; k < 100000; k++) {
    const value = random.uniform();
    assert.ok(value >= 0 && value < 1);
    counts[Math.floor(value * 100)]! += 1;
  }
  const chi = counts.reduce((sum, count) => sum + (count - 1000) ** 2 / 1000, 0);
  assert.ok(chi > 55 && chi < 160, `${chi} of 99 degrees`);
});

test('normal deviates: mean, variance, kurtosis, and no memory', () => {
  const random = seededRandom('normal');
  const n = 100000;
  const values = Float64Array.from({ length: n }, () => random.normal());
  const moment = (power: number) => values.reduce((sum, value) => sum + value ** power, 0) / n;
  assert.ok(Math.abs(moment(1)) < 0.015);
  assert.ok(Math.abs(moment(2) - 1) < 0.02);
  assert.ok(Math.abs(moment(3)) < 0.05);
  assert.ok(Math.abs(moment(4) - 3) < 0.15);
  let serial = 0;
  for (let k = 1; k < n; k++) serial += (values[k]! * values[k - 1]!) / n;
  assert.ok(Math.abs(serial) < 0.015);
});

test('whole numbers below a bound, all of them', () => {
  const random = seededRandom('integer');
  const counts = new Uint32Array(7);
  for (let k = 0; k < 7000; k++) counts[random.integer(7)]! += 1;
  assert.ok(counts.every((count) => count > 850 && count < 1150), [...counts].join());
});
