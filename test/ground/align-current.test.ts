import assert from 'node:assert/strict';
import { test } from 'node:test';
import { evaluate } from '../../src/evaluate/evaluate.ts';
import { movedBack } from '../../src/ground/align-current.ts';
import { levelGround } from '../../src/ground/level-ground.ts';
import { scalarMap } from '../../src/grid/maps.ts';
import type { Channel, Sample } from '../../src/read/sample.ts';
import { seededRandom } from '../../src/stats/random.ts';
import { smeared } from '../fixtures/amplify.ts';
import { createRecipe, createSample } from '../fixtures/create-sample.ts';
import type { RecipeChanges } from '../fixtures/create-sample.ts';
import { createScene, noiseA, saturationA, threeTerraces, typicalThings } from '../fixtures/create-scene.ts';
import type { SceneSpec, Thing } from '../fixtures/create-scene.ts';

const size = 128;
const spec = (seed: string, by: { c: number; r: number } = { c: 0, r: 0 }): SceneSpec => ({
  seed, size, layersAt: (c, r) => threeTerraces(size)(c - by.c, r - by.r),
  things: typicalThings(size).map((thing): Thing => ({ ...thing, c: thing.c + by.c, r: thing.r + by.r })),
});
/** Height as drawn, current drawn again at another place. */
function displaced(seed: string, c: number, r: number): Sample {
  return createSample({ columns: size, rows: size, heightM: createScene(spec(seed)).heightM, currentA: createScene(spec(seed, { c, r })).currentA, biasV: 5.9 });
}
function ground(sample: Sample, changes: RecipeChanges = {}) {
  const recipe = createRecipe(changes);
  return levelGround(sample, recipe.ground, recipe.scan, 0.333e-9);
}

test('a current displaced against the height is found within its error and moved back by whole pixels', () => {
  for (const [c, r] of [[3, 0], [-2, 1], [1.6, -2.3], [0, 4]] as const) {
    const { current, warnings } = ground(displaced('moved', c, r));
    const shift = current!.shift!;
    assert.ok(Math.abs(shift.dxPx - c) < Math.max(0.25, 4 * shift.seXPx), `${shift.dxPx} ± ${shift.seXPx} for ${c}`);
    assert.ok(Math.abs(shift.dyPx - r) < Math.max(0.25, 4 * shift.seYPx), `${shift.dyPx} ± ${shift.seYPx} for ${r}`);
    assert.deepEqual([shift.undoneXPx, shift.undoneYPx], [Math.round(c), Math.round(r)]);
    assert.ok(warnings.some(({ code }) => code === 'current-shifted'));
    // What came from beyond the border was not measured.
    const missing = current!.log10.data.filter(Number.isNaN).length;
    assert.equal(missing, size * size - (size - Math.abs(Math.round(c))) * (size - Math.abs(Math.round(r))));
  }
});

test('moved back, the ledger is that of the scan that was not displaced', () => {
  const plain = evaluate(displaced('ledger', 0, 0), createRecipe({}));
  const sample = displaced('ledger', 3, -2);
  const back = evaluate(sample, createRecipe({}));
  const left = evaluate(sample, createRecipe({ ground: { align: false } }));
  const differing = (other: typeof plain): number => {
    let count = 0;
    for (let r = 4; r < size - 4; r++) for (let c = 4; c < size - 4; c++) if (plain.ledger.codes.data[r * size + c] !== other.ledger.codes.data[r * size + c]) count++;
    return count;
  };
  assert.equal(left.ground.current!.shift!.undoneXPx, 0);
  assert.ok(!left.warnings.some(({ code }) => code === 'current-shifted'));
  assert.ok(differing(back) < 0.25 * differing(left), `${differing(back)} against ${differing(left)}`);
});

test('maps that lie on each other, and a current without flaws, are left where they are', () => {
  for (const seed of ['a', 'b', 'c', 'd']) {
    const { current } = ground(displaced(seed, 0, 0));
    assert.deepEqual([current!.shift!.undoneXPx, current!.shift!.undoneYPx], [0, 0]);
    assert.ok(Math.abs(current!.shift!.dxPx) < 0.25 && Math.abs(current!.shift!.dyPx) < 0.25, `${current!.shift!.dxPx}, ${current!.shift!.dyPx}`);
  }
  assert.equal(ground(createScene({ seed: 'bare', size, layersAt: threeTerraces(size) }).sample).current!.shift, undefined);
});

test('moving back by whole pixels keeps values and fills from the border', () => {
  const map = Float32Array.of(1, 2, 3, 4, 5, 6);
  assert.deepEqual([...movedBack(map, 3, { undoneXPx: 1, undoneYPx: 0 }, Number.NaN)], [2, 3, Number.NaN, 5, 6, Number.NaN]);
  assert.deepEqual([...movedBack(map, 3, { undoneXPx: -1, undoneYPx: 1 }, 0)], [0, 4, 5, 0, 0, 0]);
});

test('a return scan is measured beside the forward scan: noise, lag the other way, shift, and it changes no map', () => {
  const { heightM, currentA } = createScene(spec('return'));
  const before = currentA.map((value) => (value >= Math.fround(saturationA) ? 2 * saturationA : value < 6 * noiseA ? 0 : value));
  const forward = smeared(before, size, 1.5, { noiseA, limitA: saturationA, seed: 'forward' });
  const back = smeared(createScene(spec('return', { c: -2, r: 0 })).currentA.map((value) => (value >= Math.fround(saturationA) ? 2 * saturationA : value < 6 * noiseA ? 0 : value)),
    size, 1.5, { direction: -1, noiseA: 2 * noiseA, limitA: saturationA, seed: 'back' });
  const random = seededRandom('return height');
  const alone = createSample({ columns: size, rows: size, heightM, currentA: forward, biasV: 5.9 });
  const map = (values: Float32Array) => scalarMap(alone.grid, values);
  const channels: Channel[] = [...alone.channels,
    { quantity: 'height', unit: 'm', direction: 'return', source: 'made.height.return', values: map(heightM.map((value) => value + 0.1e-9 * random.normal())) },
    { quantity: 'current', unit: 'A', direction: 'return', biasV: 5.9, source: 'made.current.return', values: map(back) }];
  const one = ground(alone);
  const both = ground({ ...alone, channels });
  assert.equal(one.returned, undefined);
  const { returned } = both;
  assert.deepEqual(both.current!.conditioned.data, one.current!.conditioned.data);
  assert.ok(Math.abs(both.current!.lagPx - 1.5) < 0.02 && Math.abs(returned!.current!.lagPx - 1.5) < 0.05, `${both.current!.lagPx}, ${returned!.current!.lagPx}`);
  assert.ok(Math.abs(returned!.current!.shift!.dxPx + 2) < 0.3, `${returned!.current!.shift!.dxPx}`);
  assert.ok(returned!.height!.noiseM > 1.2 * both.height!.noiseM && returned!.height!.noiseM < 2.2 * both.height!.noiseM);
  assert.ok(Math.abs(returned!.height!.shift!.dxPx) < 0.1);
});
