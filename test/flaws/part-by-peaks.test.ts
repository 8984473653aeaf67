import assert from 'node:assert/strict';
import { test } from 'node:test';
import { partByPeaks } from '../../src/flaws/part-by-peaks.ts';
import { dome, drawRises, exchanged, mirrored, patch } from '../fixtures/draw-rises.ts';

const grid = { columns: 128, rows: 128, pitchXM: 20e-9, pitchYM: 20e-9 };

/** One row of heights as a map of three equal rows. */
function row(heights: readonly number[], noiseM = 0.001, minPixels = 1) {
  const rise = Float32Array.from([...heights, ...heights, ...heights]);
  const { labels, count } = partByPeaks({ columns: heights.length, rows: 3, mask: Uint8Array.from(rise, (h) => (h > 0 ? 1 : 0)), rise, noiseM, minPixels });
  return { count, labels: Array.from(labels.subarray(0, heights.length)) };
}

test('two peaks with a low saddle are two things, with a high one they are one', () => {
  assert.equal(row([1, 4, 9, 4, 2, 4, 9, 4, 1]).count, 2);
  assert.equal(row([1, 4, 9, 8.5, 8, 8.5, 9, 4, 1]).count, 1);
  const { labels } = row([1, 4, 9, 4, 2, 4, 9, 4, 1]);
  assert.ok(labels[0] === labels[3] && labels[5] === labels[8] && labels[0] !== labels[8]);
});

test('a saddle that noise could have made parts nothing', () => {
  assert.equal(row([0.5, 1, 0.7, 1, 0.5], 0.1).count, 1);
  assert.equal(row([0.5, 1, 0.7, 1, 0.5], 0.01).count, 2);
});

test('ground outside the mask is in no part; parts that do not touch are apart', () => {
  const { labels, count } = row([3, 3, 0, 3, 3]);
  assert.deepEqual([count, labels[2]], [2, 0]);
  assert.ok(labels[0] === labels[1] && labels[3] === labels[4] && labels[0] !== labels[3]);
});

test('a summit of fewer pixels than the smallest part is no part of its own', () => {
  assert.equal(row([9, 9, 9, 9, 4, 2, 8], 0.001, 6).count, 1);
});

test('every pixel of the mask is in a part, numbered from 1 without gaps', () => {
  const drawn = drawRises(grid, [dome(600, 600, 300, 30), dome(1100, 650, 260, 25), dome(700, 1100, 200, 12), patch(1900, 1900, 300, 2)]);
  const { labels, count } = partByPeaks(drawn);
  assert.ok(labels.every((label, i) => (label > 0) === (drawn.mask[i] === 1) && label <= count));
  assert.equal(new Set(labels.filter((label) => label > 0)).size, count);
});

for (const seed of ['a', 'b', 'c', 'd']) {
  test(`domes that touch are as many parts, a noisy dome and a noisy patch one each, seed ${seed}`, () => {
    const drawn = drawRises(grid, [dome(600, 600, 300, 30), dome(1100, 600, 260, 25), dome(600, 1100, 250, 25), dome(1900, 700, 300, 40), patch(1900, 1900, 350, 2)], { seed });
    const { labels, count } = partByPeaks(drawn);
    assert.equal(count, 5);
    const found = [[600, 600], [1100, 600], [600, 1100], [1900, 700], [1900, 1900]].map(([x, y]) => labels[drawn.at(x!, y!)]!);
    assert.equal(new Set(found).size, 5);
    for (const [turn, name] of [[mirrored, 'mirrored'], [exchanged, 'exchanged']] as const) {
      const other = turn(drawn);
      const parts = partByPeaks(other);
      assert.equal(parts.count, 5, name);
      // The same pixels are together, but for those on a saddle.
      const pixels = (of: { labels: Uint32Array }, label: number): number => of.labels.filter((value) => value === label).length;
      for (const [k, [x, y]] of ([[600, 600], [1100, 600], [600, 1100], [1900, 700], [1900, 1900]] as const).entries()) {
        const [own, turned] = [pixels({ labels }, found[k]!), pixels(parts, parts.labels[turn === mirrored ? other.at(2560 - x, y) : other.at(y, x)]!)];
        assert.ok(Math.abs(own - turned) <= 6, `${name}: ${own} and ${turned} pixels`);
      }
    }
  });
}
