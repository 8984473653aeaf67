import assert from 'node:assert/strict';
import { test } from 'node:test';
import { anchorOf, layersAt } from '../../src/barrier/anchor.ts';
import { assertClose } from '../fixtures/assert-close.ts';
import { createRecipe } from '../fixtures/create-sample.ts';
import type { RecipeChanges } from '../fixtures/create-sample.ts';
import { terraceCurrentA } from '../fixtures/create-scene.ts';

const anchor = (barrier: RecipeChanges[string], offsetV = 0, scanV = 5.9) => anchorOf(createRecipe({ barrier }).barrier, { offsetV, targetAPerM2: 1e3 }, scanV)!;

for (const barrier of [{}, { tipAreaNm2: 30 }, { referenceLayers: 9 }, { referenceLayers: 13, tipAreaNm2: 5 }, { model: 'fowler-nordheim' }, { referenceLayers: 11, heightEv: 2.2 }]) {
  test(`the proposed bias gives the target density: ${JSON.stringify(barrier)}`, () => {
    for (const scanV of [5.9, -5.9]) for (const offsetV of [0, 0.7, -0.4]) for (const target of [100, 1e3, 2e4]) {
      const a = anchor(barrier, offsetV, scanV);
      const currentA = 1.13 * terraceCurrentA(11, 5.9);
      const biasV = a.proposeBias(currentA, target);
      assert.equal(Math.sign(biasV), Math.sign(scanV));
      assertClose(a.density(currentA, biasV)!.median, target, 1e-6, `${scanV} V, offset ${offsetV} V`);
    }
  });
}

test('nothing is proposed where the offset alone would have to drive the device', () => {
  assert.ok(Number.isNaN(anchor({}, -10).proposeBias(terraceCurrentA(11, 5.9), 1e3)));
});

test('no density without a current: at 0 V, with nothing left across the barrier, outside the model', () => {
  const currentA = terraceCurrentA(11, 5.9);
  assert.equal(anchor({}).density(currentA, 0), undefined);
  assert.equal(anchor({}, -1).density(currentA, 0), undefined);
  assert.equal(anchor({}, 2).density(currentA, 1), undefined);
  assert.equal(anchor({ model: 'simmons' }, 0, 2).density(1e-12, 4), undefined);
  assert.ok(anchor({}, 2).density(currentA, 6)!.median > 0);
});

test('whole layers never fall below one, nor beyond a byte', () => {
  assert.deepEqual([layersAt(11, 1), layersAt(2, -5), layersAt(1, -1), layersAt(200, 120)], [12, 1, 1, 255]);
});
