import assert from 'node:assert/strict';
import { test } from 'node:test';
import { layersPerGap } from '../../src/barrier/layers-per-gap.ts';

test('twice and three times the model’s step are two and three layers, within 12 %', () => {
  assert.deepEqual([1, 1.67, 1.75, 1.77, 2, 2.23, 2.25, 2.63, 2.65, 3, 3.35, 3.37, 4].map((ratio) => layersPerGap(0.5 * ratio, 2, 0.5)), [1, 1, 1, 2, 2, 2, 1, 1, 3, 3, 3, 1, 1]);
});

test('not with more than three terraces, and not without a model', () => {
  assert.deepEqual([layersPerGap(1, 3, 0.5), layersPerGap(1, 4, 0.5), layersPerGap(1, 2, undefined)], [2, 1, 1]);
});
