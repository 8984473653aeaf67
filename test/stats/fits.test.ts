import assert from 'node:assert/strict';
import { test } from 'node:test';
import { gaussLegendre } from '../../src/stats/gauss-legendre.ts';
import { leastSquares } from '../../src/stats/least-squares.ts';
import { lineFit } from '../../src/stats/line-fit.ts';
import { lag1Autocorrelation, mean, standardDeviation } from '../../src/stats/moments.ts';
import { polynomialFit } from '../../src/stats/polynomial-fit.ts';
import { findRoot } from '../../src/stats/root.ts';
import { residualOf } from '../../src/stats/double-double.ts';
import { assertClose } from '../fixtures/assert-close.ts';

test('[F] straight line from SciPy 1.17 linregress; pairs with a missing value are left out', () => {
  const x = [1, 2, Number.NaN, 3, 4, 5.5, 6, 7];
  const y = [2.1, 3.9, 5, 6.2, 7.8, 11.3, Number.NaN, 13.6];
  const fit = lineFit(x, y);
  assert.equal(fit.points, 6);
  assertClose(fit.slope, 1.95678391959799, 1e-12);
  assertClose(fit.intercept, 0.14539363484087087, 1e-12);
  assertClose(fit.slopeSe, 0.05508112307869167, 1e-12);
  assertClose(fit.interceptSe, 0.23503789253628526, 1e-12);
  assertClose(fit.rSquared, 0.9968405932749443, 1e-12);
});

test('a line needs two different x; two points leave no error', () => {
  assert.ok(Number.isNaN(lineFit([1, 1, 1], [1, 2, 3]).slope));
  const two = lineFit([0, 2], [1, 5]);
  assert.equal(two.slope, 2);
  assert.equal(two.intercept, 1);
  assert.ok(Number.isNaN(two.slopeSe));
  assert.throws(() => lineFit([1], [1, 2]), RangeError);
});

test('least squares: exact plane, residuals, and NaN for dependent columns', () => {
  const a = [0, 1, 2, 0, 1, 2];
  const b = [0, 0, 0, 1, 1, 1];
  const ones = a.map(() => 1);
  const fit = leastSquares([ones, a, b], a.map((value, k) => 3 - 2 * value + 0.5 * b[k]!), true);
  [3, -2, 0.5].forEach((expected, j) => assertClose(fit.coefficients[j], expected, 1e-14));
  assertClose(fit.rSquared, 1, 1e-14);
  assert.ok(fit.residuals.every((value) => Math.abs(value) < 1e-14));
  assert.equal(fit.degreesOfFreedom, 3);
  const dependent = leastSquares([ones, a, a.map((value) => 2 * value)], b, true);
  assert.ok(dependent.coefficients.every(Number.isNaN));
  assert.ok(leastSquares([ones, a], [1, 2, Number.NaN, 1, 2, 3], true).coefficients.every(Number.isNaN));
  assert.throws(() => leastSquares([ones, a], [1], true), RangeError);
});

test('a polynomial far from the origin is found in x itself', () => {
  const x = Array.from({ length: 30 }, (_, k) => 1e4 + k);
  const y = x.map((value) => (value - 1e4) ** 2);
  const fit = polynomialFit(x, y, 2);
  [1e8, -2e4, 1].forEach((expected, j) => assertClose(fit.coefficients[j], expected, 1e-12));
});

test('moments: common values, too few, missing', () => {
  assert.equal(mean([1, 2, 3, 4]), 2.5);
  assertClose(standardDeviation([2, 4, 4, 4, 5, 5, 7, 9]), Math.sqrt(32 / 7), 1e-14);
  assert.ok(Number.isNaN(mean([])));
  assert.ok(Number.isNaN(standardDeviation([1])));
  assert.ok(Number.isNaN(standardDeviation([1, Number.NaN, 2])));
  assertClose(lag1Autocorrelation([1, -1, 1, -1]), -0.75, 1e-14);
});

test('[P] Gauss–Legendre nodes and weights, n = 5 (Abramowitz & Stegun table 25.4), and exactness to degree 2n − 1', () => {
  const { nodes, weights } = gaussLegendre(5);
  [-0.9061798459, -0.5384693101, 0, 0.5384693101, 0.9061798459].forEach((value, k) => assertClose(nodes[k], value, 0, 'node', 1e-10));
  [0.2369268851, 0.4786286705, 0.5688888889, 0.4786286705, 0.2369268851].forEach((value, k) => assertClose(weights[k], value, 0, 'weight', 1e-10));
  const rule = gaussLegendre(12);
  const power = (degree: number) => rule.nodes.reduce((sum, x, k) => sum + rule.weights[k]! * x ** degree, 0);
  assertClose(power(22), 2 / 23, 1e-13);
  assertClose(power(23), 0, 0, 'odd', 1e-15);
});

test('roots: smooth, steep, at an end, and none', () => {
  assertClose(findRoot((x) => x * x - 2, 0, 2), Math.SQRT2, 1e-12);
  assertClose(findRoot((x) => Math.exp(-50 * x) - 1e-9, 0, 10), Math.log(1e9) / 50, 1e-11);
  assertClose(findRoot((x) => (x - 0.3) ** 9, 0, 1), 0.3, 1e-11);
  assert.equal(findRoot((x) => x - 1, 1, 3), 1);
  assert.ok(Number.isNaN(findRoot((x) => x * x + 1, -1, 1)));
  assert.ok(Number.isNaN(findRoot(() => Number.NaN, -1, 1)));
});

test('residuals keep what doubles lose: 1 + 1e-17 − 1', () => {
  const a = [1, 1e-17, -1];
  assert.equal(residualOf(0, (k) => -a[k]!, () => 1, 3), 1e-17);
  // (1 + 2⁻³⁰)² − 1 − 2⁻²⁹ = 2⁻⁶⁰, lost in a plain product.
  const x = 1 + 2 ** -30;
  assert.equal(residualOf(-1 - 2 ** -29, () => -x, () => x, 1), 2 ** -60);
});
