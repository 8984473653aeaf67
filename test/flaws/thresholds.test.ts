import assert from 'node:assert/strict';
import { test } from 'node:test';
import { evaluate } from '../../src/evaluate/evaluate.ts';
import { thresholdsOf } from '../../src/flaws/thresholds.ts';
import { levelGround } from '../../src/ground/level-ground.ts';
import { verdictOf } from '../../src/report/verdict.ts';
import { seededRandom } from '../../src/stats/random.ts';
import { assertClose } from '../fixtures/assert-close.ts';
import { createRecipe, createSample } from '../fixtures/create-sample.ts';

const size = 96;
/** Even ground with 0.2 nm of noise, and a current with 0.05 decades. */
function noisy(seed: string) {
  const random = seededRandom(seed);
  const heightM = Float32Array.from({ length: size * size }, () => 0.2e-9 * random.normal());
  const currentA = Float32Array.from({ length: size * size }, (_, i) => (i % 37 === 0 && Math.floor(i / size) % 31 === 0 ? 0 : 1e-10 * 10 ** (0.05 * random.normal())));
  return createSample({ columns: size, rows: size, heightM, currentA });
}
const limits = (flaws: Record<string, unknown>, layer: { decades: number; from?: 'map' | 'model' | 'assumed' } = { decades: 0.8, from: 'map' }) => {
  const recipe = createRecipe({ flaws });
  return thresholdsOf(levelGround(noisy('limits'), recipe.ground, recipe.scan, 0.333e-9), recipe.flaws, layer);
};

test('the larger of the stated height and the stated multiple of the noise rules', () => {
  const byNoise = limits({ heightNm: 0.8, heightNoise: 6 });
  assertClose(byNoise.noiseM!, 0.2e-9, 0.05);
  assert.equal(byNoise.ruledBy, 'noise');
  assertClose(byNoise.startM!, 6 * byNoise.noiseM!, 1e-12);
  const byHeight = limits({ heightNm: 0.8, heightNoise: 3 });
  assert.equal(byHeight.ruledBy, 'height');
  assertClose(byHeight.startM!, 0.8e-9, 1e-12);
  assertClose(limits({ heightNm: 0.1, heightNoise: 0 }).startM!, 0.1e-9, 1e-12);
});

test('the drop comes with the worth of a layer and the noise of the log current', () => {
  const found = limits({ dropDecades: 0.4 });
  assert.equal(found.dropDecades, 0.4);
  assert.equal(found.layerDecades, 0.8);
  assert.equal(found.layerFrom, 'map');
  assertClose(found.noiseDecades!, 0.05, 0.05);
});

test('verdict.json says what was used', () => {
  const recipe = createRecipe({ flaws: { heightNm: 0.8 } });
  const appraisal = evaluate(noisy('verdict'), recipe);
  const { thresholds } = verdictOf(appraisal, { name: 'test', version: '0' }).flaws;
  const { startM, noiseM, noiseDecades, layerDecades } = appraisal.flaws.thresholds!;
  assert.equal(thresholds!.heightRuledBy, 'noise');
  assertClose(thresholds!.heightNm!, startM! * 1e9, 1e-3);
  assertClose(thresholds!.heightOverNoise!, startM! / noiseM!, 1e-3);
  assertClose(thresholds!.dropLayers!, recipe.flaws.dropDecades / layerDecades!, 1e-3);
  assertClose(thresholds!.dropOverNoise!, recipe.flaws.dropDecades / noiseDecades!, 1e-3);
  assert.ok(appraisal.warnings.some(({ code }) => code === 'threshold-raised'));
});
