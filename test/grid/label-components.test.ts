import assert from 'node:assert/strict';
import { test } from 'node:test';
import { labelComponents } from '../../src/grid/label-components.ts';
import { seededRandom } from '../../src/stats/random.ts';

/** A mask drawn with # for 1. */
function drawn(...lines: string[]) {
  return { mask: Uint8Array.from(lines.join(''), (mark) => (mark === '#' ? 1 : 0)), columns: lines[0]!.length, rows: lines.length };
}

test('corners join with 8, not with 4; numbers follow the raster', () => {
  const { mask, columns, rows } = drawn(
    '..#.#',
    '.#..#',
    '#...#',
    '..#..',
  );
  const four = labelComponents(mask, columns, rows, 4);
  assert.deepEqual([...four.labels], [
    0, 0, 1, 0, 2,
    0, 3, 0, 0, 2,
    4, 0, 0, 0, 2,
    0, 0, 5, 0, 0,
  ]);
  assert.deepEqual([...four.pixels], [13, 1, 3, 1, 1, 1]);
  const eight = labelComponents(mask, columns, rows, 8);
  assert.deepEqual([...eight.labels], [
    0, 0, 1, 0, 2,
    0, 1, 0, 0, 2,
    1, 0, 0, 0, 2,
    0, 0, 3, 0, 0,
  ]);
  assert.equal(eight.count, 3);
});

test('arms that meet late get one number, that of their first pixel', () => {
  const { mask, columns, rows } = drawn(
    '#.#.#.#',
    '#.#.#.#',
    '#######',
    '.......',
    '#.###.#',
    '###.###',
  );
  const { labels, count, pixels } = labelComponents(mask, columns, rows, 4);
  assert.equal(count, 2);
  assert.deepEqual([...pixels], [mask.length - 26, 15, 11]);
  assert.equal(labels[6], 1);
  assert.equal(labels[columns * 4 + 2], 2);
});

test('no wrap from one row’s end to the next row’s start', () => {
  const { mask, columns, rows } = drawn('..#', '#..');
  assert.equal(labelComponents(mask, columns, rows, 4).count, 2);
  assert.equal(labelComponents(mask, columns, rows, 8).count, 2);
});

test('empty, full, one row, one column, no pixels; a wrong size is refused', () => {
  assert.equal(labelComponents(new Uint8Array(12), 4, 3, 8).count, 0);
  assert.deepEqual([...labelComponents(new Uint8Array(12).fill(255), 4, 3, 4).pixels], [0, 12]);
  assert.equal(labelComponents(Uint8Array.of(1, 0, 1, 1, 0, 1), 6, 1, 8).count, 3);
  assert.equal(labelComponents(Uint8Array.of(1, 0, 1, 1, 0, 1), 1, 6, 8).count, 3);
  assert.equal(labelComponents(new Uint8Array(0), 0, 0, 4).count, 0);
  assert.throws(() => labelComponents(new Uint8Array(5), 2, 3, 4), RangeError);
});

test('a checkerboard has as many regions as pixels with 4, one with 8', () => {
  const columns = 9;
  const rows = 7;
  const mask = Uint8Array.from({ length: columns * rows }, (_, k) => ((k % columns) + Math.floor(k / columns)) % 2 === 0 ? 1 : 0);
  assert.equal(labelComponents(mask, columns, rows, 4).count, 32);
  assert.equal(labelComponents(mask, columns, rows, 8).count, 1);
});

test('the same regions under transpose and flip', () => {
  const random = seededRandom('labels');
  const columns = 41;
  const rows = 29;
  const mask = Uint8Array.from({ length: columns * rows }, () => (random.uniform() < 0.55 ? 1 : 0));
  const transposed = new Uint8Array(mask.length);
  for (let k = 0; k < mask.length; k++) transposed[(k % columns) * rows + Math.floor(k / columns)] = mask[k]!;
  for (const connectivity of [4, 8] as const) {
    const sizes = (part: Uint32Array) => [...part.subarray(1)].sort((a, b) => a - b);
    const plain = sizes(labelComponents(mask, columns, rows, connectivity).pixels);
    assert.deepEqual(sizes(labelComponents(transposed, rows, columns, connectivity).pixels), plain);
    assert.deepEqual(sizes(labelComponents(mask.slice().reverse(), columns, rows, connectivity).pixels), plain);
  }
});
