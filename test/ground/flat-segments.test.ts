import assert from 'node:assert/strict';
import { test } from 'node:test';
import { boxMean, flatSegments } from '../../src/ground/flat-segments.ts';
import { seededRandom } from '../../src/stats/random.ts';

const layerM = 0.333e-9;
const columns = 60;
const rows = 40;

function map(nm: (c: number, r: number) => number, noiseNm = 0.05): Float32Array {
  const random = seededRandom('flat');
  return Float32Array.from({ length: columns * rows }, (_, i) => 1e-9 * (nm(i % columns, Math.floor(i / columns)) + noiseNm * random.normal()));
}

test('a border of one layer parts two segments by a band of a few pixels, a gentle slope parts nothing', () => {
  const { labels, count } = flatSegments(map((c) => (c < 30 ? 0 : 0.333)), columns, rows, layerM);
  const at = (c: number, r = 20): number => labels[r * columns + c]!;
  assert.equal(count, 2);
  assert.notEqual(at(10), at(50));
  assert.ok(at(10) > 0 && at(50) > 0 && at(29) === 0 && at(30) === 0);
  assert.ok(at(22) === at(10) && at(37) === at(50), 'the band is narrow');
  // 0.4 nm over the map: more than a layer, but nowhere steep.
  assert.equal(flatSegments(map((c) => (0.4 * c) / columns), columns, rows, layerM).count, 1);
});

test('features, missing ground and what lies far below or above are in no segment', () => {
  const heights = map((c, r) => (Math.hypot(c - 15, r - 20) < 8 ? 12 * (1 - Math.hypot(c - 15, r - 20) ** 2 / 64) : c >= 45 ? 30 : 0));
  for (let r = 0; r < 12; r++) heights.fill(Number.NaN, r * columns + 24, r * columns + 36);
  const { labels } = flatSegments(heights, columns, rows, layerM);
  assert.equal(labels[20 * columns + 20], 0, 'flank of the dome');
  assert.equal(labels[20 * columns + 55], 0, '30 nm up');
  assert.equal(labels[4 * columns + 30], 0, 'missing');
  assert.ok(labels[30 * columns + 30]! > 0);
});

test('the mean over a square: cut off at borders, missing values left out, none where there is none', () => {
  const values = Float32Array.from([
    1, 2, 3, 4,
    5, Number.NaN, 7, 8,
    9, 10, 11, Number.NaN,
  ]);
  assert.deepEqual([...boxMean(values, 4, 3, 1)].map((value) => Math.round(value * 1e4) / 1e4), [2.6667, 3.6, 4.8, 5.5, 5.4, 6, 6.4286, 6.6, 8, 8.4, 9, 8.6667]);
  assert.deepEqual([...boxMean(values, 4, 3, 0)], [...values]);
  const whole = boxMean(values, 4, 3, 9);
  assert.ok(whole.every((value) => value === whole[0] && value === 6));
  assert.ok(Number.isNaN(boxMean(new Float32Array(9).fill(Number.NaN), 3, 3, 1)[4]!));
});
