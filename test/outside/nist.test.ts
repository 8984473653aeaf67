/** [P] NIST/ITL Statistical Reference Datasets (public domain): certified values to the tolerance of each set. */
import { test } from 'node:test';
import { leastSquares } from '../../src/stats/least-squares.ts';
import { lineFit } from '../../src/stats/line-fit.ts';
import { lag1Autocorrelation, mean, standardDeviation } from '../../src/stats/moments.ts';
import { polynomialFit } from '../../src/stats/polynomial-fit.ts';
import { assertClose } from '../fixtures/assert-close.ts';
import { linearSets } from '../fixtures/nist-linear.ts';
import type { LinearSet } from '../fixtures/nist-linear.ts';
import { univariateSets } from '../fixtures/nist-univariate.ts';

for (const set of univariateSets) {
  test(`[P] NIST univariate ${set.name}: mean, standard deviation, lag-1 autocorrelation`, () => {
    assertClose(mean(set.values), set.mean, set.tolerance, 'mean');
    assertClose(standardDeviation(set.values), set.sd, set.tolerance, 'sd');
    assertClose(lag1Autocorrelation(set.values), set.r1, set.tolerance, 'r1');
  });
}

function fitOf(set: LinearSet) {
  if (typeof set.model === 'number') return polynomialFit(set.x[0]!, set.y, set.model);
  if (set.model === 'through-origin') return leastSquares(set.x, set.y, false);
  return leastSquares([set.y.map(() => 1), ...set.x], set.y, true);
}

for (const set of linearSets) {
  test(`[P] NIST linear regression ${set.name}: coefficients, their errors, residual sd, R²`, () => {
    const fit = fitOf(set);
    // Where the certified scatter is 0, what is left must be rounding of y and nothing more.
    const rounding = 1e-12 * Math.max(...set.y.map(Math.abs));
    set.certified.forEach(([estimate, error], j) => {
      assertClose(fit.coefficients[j], estimate, set.tolerance, `B${j}`);
      assertClose(fit.standardErrors[j], error, set.tolerance, `error of B${j}`, error === 0 ? rounding : 0);
    });
    assertClose(fit.residualSd, set.residualSd, set.tolerance, 'residual sd', set.residualSd === 0 ? rounding : 0);
    assertClose(fit.rSquared, set.rSquared, set.tolerance, 'R²');
  });
}

test('[P] NIST Norris by the straight-line fit', () => {
  const set = linearSets.find((entry) => entry.name === 'Norris')!;
  const fit = lineFit(set.x[0]!, set.y);
  const [[intercept, interceptSe], [slope, slopeSe]] = set.certified as [readonly [number, number], readonly [number, number]];
  assertClose(fit.slope, slope, 1e-9);
  assertClose(fit.slopeSe, slopeSe, 1e-9);
  assertClose(fit.intercept, intercept, 1e-9);
  assertClose(fit.interceptSe, interceptSe, 1e-9);
  assertClose(fit.residualSd, set.residualSd, 1e-9);
  assertClose(fit.rSquared, set.rSquared, 1e-9);
});
