import assert from 'node:assert/strict';
import { test } from 'node:test';
import { layersPerGap } from '../../src/barrier/layers-per-gap.ts';
import { heightPerGap } from '../../src/ground/gap-height.ts';

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

test('the height of a gap is the median step across borders, whatever the tilt and the lines do', () => {
  const columns = 90;
  const rung = (i: number): number => Math.floor((i % columns) / 30);
  const log10 = Float32Array.from({ length: columns * 20 }, (_, i) => -9 - rung(i));
  const levelled = Float32Array.from({ length: log10.length }, (_, i) => 1e-9 * (0.666 * rung(i) + 0.001 * (i % columns) + 3 * Math.sin(Math.floor(i / columns))));
  const peaks = [0, 1, 2].map((k) => ({ rung: k, log10: -9 - k, share: 1 / 3 }));
  assert.ok(Math.abs(heightPerGap(levelled, log10, columns, peaks, 1, () => true) - 0.672e-9) < 1e-12);
  assert.ok(Number.isNaN(heightPerGap(levelled, log10, columns, peaks, 1, () => false)));
});
