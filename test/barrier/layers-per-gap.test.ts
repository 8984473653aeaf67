import assert from 'node:assert/strict';
import { test } from 'node:test';
import { heightPerGap, layersPerGap } from '../../src/barrier/layers-per-gap.ts';

test('two and three layers where current (within 12 % of the model) and height agree', () => {
  const per = (ratio: number, heightLayers: number): number => layersPerGap({ stepDecades: 0.5 * ratio, modelStepDecades: 0.5, heightLayers });
  assert.deepEqual([1.75, 1.77, 2, 2.23, 2.25].map((ratio) => per(ratio, 1.9)), [1, 2, 2, 2, 1]);
  assert.deepEqual([2.63, 2.65, 3, 3.35, 3.37].map((ratio) => per(ratio, 3.2)), [1, 3, 3, 3, 1]);
});

test('one layer where the height says one, where there is none, and without a model', () => {
  assert.equal(layersPerGap({ stepDecades: 1, modelStepDecades: 0.5, heightLayers: 1.2 }), 1);
  assert.equal(layersPerGap({ stepDecades: 1, modelStepDecades: 0.5 }), 1);
  assert.equal(layersPerGap({ stepDecades: 1, heightLayers: 2 }), 1);
});

test('the height of a gap is the slope of the terraces\u2019 medians', () => {
  const log10 = Float32Array.from({ length: 300 }, (_, i) => -9 - Math.floor(i / 100));
  const levelled = Float32Array.from({ length: 300 }, (_, i) => 1e-9 * 0.666 * Math.floor(i / 100) + (i % 7 === 0 ? 5e-9 : 0));
  const peaks = [0, 1, 2].map((rung) => ({ rung, log10: -9 - rung, share: 1 / 3 }));
  assert.ok(Math.abs(heightPerGap(levelled, log10, peaks, 1, () => true) - 0.666e-9) < 1e-12);
});
