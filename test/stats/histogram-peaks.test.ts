import assert from 'node:assert/strict';
import { test } from 'node:test';
import { histogramPeaks } from '../../src/stats/histogram-peaks.ts';
import type { PeakRule } from '../../src/stats/histogram-peaks.ts';
import { seededRandom } from '../../src/stats/random.ts';

const rule: PeakRule = { bin: 0.01, smooth: 0.05, leastShare: 0.01, valleyShare: 0.8 };
const all = (): boolean => true;

function mixture(seed: string, parts: readonly (readonly [at: number, count: number, sd?: number])[]): Float32Array {
  const random = seededRandom(seed);
  return Float32Array.from(parts.flatMap(([at, count, sd = 0.05]) => Array.from({ length: count }, () => at + sd * random.normal())));
}

test('peaks lowest first, with their shares', () => {
  for (const seed of ['a', 'b', 'c']) {
    const found = histogramPeaks(mixture(seed, [[2, 3000], [-1, 6000], [0.5, 1000]]), all, rule);
    assert.equal(found.length, 3);
    for (const [k, [at, share]] of ([[-1, 0.6], [0.5, 0.1], [2, 0.3]] as const).entries()) {
      assert.ok(Math.abs(found[k]!.at - at) < 0.02, `${found[k]!.at} for ${at}`);
      assert.ok(Math.abs(found[k]!.share - share) < 0.005, `${found[k]!.share} for ${share}`);
    }
  }
});

test('a shallow valley makes one peak of two, a deeper one leaves two', () => {
  // Two equal Gaussians of standard deviation s that lie d apart show a valley between them from d = 2 s on.
  const pair = (apart: number) => histogramPeaks(mixture('pair', [[0, 20000], [apart, 20000]]), all, rule).length;
  assert.deepEqual([pair(0.08), pair(0.14), pair(0.3)], [1, 1, 2]);
});

test('of two that become one the higher keeps its place', () => {
  for (const [left, right, at] of [[30000, 24000, 0], [24000, 30000, 0.18]] as const) {
    const found = histogramPeaks(mixture('higher', [[0, left, 0.03], [0.18, right, 0.03]]), all, { ...rule, valleyShare: 0.1 });
    assert.equal(found.length, 1);
    assert.ok(Math.abs(found[0]!.at - at) < 0.03, `${found[0]!.at} for ${at}`);
  }
});

test('a uniform spread is one broad peak, not one for each ripple of its noise', () => {
  const random = seededRandom('uniform');
  assert.equal(histogramPeaks(Float32Array.from({ length: 20000 }, () => random.uniform()), all, rule).length, 1);
});

test('small peaks are dropped and their share is not given away', () => {
  const found = histogramPeaks(mixture('small', [[0, 9960], [3, 40]]), all, rule);
  assert.equal(found.length, 1);
  assert.ok(Math.abs(found[0]!.share - 0.996) < 1e-3);
});

test('only what is admitted counts; missing and infinite values do not', () => {
  const values = mixture('holes', [[0, 1000], [1, 1000]]);
  const holed = Float32Array.from([...values, Number.NaN, Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY]);
  assert.deepEqual(histogramPeaks(holed, all, rule), histogramPeaks(values, all, rule));
  const [only, ...more] = histogramPeaks(holed, (i) => i < 1000, rule);
  assert.ok(more.length === 0 && Math.abs(only!.at) < 0.02 && Math.abs(only!.share - 1) < 1e-9);
  assert.deepEqual(histogramPeaks(holed, () => false, rule), []);
  assert.deepEqual(histogramPeaks(new Float32Array(0), all, rule), []);
});

test('one value over and over is one peak at it', () => {
  const [only, ...more] = histogramPeaks(new Float32Array(50).fill(7.5), all, rule);
  assert.equal(more.length, 0);
  assert.ok(Math.abs(only!.at - 7.5) < 0.02);
});

test('a shift of all values shifts the peaks, by whole bins exactly', () => {
  const values = mixture('shift', [[0, 1000], [1, 2000]]);
  const at = (by: number) => histogramPeaks(values.map((value) => value + by), all, rule).map((peak) => peak.at - by);
  const own = at(0);
  for (const by of [4, -2]) at(by).forEach((peak, k) => assert.ok(Math.abs(peak - own[k]!) < 1e-6, `${peak} and ${own[k]}`));
});
