import assert from 'node:assert/strict';
import { test } from 'node:test';
import { histogram } from '../../src/stats/histogram.ts';
import { otsuBin } from '../../src/stats/otsu.ts';

test('edges belong to the bin above, the last edge to the last bin; missing and outside values are left out', () => {
  const got = histogram([0, 1, 1.5, 2, 4, Number.NaN, -1, 5, Infinity], 4, 0, 4);
  assert.deepEqual([...got.counts], [1, 2, 1, 1]);
  assert.equal(got.from, 0);
  assert.equal(got.binWidth, 1);
});

test('the range is that of the values where none is given', () => {
  assert.deepEqual([...histogram([2, 3, 6], 2).counts], [2, 1]);
  assert.deepEqual([...histogram([7, 7], 2).counts], [2, 0]);
  assert.deepEqual([...histogram([], 3).counts], [0, 0, 0]);
});

test('Otsu’s bin parts two heaps, at the lowest of equal splits', () => {
  assert.equal(otsuBin([5, 0, 0, 0, 5]), 0);
  assert.equal(otsuBin([1, 5, 1, 0, 0, 1, 5, 1]), 2);
  assert.equal(otsuBin([0, 9, 0]), -1);
  assert.equal(otsuBin([]), -1);
});

test('Otsu’s bin leaves the smallest variance inside its two classes, by trying every split', () => {
  const counts = [3, 8, 12, 9, 4, 2, 1, 1, 3, 6, 10, 7, 5, 2];
  const within = (split: number) => {
    let sum = 0;
    for (const [from, to] of [[0, split], [split + 1, counts.length - 1]] as const) {
      let weight = 0;
      let moment = 0;
      for (let bin = from; bin <= to; bin++) {
        weight += counts[bin]!;
        moment += bin * counts[bin]!;
      }
      for (let bin = from; bin <= to; bin++) sum += counts[bin]! * (bin - moment / weight) ** 2;
    }
    return sum;
  };
  const splits = counts.slice(1).map((_, split) => within(split));
  assert.equal(otsuBin(counts), splits.indexOf(Math.min(...splits)));
});
