import assert from 'node:assert/strict';
import { test } from 'node:test';
import { greyOpening } from '../../src/grid/opening.ts';
import { seededRandom } from '../../src/stats/random.ts';

/** The same by its definition: the largest over all windows around a pixel of the smallest value in each, windows cut off at the edge. */
function byDefinition(values: Float32Array, columns: number, rows: number, halfX: number, halfY: number): Float32Array {
  const extreme = (from: Float32Array, pick: (a: number, b: number) => number): Float32Array =>
    from.map((_, i) => {
      const [c, r] = [i % columns, Math.floor(i / columns)];
      let best = from[i]!;
      for (let y = Math.max(0, r - halfY); y <= Math.min(rows - 1, r + halfY); y++) {
        for (let x = Math.max(0, c - halfX); x <= Math.min(columns - 1, c + halfX); x++) best = pick(best, from[y * columns + x]!);
      }
      return best;
    });
  return extreme(extreme(values, Math.min), Math.max);
}

test('a bright spot narrower than the square goes, a wider one and a dark spot stay', () => {
  const map = Float32Array.from([
    1, 1, 1, 1, 1, 1, 1,
    1, 9, 1, 1, 5, 5, 5,
    1, 1, 1, 1, 5, 5, 5,
    1, 0, 1, 1, 5, 5, 5,
    1, 1, 1, 1, 1, 1, 1,
  ]);
  assert.deepEqual([...greyOpening(map, 7, 5, 3, 3)], [
    1, 1, 1, 1, 1, 1, 1,
    1, 1, 1, 1, 5, 5, 5,
    1, 1, 1, 1, 5, 5, 5,
    0, 0, 1, 1, 5, 5, 5,
    0, 0, 1, 1, 1, 1, 1,
  ], 'no square of 3 × 3, cut off at the border or not, reaches the corner behind the dark spot without it');
});

test('widths are full widths, made odd by rounding up; 1 changes nothing', () => {
  const line = Float32Array.from([0, 0, 3, 3, 3, 0, 0, 3, 3, 3, 3, 0, 0]);
  assert.deepEqual(greyOpening(line, 13, 1, 1, 1), line);
  assert.deepEqual(greyOpening(line, 13, 1, 3, 1), line);
  assert.deepEqual([...greyOpening(line, 13, 1, 4, 1)], [...new Float32Array(13)]);
  assert.deepEqual(greyOpening(line, 13, 1, 5, 1), greyOpening(line, 13, 1, 4, 1));
});

for (const [columns, rows, widthX, widthY] of [[17, 11, 3, 3], [17, 11, 5, 9], [8, 23, 7, 1], [5, 6, 11, 13], [1, 9, 3, 5], [1, 1, 3, 3], [30, 4, 1, 3]] as const) {
  test(`as by definition on ${columns} × ${rows} with a square of ${widthX} × ${widthY}`, () => {
    const random = seededRandom(`opening ${columns} ${rows} ${widthX}`);
    for (let round = 0; round < 5; round++) {
      const map = Float32Array.from({ length: columns * rows }, () => -12 + 4 * random.normal());
      const found = greyOpening(map, columns, rows, widthX, widthY);
      assert.deepEqual(found, byDefinition(map, columns, rows, widthX >> 1, widthY >> 1));
      for (let i = 0; i < map.length; i++) assert.ok(found[i]! <= map[i]!);
      assert.deepEqual(greyOpening(found, columns, rows, widthX, widthY), found, 'opening twice changes nothing more');
    }
  });
}
