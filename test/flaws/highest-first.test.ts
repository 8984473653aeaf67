import assert from 'node:assert/strict';
import { test } from 'node:test';
import { highestFirst } from '../../src/flaws/highest-first.ts';
import { seededRandom } from '../../src/stats/random.ts';

test('the highest come first, equal ones in the order of the list, both zeros are equal, missing ones are last', () => {
  const heights = Float32Array.of(-2, 0, Number.NaN, 3, -0, 1e-40, Number.POSITIVE_INFINITY, -1e-40, 3, Number.NEGATIVE_INFINITY);
  assert.deepEqual([...highestFirst(Int32Array.from(heights.keys()), heights)], [6, 3, 8, 5, 1, 4, 7, 0, 2, 9]);
  assert.deepEqual([...highestFirst(Int32Array.of(8, 4, 3, 1), heights)], [8, 3, 4, 1]);
  assert.deepEqual([...highestFirst(new Int32Array(0), heights)], []);
});

test('the order is that of a sort by pairs', () => {
  const random = seededRandom('highest');
  const heights = Float32Array.from({ length: 5000 }, () => Math.round((random.uniform() - 0.5) * 2000) * 1e-11);
  const pixels = Int32Array.from(heights.keys()).filter((i) => i % 3 !== 0);
  assert.deepEqual([...highestFirst(pixels, heights)], [...pixels].sort((a, b) => heights[b]! - heights[a]! || a - b));
});
