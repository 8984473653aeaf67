import assert from 'node:assert/strict';
import { test } from 'node:test';
import { addMask, bothOf, countOf, inverse, keepBoth, knownOutside, maskOf, membersOf, onlyFirst, pixelsOf, takeMask } from '../../src/flaws/mask-pixels.ts';

/** Masks of every length around four pixels, and one that does not begin at a multiple of four bytes. */
const pairs = [0, 1, 3, 4, 5, 8, 11].flatMap((length) => [0, 1].map((start) => [0b10110011101, 0b01110110100].map((bits) => {
  const held = new Uint8Array(start + length);
  for (let i = 0; i < length; i++) held[start + i] = (bits >> i) & 1;
  return held.subarray(start);
}) as [Uint8Array, Uint8Array]));

test('masks are joined, cut and turned pixel by pixel, whatever their length and place', () => {
  for (const [a, b] of pairs) {
    const expected = (of: (x: number, y: number) => number): number[] => Array.from(a, (x, i) => of(x, b[i]!));
    assert.deepEqual([...bothOf(a, b)], expected((x, y) => x & y));
    assert.deepEqual([...onlyFirst(a, b)], expected((x, y) => (x === 1 && y === 0 ? 1 : 0)));
    assert.deepEqual([...inverse(a)], expected((x) => 1 - x));
    for (const [change, of] of [[addMask, (x: number, y: number) => x | y], [keepBoth, (x: number, y: number) => x & y], [takeMask, (x: number, y: number) => (y === 1 ? 0 : x)]] as const) {
      const own = Uint8Array.of(7, ...a).subarray(1);
      change(own, b);
      assert.deepEqual([...own], expected(of));
      assert.equal(new Uint8Array(own.buffer)[0], 7, 'what lies before the mask stays');
    }
    assert.deepEqual([...pixelsOf(a)], [...a.keys()].filter((i) => a[i] === 1));
    assert.equal(countOf(a), a.reduce((sum, x) => sum + x, 0));
    assert.deepEqual([...maskOf(pixelsOf(a), a.length)], [...a]);
  }
});

test('members are listed by label in raster order, with and without a list of pixels that may hold others', () => {
  const labels = Uint32Array.of(0, 2, 1, 2, 0, 4, 1);
  for (const pixels of [undefined, Int32Array.of(0, 1, 2, 3, 5, 6)]) {
    assert.deepEqual(membersOf(labels, 4, pixels).map((list) => [...list]), [[], [2, 6], [1, 3], [], [5]]);
  }
});

test('what is missing is not known, nor what the mask covers', () => {
  assert.deepEqual([...knownOutside(Uint8Array.of(0, 1, 0, 0), Float32Array.of(1, 1, Number.NaN, Number.POSITIVE_INFINITY))], [1, 0, 0, 1]);
});
