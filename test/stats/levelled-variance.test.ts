import assert from 'node:assert/strict';
import { test } from 'node:test';
import { legendreShares, productShares, varianceRemoved, varianceRemovedByMedian } from '../../src/stats/levelled-variance.ts';
import { assertClose } from '../fixtures/assert-close.ts';

const shapes = ['gaussian', 'exponential'] as const;
const total = (shares: Float64Array): number => shares.reduce((sum, share) => sum + share, 0);

for (const shape of shapes) {
  test(`${shape}: a higher degree and a longer correlation take more, never all`, () => {
    let last = 0;
    for (const ratio of [0.001, 0.01, 0.03, 0.1, 0.3, 1, 3]) {
      const byDegree = [0, 1, 2, 3, 4, 5].map((degree) => varianceRemoved(ratio, degree, shape));
      for (let degree = 1; degree <= 5; degree++) assert.ok(byDegree[degree]! > byDegree[degree - 1]!, `${ratio} ${degree}`);
      assert.ok(byDegree[0]! > last && byDegree[5]! < 1);
      last = byDegree[0]!;
    }
  });

  test(`${shape}: where the correlation is short against the line each degree takes the same`, () => {
    const shares = legendreShares(1e-4, 5, shape);
    for (const share of shares) assertClose(share, shares[0]!, 0.01);
  });

  test(`${shape}: a median takes less than the mean, almost the same under much noise`, () => {
    for (const ratio of [0.003, 0.03, 0.3]) {
      const mean = varianceRemoved(ratio, 0, shape);
      const shares = [1, 0.7, 0.3, 0.01].map((correlated) => varianceRemovedByMedian(ratio, shape, correlated));
      for (let k = 1; k < shares.length; k++) assert.ok(shares[k]! > shares[k - 1]! && shares[k]! < mean);
      assert.ok(shares[0]! > 0.75 * mean && shares[0]! < 0.92 * mean);
      assertClose(shares[3], mean, 1e-4);
    }
  });

  test(`${shape}: turning the rectangle turns the shares`, () => {
    const upright = productShares(0.04, 0.11, 3, shape);
    const turned = productShares(0.11, 0.04, 3, shape);
    for (let i = 0; i <= 3; i++) {
      for (let j = 0; j <= 3; j++) {
        assertClose(upright[i * 4 + j], turned[j * 4 + i]!, 1e-12);
        assert.equal(upright[i * 4 + j] === 0, i + j > 3);
      }
    }
  });

  test(`${shape}: a rectangle much flatter than the correlation is a line`, () => {
    const shares = productShares(0.05, 1e4, 2, shape);
    assertClose(total(shares), varianceRemoved(0.05, 2, shape), 1e-3);
  });

  test(`${shape}: the sum over a fine grid of pixels comes to the same`, () => {
    const [columns, rows, lengthPx] = [60, 40, 9];
    // Share of the constant: Σ ρ over all pairs/n², pairs counted by their separation.
    let sum = 0;
    for (let dx = 1 - columns; dx < columns; dx++) {
      for (let dy = 1 - rows; dy < rows; dy++) {
        const r = Math.hypot(dx, dy) / lengthPx;
        sum += (columns - Math.abs(dx)) * (rows - Math.abs(dy)) * Math.exp(shape === 'gaussian' ? -r * r : -r);
      }
    }
    assertClose(productShares(lengthPx / columns, lengthPx / rows, 2, shape)[0], sum / (columns * rows) ** 2, 3e-3);
  });
}

test('short exponential lines: the median takes 2 − (π/2) ln 2 of what the mean takes', () => {
  // ∫asin e^(−x) dx from 0 to ∞ = ∫asin(u)/u du from 0 to 1 = (π/2) ln 2.
  assertClose(varianceRemovedByMedian(1e-5, 'exponential') / varianceRemoved(1e-5, 0, 'exponential'), 2 - (Math.PI / 2) * Math.LN2, 1e-4);
});
