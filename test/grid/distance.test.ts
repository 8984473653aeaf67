import assert from 'node:assert/strict';
import { test } from 'node:test';
import { squaredDistance } from '../../src/grid/distance.ts';
import type { DistanceOptions } from '../../src/grid/distance.ts';
import { seededRandom } from '../../src/stats/random.ts';
import { assertClose } from '../fixtures/assert-close.ts';

/** The definition, pixel by pixel. */
function bySearch(mask: Uint8Array, columns: number, rows: number, { pitchX = 1, pitchY = 1, outsideIsBackground = false }: DistanceOptions): number[] {
  const margin = outsideIsBackground ? 1 : 0;
  return Array.from(mask, (value, k) => {
    if (value === 0) return 0;
    const row = Math.floor(k / columns);
    const column = k % columns;
    let best = Infinity;
    for (let r = -margin; r < rows + margin; r++) {
      for (let c = -margin; c < columns + margin; c++) {
        const outside = r < 0 || c < 0 || r >= rows || c >= columns;
        if (outside || mask[r * columns + c] === 0) best = Math.min(best, ((r - row) * pitchY) ** 2 + ((c - column) * pitchX) ** 2);
      }
    }
    return best;
  });
}

test('one hole in a small picture; the border is not background unless asked', () => {
  const mask = new Uint8Array(20).fill(1);
  mask[7] = 0; // row 1, column 2 of 5 columns
  assert.deepEqual([...squaredDistance(mask, 5, 4)], [
    5, 2, 1, 2, 5,
    4, 1, 0, 1, 4,
    5, 2, 1, 2, 5,
    8, 5, 4, 5, 8,
  ]);
  assert.deepEqual([...squaredDistance(mask, 5, 4, { outsideIsBackground: true })], [
    1, 1, 1, 1, 1,
    1, 1, 0, 1, 1,
    1, 2, 1, 2, 1,
    1, 1, 1, 1, 1,
  ]);
});

test('exact for random masks, unequal pitch and both borders, against a search through all pixels', () => {
  const random = seededRandom('distance');
  for (const [columns, rows, share] of [[17, 23, 0.9], [31, 9, 0.98], [1, 12, 0.7], [12, 1, 0.7], [20, 20, 0.995]] as const) {
    const mask = Uint8Array.from({ length: columns * rows }, () => (random.uniform() < share ? 1 : 0));
    for (const options of [{}, { outsideIsBackground: true }, { pitchX: 2, pitchY: 3 }, { pitchX: 19.5e-9, pitchY: 4.6e-9, outsideIsBackground: true }]) {
      const expected = bySearch(mask, columns, rows, options);
      const got = squaredDistance(mask, columns, rows, options);
      got.forEach((value, k) => (Number.isFinite(expected[k]!) ? assertClose(value, expected[k]!, 1e-7) : assert.equal(value, Infinity)));
    }
  }
});

test('no background: Infinity; all background: 0; a wrong size is refused', () => {
  assert.ok(squaredDistance(new Uint8Array(6).fill(1), 3, 2).every((value) => value === Infinity));
  assert.deepEqual([...squaredDistance(new Uint8Array(9).fill(1), 3, 3, { outsideIsBackground: true })], [1, 1, 1, 1, 4, 1, 1, 1, 1]);
  assert.ok(squaredDistance(new Uint8Array(6), 3, 2, { outsideIsBackground: true }).every((value) => value === 0));
  assert.throws(() => squaredDistance(new Uint8Array(5), 3, 2), RangeError);
});
