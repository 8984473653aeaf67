import assert from 'node:assert/strict';
import { test } from 'node:test';
import { solveBand } from '../../src/stats/cholesky.ts';
import { seededRandom } from '../../src/stats/random.ts';
import { assertClose } from '../fixtures/assert-close.ts';

test('a full matrix solved by hand: Wilson’s, with x = (1, 1, 1, 1)', () => {
  // T. S. Wilson's matrix (J. Morris, Philos. Mag. 37, 106, 1946) [M]: positive definite, condition number 2984, row sums 32, 23, 33, 31.
  const a = [[10, 7, 8, 7], [7, 5, 6, 5], [8, 6, 10, 9], [7, 5, 9, 10]];
  const band = new Float64Array(16);
  for (let i = 0; i < 4; i++) for (let k = 0; k <= i; k++) band[i * 4 + k] = a[i]![i - k]!;
  for (const x of solveBand(band, 3, Float64Array.from([32, 23, 33, 31]))) assertClose(x, 1, 1e-11);
});

test('second differences with u = 0 at both ends: i(n + 1 − i)/2 exactly [F]', () => {
  const n = 40;
  const band = new Float64Array(2 * n);
  for (let i = 0; i < n; i++) {
    band[2 * i] = 2;
    band[2 * i + 1] = -1;
  }
  solveBand(band, 1, new Float64Array(n).fill(1)).forEach((u, i) => assertClose(u, ((i + 1) * (n - i)) / 2, 1e-12));
});

for (const [n, width] of [[1, 0], [6, 0], [7, 2], [30, 5], [12, 11]] as const) {
  test(`A·x = b is recovered, n ${n}, width ${width}`, () => {
    const random = seededRandom(`band ${n} ${width}`);
    for (let round = 0; round < 4; round++) {
      const at = (i: number, j: number): number => (Math.abs(i - j) > width ? 0 : full[Math.max(i, j)]![Math.abs(i - j)]!);
      const full = Array.from({ length: n }, () => Array.from({ length: width + 1 }, (_, k) => (k === 0 ? 2 * width + 2 + random.uniform() : random.normal() / 3)));
      const x = Float64Array.from({ length: n }, () => random.normal());
      const b = x.map((_, i) => x.reduce((sum, xj, j) => sum + at(i, j) * xj, 0));
      const band = new Float64Array(n * (width + 1));
      // Entries left of column 0 are said to be ignored: fill them with rubbish.
      for (let i = 0; i < n; i++) for (let k = 0; k <= width; k++) band[i * (width + 1) + k] = k > i ? 1e30 : full[i]![k]!;
      const found = solveBand(band, width, b);
      found.forEach((value, i) => assertClose(value, x[i]!, 1e-10, `x${i}`, 1e-12));
      assert.equal(found, b, 'the right-hand side is overwritten and returned');
    }
  });
}

test('a matrix that is not positive definite gives NaN, not a number', () => {
  const found = solveBand(Float64Array.from([1, 0, 1, 2]), 1, Float64Array.from([1, 1]));
  assert.ok([...found].every((value) => Number.isNaN(value)));
});
