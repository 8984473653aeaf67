import assert from 'node:assert/strict';
import { test } from 'node:test';
import type { Appraisal } from '../../src/evaluate/appraisal.ts';
import { evaluate, stageNames } from '../../src/evaluate/evaluate.ts';
import { StageCache } from '../../src/evaluate/stage-cache.ts';
import { seededRandom } from '../../src/stats/random.ts';
import { createRecipe, createSample } from '../fixtures/create-sample.ts';
import type { RecipeChanges } from '../fixtures/create-sample.ts';
import { createScene, threeTerraces, typicalThings } from '../fixtures/create-scene.ts';
import { randomRecipe } from '../fixtures/random-recipe.ts';

const size = 96;
const base: RecipeChanges = { stack: { biasV: 4 }, barrier: { referenceLayers: 11 } };
const scene = (seed: string) => createScene({ seed, size, layersAt: threeTerraces(size), things: typicalThings(size), tiltNm: 10, lineNm: 0.2, wearDecades: 0.1, broken: [{ r: 70, lines: 1, from: 10, to: 60, current: true }] });

/** A cache that notes which stages were computed. */
class CountingCache extends StageCache {
  readonly computed: string[] = [];

  override take<T>(key: string, compute: () => T): T {
    return super.take(key, () => {
      // The key ends in the last stage it holds.
      this.computed.push([...key.matchAll(/\["(ground|flaws|barrier|sheet|ledger)",/g)].pop()![1]!);
      return compute();
    });
  }
}

/** Everything but the timings. */
function withoutTimings(appraisal: Appraisal): object {
  const { timings: _, ...rest } = appraisal;
  return rest;
}

for (const seed of ['a', 'b']) {
  test(`with a cache as without, to the bit, seed ${seed}`, () => {
    const { sample } = scene(seed);
    const cache = new StageCache(1e9);
    const random = seededRandom(seed);
    const recipes = [createRecipe(base), createRecipe({ ...base, band: { factor: 10 } }), randomRecipe(random), createRecipe({ ...base, flaws: { heightNm: 2 } }), createRecipe(base)];
    for (const recipe of recipes) {
      const cached = evaluate(sample, recipe, { cache });
      const plain = evaluate(sample, recipe);
      assert.deepEqual(cached.ledger.codes.data, plain.ledger.codes.data);
      assert.deepEqual(withoutTimings(cached), withoutTimings(plain));
    }
  });
}

const { sample } = scene('cache');

test('moving band.factor computes neither ground nor flaws again: the same objects come back', () => {
  const cache = new CountingCache(1e9);
  const first = evaluate(sample, createRecipe(base), { cache });
  assert.deepEqual(cache.computed, [...stageNames]);
  cache.computed.length = 0;
  const second = evaluate(sample, createRecipe({ ...base, band: { factor: 10 } }), { cache });
  assert.ok(!cache.computed.includes('ground') && !cache.computed.includes('flaws'), cache.computed.join());
  assert.ok(cache.computed.includes('ledger'));
  assert.equal(second.ground, first.ground);
  assert.equal(second.flaws, first.flaws);
  assert.notEqual(second.ledger, first.ledger);
  cache.computed.length = 0;
  const third = evaluate(sample, createRecipe(base), { cache });
  assert.deepEqual(cache.computed, []);
  for (const part of ['ground', 'flaws', 'barrier', 'sheet', 'ledger'] as const) assert.equal(third[part], first[part]);
});

for (const [changes, from] of [
  [{ ground: { order: 1 } }, 'ground'], [{ scan: { floorA: 1e-12 } }, 'ground'], [{ flaws: { heightNm: 1 } }, 'flaws'], [{ band: { shortMaxUm2: 0.05 } }, 'flaws'],
  [{ band: { terraceMinUm2: 0.5 } }, 'flaws'], [{ stack: { biasV: 3 } }, 'barrier'], [{ band: { minNaPerUm2: 1 } }, 'barrier'],
] as const) {
  test(`a change of ${JSON.stringify(changes)} computes from ${from} on`, () => {
    const cache = new CountingCache(1e9);
    evaluate(sample, createRecipe(base), { cache });
    cache.computed.length = 0;
    evaluate(sample, createRecipe({ ...base, ...changes }), { cache });
    const first = stageNames.indexOf(from);
    assert.deepEqual(cache.computed, stageNames.slice(first));
  });
}

for (const [name, changes] of [
  ['layerNm', { barrier: { referenceLayers: 11, layerNm: 0.4 } }], ['referenceLayers', { barrier: { referenceLayers: 9 } }], ['rim', { band: { rimUm: 0.3 } }],
  ['stray', { band: { strayMinUm2: 9 } }], ['tip area', { barrier: { referenceLayers: 11, tipAreaNm2: 200 } }], ['sheet', { stack: { biasV: 4, emitterSheetOhm: 1e9 } }], ['offset', { stack: { biasV: 4, offsetV: 1 } }],
] as const) {
  test(`no stale result after a change of ${name}`, () => {
    const cache = new StageCache(1e9);
    evaluate(sample, createRecipe(base), { cache });
    const recipe = createRecipe({ ...base, ...changes });
    assert.deepEqual(withoutTimings(evaluate(sample, recipe, { cache })), withoutTimings(evaluate(sample, recipe)));
  });
}

test('other bytes under the same name are another sample', () => {
  const cache = new StageCache(1e9);
  const recipe = createRecipe(base);
  evaluate(sample, recipe, { cache });
  const other = scene('other').sample;
  assert.deepEqual(evaluate(other, recipe, { cache }).ledger.codes.data, evaluate(other, recipe).ledger.codes.data);
});

test('a cache bounded in bytes stays bounded and right', () => {
  const limit = 1.1e6;
  const cache = new StageCache(limit);
  let most = 0;
  for (let k = 0; k < 5; k++) {
    const recipe = createRecipe({ ...base, ground: { order: 1 + (k % 3) }, band: { factor: 2 + k } });
    evaluate(sample, recipe, { cache });
    assert.ok(cache.bytes <= limit, `${cache.bytes}`);
    most = Math.max(most, cache.bytes);
  }
  assert.ok(most > 0.3 * limit, 'something was kept');
  const recipe = createRecipe({ ...base, ground: { order: 1 }, band: { factor: 2 } });
  assert.deepEqual(withoutTimings(evaluate(sample, recipe, { cache })), withoutTimings(evaluate(sample, recipe)));
});

test('stages are announced in order; throwing stops between stages and leaves the cache right', () => {
  const seen: string[] = [];
  evaluate(sample, createRecipe(base), { onStage: (stage) => seen.push(stage) });
  assert.deepEqual(seen, ['ground', 'flaws', 'barrier', 'sheet', 'ledger']);
  const cache = new CountingCache(1e9);
  const stop = new Error('stop');
  assert.throws(() => evaluate(sample, createRecipe(base), { cache, onStage: (stage) => { if (stage === 'barrier') throw stop; } }), (error) => error === stop);
  assert.deepEqual(cache.computed, ['ground', 'flaws']);
  evaluate(sample, createRecipe(base), { cache });
  assert.deepEqual(cache.computed, ['ground', 'flaws', 'barrier', 'sheet', 'ledger']);
});

test('timings: one per stage, by the clock given', () => {
  let clock = 0;
  const { timings } = evaluate(sample, createRecipe(base), { now: () => (clock += 5) });
  assert.deepEqual(timings, { ground: 5, flaws: 5, barrier: 5, sheet: 5, ledger: 5 });
});

test('neither the sample nor the recipe is changed', () => {
  const { heightM, currentA, sample: own } = scene('frozen');
  const recipe = createRecipe(base);
  const text = JSON.stringify(recipe);
  evaluate(own, recipe);
  assert.equal(JSON.stringify(recipe), text);
  assert.deepEqual(own.channels[0]!.values.data, heightM);
  assert.deepEqual(own.channels[1]!.values.data, currentA);
  assert.ok(own.footprint.data.every((inside) => inside === 1));
});

test('warnings of all stages come in the order of the chain', () => {
  const appraisal = evaluate(sample, createRecipe(base));
  assert.deepEqual(appraisal.warnings, [...sample.warnings, ...appraisal.ground.warnings, ...appraisal.flaws.warnings, ...appraisal.barrier!.warnings, ...appraisal.sheet!.warnings, ...appraisal.ledger.warnings]);
  assert.ok(appraisal.warnings.every(({ message }) => message.endsWith('.')));
  assert.equal(createSample({ columns: 2, rows: 2, heightM: [0, 0, 0, 0] }).warnings.length, 0);
});
