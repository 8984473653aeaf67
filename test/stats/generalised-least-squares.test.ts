import assert from 'node:assert/strict';
import { test } from 'node:test';
import { linearRegression } from 'simple-statistics';
import { generalisedLeastSquares } from '../../src/stats/generalised-least-squares.ts';
import { seededRandom } from '../../src/stats/random.ts';
import { assertClose } from '../fixtures/assert-close.ts';

/** Design of a straight line: slope, then intercept. */
const line = (x: readonly number[]): Float64Array => Float64Array.from(x.flatMap((value) => [value, 1]));
const identity = (n: number): Float64Array => Float64Array.from({ length: n * n }, (_, i) => (i % (n + 1) === 0 ? 1 : 0));

test('without correlation it is ordinary least squares, as another library computes it', () => {
  const random = seededRandom('ordinary');
  const x = Array.from({ length: 30 }, (_, i) => i + random.uniform());
  const y = x.map((value) => 3 - 0.7 * value + random.normal());
  const fit = generalisedLeastSquares(identity(30), line(x), Float64Array.from(y))!;
  const other = linearRegression(x.map((value, i) => [value, y[i]!]));
  assertClose(fit.coefficients[0], other.m, 1e-10);
  assertClose(fit.coefficients[1], other.b, 1e-10);
  const residual = y.reduce((sum, value, i) => sum + (value - other.b - other.m * x[i]!) ** 2, 0) / 28;
  const mean = x.reduce((sum, value) => sum + value / 30, 0);
  assertClose(fit.scale, residual, 1e-10);
  assertClose(fit.standardErrors[0], Math.sqrt(residual / x.reduce((sum, value) => sum + (value - mean) ** 2, 0)), 1e-9);
});

test('a mean of correlated numbers is that by hand: three, of which two say nearly the same', () => {
  const r = 0.9;
  const correlation = Float64Array.of(1, 0, 0, r, 1, 0, 0, 0, 1);
  const fit = generalisedLeastSquares(correlation, Float64Array.of(1, 1, 1), Float64Array.of(1, 2, 6))!;
  // Weights 1/(1 + r) for the pair, 1 for the third.
  const w = 1 / (1 + r);
  assertClose(fit.coefficients[0], (w * 1 + w * 2 + 6) / (2 * w + 1), 1e-12);
  assertClose(fit.standardErrors[0], Math.sqrt(fit.scale / (2 * w + 1)), 1e-12);
});

test('the standard error is that of repeated draws, and the likelihood prefers the true correlation', () => {
  const [n, true_] = [60, 0.8];
  const correlation = (r: number): Float64Array => Float64Array.from({ length: n * n }, (_, i) => r ** Math.abs((i % n) - Math.floor(i / n)));
  const x = Array.from({ length: n }, (_, i) => i / n);
  let [squares, standard, preferred] = [0, 0, 0];
  for (let k = 0; k < 200; k++) {
    const random = seededRandom(`draw ${k}`);
    let state = random.normal();
    const y = Float64Array.from(x, (value) => {
      const now = state;
      state = true_ * state + Math.sqrt(1 - true_ ** 2) * random.normal();
      return 2 * value + now;
    });
    const fits = [0, 0.5, true_, 0.98].map((r) => generalisedLeastSquares(correlation(r), line(x), y)!);
    squares += (fits[2]!.coefficients[0]! - 2) ** 2 / 200;
    standard += fits[2]!.standardErrors[0]! ** 2 / 200;
    if (fits[2]!.logLikelihood >= Math.max(...fits.map((fit) => fit.logLikelihood))) preferred++;
  }
  assert.ok(Math.abs(Math.sqrt(squares / standard) - 1) < 0.2, `${Math.sqrt(squares)} against ${Math.sqrt(standard)}`);
  assert.ok(preferred > 100, `true correlation preferred ${preferred} times of 200`);
});

test('nothing to fit, too few numbers, a design or correlation without full rank: no fit', () => {
  assert.equal(generalisedLeastSquares(new Float64Array(0), new Float64Array(0), new Float64Array(0)), undefined);
  assert.equal(generalisedLeastSquares(identity(2), line([1, 2]), Float64Array.of(1, 2)), undefined);
  assert.equal(generalisedLeastSquares(identity(4), line([1, 1, 1, 1]), Float64Array.of(1, 2, 3, 4)), undefined);
  assert.equal(generalisedLeastSquares(new Float64Array(16).fill(1), line([1, 2, 3, 4]), Float64Array.of(1, 2, 3, 4)), undefined);
});
