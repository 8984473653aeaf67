import assert from 'node:assert/strict';
import { test } from 'node:test';
import { murphyYield, negativeBinomialYield, poissonYield, seedsYield } from '../../src/stats/defect-yield.ts';
import { chiSquareQuantile, gammaP, gammaQ, inverseGammaP, lnGamma } from '../../src/stats/gamma.ts';
import { normalCumulative, normalQuantile } from '../../src/stats/normal.ts';
import { poissonInterval, poissonUpperBound } from '../../src/stats/poisson.ts';
import { wilsonInterval } from '../../src/stats/wilson.ts';
import { assertClose } from '../fixtures/assert-close.ts';

test('[F] ln Γ, P and Q from SciPy 1.17', () => {
  for (const [x, expected] of [[0.1, 2.252712651734206], [0.5, 0.5723649429247], [2.5, 0.2846828704729192], [10, 12.801827480081469], [171, 706.5730622457875], [1e5, 1051287.7089736569]] as const) assertClose(lnGamma(x), expected, 1e-12);
  assertClose(lnGamma(1), 0, 0, 'ln Γ(1)', 1e-14);
  for (const [a, x, p, q] of [[0.5, 0.1, 0.34527915398142317, 0.6547208460185768], [0.5, 20, 0.9999999997460371, 2.5396285894708634e-10], [3, 2.5, 0.45618688411667035, 0.5438131158833297], [10, 25, 0.9997785233617512, 2.214766382487835e-4], [100, 90, 0.15822098918643007, 0.84177901081357], [1000, 1100, 0.9989406767460701, 1.0593232539299773e-3]] as const) {
    assertClose(gammaP(a, x), p, 1e-11, `P(${a}, ${x})`);
    assertClose(gammaQ(a, x), q, 1e-11, `Q(${a}, ${x})`);
  }
  assert.ok(Number.isNaN(gammaP(-1, 1)) && Number.isNaN(gammaP(1, -1)));
});

test('the inverse of P undoes P in both tails', () => {
  for (const a of [0.5, 1, 4, 60]) for (const p of [1e-8, 0.01, 0.5, 0.99, 1 - 1e-8]) assertClose(gammaP(a, inverseGammaP(a, p)), p, 1e-11, `a ${a}`);
  assert.equal(inverseGammaP(2, 0), 0);
  assert.equal(inverseGammaP(2, 1), Infinity);
  assert.ok(Number.isNaN(chiSquareQuantile(1.5, 3)));
});

test('[F] normal distribution from SciPy 1.17, and its ends', () => {
  for (const [z, expected] of [[-10, 7.61985302416047e-24], [-2, 0.022750131948179195], [-0.5, 0.3085375387259869], [0, 0.5], [1, 0.8413447460685429], [3, 0.9986501019683699]] as const) assertClose(normalCumulative(z), expected, 1e-12);
  assert.equal(normalQuantile(0.5), 0);
  assert.equal(normalQuantile(0), -Infinity);
  assert.equal(normalQuantile(1), Infinity);
  assert.ok(Number.isNaN(normalQuantile(-0.1)));
});

test('intervals at none and all, and refusals', () => {
  assert.equal(poissonInterval(0).low, 0);
  assertClose(poissonInterval(0).high, -Math.log(0.025), 1e-12);
  assertClose(poissonUpperBound(0, 0.9), -Math.log(0.1), 1e-12);
  assert.ok(Number.isNaN(poissonInterval(1.5).low) && Number.isNaN(poissonUpperBound(-1)));
  assert.deepEqual(wilsonInterval(0, 0), { low: 0, high: 1 });
  assert.equal(wilsonInterval(0, 9).low, 0);
  assert.equal(wilsonInterval(9, 9).high, 1);
  assert.ok(Number.isNaN(wilsonInterval(3, 2).low));
});

test('the Poisson bounds are what they say: chance of at most n at the upper, at least n at the lower', () => {
  const atMost = (n: number, mu: number) => Array.from({ length: n + 1 }, (_, k) => Math.exp(k * Math.log(mu) - mu - lnGamma(k + 1))).reduce((a, b) => a + b, 0);
  const { low, high } = poissonInterval(7);
  assertClose(atMost(7, high), 0.025, 1e-10);
  assertClose(1 - atMost(6, low), 0.025, 1e-10);
});

test('yields: 1 without defects, in the order of their clustering, Poisson as the limit', () => {
  for (const yieldOf of [poissonYield, murphyYield, seedsYield, (x: number) => negativeBinomialYield(x, 2)]) assert.equal(yieldOf(0), 1);
  assert.ok(poissonYield(2) < murphyYield(2) && murphyYield(2) < seedsYield(2));
  assertClose(negativeBinomialYield(2, 1), seedsYield(2), 1e-14);
  assertClose(negativeBinomialYield(2, 1e9), poissonYield(2), 1e-8);
  assertClose(murphyYield(1e-9), 1 - 1e-9, 1e-12);
});
