import assert from 'node:assert/strict';
import { test } from 'node:test';
import { measureLadder } from '../../src/ground/ladder.ts';
import { seededRandom } from '../../src/stats/random.ts';
import { terraceCurrentA } from '../fixtures/create-scene.ts';

/** Log currents of terraces with shares and scatter. */
function terraces(seed: string, levels: readonly (readonly [log10: number, pixels: number])[], scatter = 0.06): Float32Array {
  const random = seededRandom(seed);
  return Float32Array.from(levels.flatMap(([log10, pixels]) => Array.from({ length: pixels }, () => log10 + scatter * random.normal())));
}

for (const seed of ['a', 'b', 'c']) {
  test(`the step of model-made terraces is found, seed ${seed}`, () => {
    const levels = [10, 11, 12, 13].map((layers, k) => [Math.log10(terraceCurrentA(layers, 5.9)), [800, 5000, 2500, 900][k]!] as const);
    const found = measureLadder(terraces(seed, levels), () => true);
    assert.equal(found.peaks.length, 4);
    assert.deepEqual(found.peaks.map((peak) => peak.rung), [0, 1, 2, 3]);
    found.peaks.forEach((peak, k) => assert.ok(Math.abs(peak.log10 - levels[k]![0]) < 0.03, `peak ${k} at ${peak.log10}`));
    const step = (levels[0]![0] - levels[3]![0]) / 3;
    assert.ok(Math.abs(found.stepDecades! - step) < 0.02, `${found.stepDecades} for ${step}`);
    assert.ok(found.stepSeDecades! > 0 && found.stepSeDecades! < 0.05);
  });

  test(`a missing layer count leaves a gap of two rungs, seed ${seed}`, () => {
    const found = measureLadder(terraces(seed, [[-9, 3000], [-9.55, 3000], [-10.65, 2000]]), () => true);
    assert.deepEqual(found.peaks.map((peak) => peak.rung), [0, 1, 3]);
    assert.ok(Math.abs(found.stepDecades! - 0.55) < 0.02);
  });
}

test('one terrace: one peak, no step', () => {
  const found = measureLadder(terraces('one', [[-10, 4000]]), () => true);
  assert.equal(found.peaks.length, 1);
  assert.equal(found.stepDecades, undefined);
  assert.ok(Math.abs(found.peaks[0]!.share - 1) < 1e-6);
});

test('nothing admitted, or nothing known: no peak', () => {
  assert.deepEqual(measureLadder(terraces('none', [[-10, 50]]), () => false), { peaks: [] });
  assert.deepEqual(measureLadder(new Float32Array(50).fill(Number.NaN), () => true), { peaks: [] });
});

test('less than one pixel in a hundred is no terrace', () => {
  const found = measureLadder(terraces('few', [[-9, 40], [-10, 5000], [-11, 3000]]), () => true);
  assert.equal(found.peaks.length, 2);
  assert.ok(Math.abs(found.stepDecades! - 1) < 0.02);
});
