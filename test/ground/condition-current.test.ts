import assert from 'node:assert/strict';
import { test } from 'node:test';
import { levelGround } from '../../src/ground/level-ground.ts';
import type { CurrentGround } from '../../src/ground/ground.ts';
import { Problem } from '../../src/problems/problem.ts';
import type { Sample } from '../../src/read/sample.ts';
import { seededRandom } from '../../src/stats/random.ts';
import { assertClose } from '../fixtures/assert-close.ts';
import { createRecipe, createSample } from '../fixtures/create-sample.ts';
import type { RecipeChanges } from '../fixtures/create-sample.ts';
import { createScene, noiseA, saturationA, terraceCurrentA, threeTerraces, typicalThings } from '../fixtures/create-scene.ts';
import { evaluate } from '../../src/evaluate/evaluate.ts';

const size = 128;
function condition(sample: Sample, changes: RecipeChanges = {}): CurrentGround & { codes: string[] } {
  const recipe = createRecipe(changes);
  const ground = levelGround(sample, recipe.ground, recipe.scan, 0.333e-9);
  return { ...ground.current!, codes: ground.warnings.map(({ code }) => code) };
}
const busy = (seed: string, more: object = {}) => createScene({ seed, size, layersAt: threeTerraces(size), things: typicalThings(size), tiltNm: 5, ...more });

for (const seed of ['a', 'b', 'c']) {
  test(`offset and noise are read from spots that a tall flaw blocks, seed ${seed}`, () => {
    for (const offsetA of [0, 4e-12, -2e-12]) {
      const { sample, currentA } = busy(seed, { offsetA });
      const found = condition(sample);
      // About 450 blocked pixels: the median of them scatters by 1.25 σ/√450 = 0.06 σ.
      assert.ok(Math.abs(found.offsetA - offsetA) < 0.25 * noiseA, `offset ${found.offsetA} for ${offsetA}`);
      assertClose(found.noiseA, noiseA, 0.3, 'noise');
      assertClose(found.floorA, 3 * found.noiseA, 1e-6, 'floor');
      assert.ok(!found.codes.includes('current-offset-assumed'));
      assertClose(found.offsetFree.data[0], currentA[0]! - found.offsetA, 1e-6);
      assertClose(found.saturationA, saturationA - found.offsetA, 1e-3, 'saturation less offset');
    }
  });

  test(`wear of 0.4 decades is found within 0.1 and undone, seed ${seed}`, () => {
    const { sample, layers, things } = busy(seed, { wearDecades: 0.4 });
    const found = condition(sample);
    assert.ok(Math.abs(found.wearDecades - 0.4) < 0.1, `${found.wearDecades}`);
    assert.ok(found.codes.includes('current-wear'));
    const wanted = Math.log10(terraceCurrentA(11, 5.9));
    const rowMean = (r: number): number => {
      const row = [...Array(size).keys()].map((c) => r * size + c).filter((i) => layers[i] === 11 && things[i] === '').map((i) => found.log10.data[i]!);
      return row.reduce((sum, value) => sum + value / row.length, 0);
    };
    for (const r of [2, 64, 125]) assert.ok(Math.abs(rowMean(r) - wanted) < 0.1, `row ${r}: ${rowMean(r)} for ${wanted}`);
  });

  test(`no wear is claimed on a map without it, seed ${seed}`, () => {
    const found = condition(busy(seed).sample);
    assert.equal(found.wearDecades, 0);
    assert.ok(Math.abs(found.driftDecades!) < 0.05, `${found.driftDecades}`);
    assert.ok(!found.codes.includes('current-wear'));
    for (let i = 0; i < size * size; i++) if (found.repaired.data[i] === 0) assert.equal(found.conditioned.data[i], found.offsetFree.data[i]);
  });

  test(`a real gain, terraces along the slow axis and wear against the slow axis are told apart, seed ${seed}`, () => {
    // Terraces that follow the slow axis: 10, 11 and 12 layers from top to bottom. Nothing wears.
    const stripes = createScene({ seed, size, layersAt: (_, r) => (r < 40 ? 10 : r < 90 ? 11 : 12) });
    const structure = condition(stripes.sample);
    assert.equal(structure.wearDecades, 0);
    assert.ok(Math.abs(structure.driftDecades!) < 0.1, `structure taken for ${structure.driftDecades} decades of drift`);
    const worn = busy(seed, { wearDecades: 0.4 });
    const upwards = condition({ ...worn.sample, frame: { ...worn.sample.frame, slowUp: true } });
    // Scanned upwards, the same map shows a gain, which a tip does not do by wearing.
    assert.equal(upwards.wearDecades, 0);
    assert.ok(Math.abs(upwards.driftDecades! + 0.4) < 0.1, `${upwards.driftDecades}`);
    assert.ok(!upwards.codes.includes('current-wear'));
    assert.deepEqual(upwards.conditioned.data, upwards.offsetFree.data);
  });
}

test('ground.wear off: nothing is undone', () => {
  const { sample } = busy('off', { wearDecades: 0.4 });
  const found = condition(sample, { ground: { wear: false } });
  assert.deepEqual(found.conditioned.data, found.offsetFree.data);
  assert.ok(!found.codes.includes('current-wear'));
});

test('saturated pixels are marked, counted and held at the limit; nothing saturates without a plateau', () => {
  const { sample, things, currentA } = busy('sat');
  const found = condition(sample);
  const clipped = [...currentA.keys()].filter((i) => currentA[i]! >= Math.fround(saturationA));
  assert.ok(clipped.length >= 6);
  assert.deepEqual([...found.saturated.data.keys()].filter((i) => found.saturated.data[i] === 1), clipped);
  assert.equal(found.saturatedPixels, clipped.length);
  for (const i of clipped) {
    assert.equal(things[i], 'pinhole');
    assertClose(found.log10.data[i], Math.log10(saturationA), 1e-4);
  }
  const none = condition(createScene({ seed: 'none', size, layersAt: threeTerraces(size) }).sample);
  assert.equal(none.saturationA, undefined);
  assert.equal(none.saturatedPixels, 0);
});

test('scan.saturationA and scan.floorA win over what the map shows', () => {
  const { sample } = busy('given');
  const found = condition(sample, { scan: { saturationA: 1e-9, floorA: 2e-12 } });
  assertClose(found.floorA, 2e-12, 1e-9);
  assertClose(found.saturationA, 1e-9 - found.offsetA, 1e-6);
  for (let i = 0; i < size * size; i++) {
    if (found.repaired.data[i] === 1) continue;
    assert.equal(found.saturated.data[i] === 1, found.offsetFree.data[i]! >= (1e-9 * (1 - 1e-4) - found.offsetA), `${i}`);
    assert.equal(found.floor.data[i] === 1, found.offsetFree.data[i]! <= 2e-12 * (1 + 1e-5), `${i}`);
  }
});

test('pixels of the wrong sign are floor, at the floor in the logs', () => {
  const { sample, currentA } = createScene({ seed: 'sign', size, things: typicalThings(size) });
  const wrong = [3, 777, 64 * size + 5];
  const turned = currentA.slice();
  for (const i of wrong) turned[i] = -5e-10;
  const found = condition(createSample({ columns: size, rows: size, heightM: sample.channels[0]!.values.data, currentA: turned, biasV: 5.9 }), { ground: { repair: false } });
  for (const i of wrong) {
    assert.equal(found.floor.data[i], 1);
    assertClose(found.log10.data[i], Math.log10(found.floorA), 1e-5);
    assert.ok(found.offsetFree.data[i]! < 0);
  }
  assert.equal(found.floor.data[100], 0);
});

test('a negative bias with negated current conditions to the same map', () => {
  const { heightM, currentA } = busy('mirror');
  const a = condition(createSample({ columns: size, rows: size, heightM, currentA, biasV: 5.9 }));
  const b = condition(createSample({ columns: size, rows: size, heightM, currentA: currentA.map((value) => -value), biasV: -5.9 }));
  assert.deepEqual(a.log10.data, b.log10.data);
  assert.deepEqual(a.conditioned.data, b.conditioned.data);
  assert.equal(b.biasV, -5.9);
});

test('missing current stays missing without agreeing neighbours, and counts as neither floor nor saturated', () => {
  const { heightM, currentA } = busy('missing');
  for (let r = 100; r < 106; r++) currentA.fill(Number.NaN, r * size + 20, r * size + 26);
  const found = condition(createSample({ columns: size, rows: size, heightM, currentA, biasV: 5.9 }));
  const middle = 103 * size + 23;
  assert.ok(Number.isNaN(found.log10.data[middle]!) && Number.isNaN(found.conditioned.data[middle]!));
  assert.deepEqual([found.floor.data[middle], found.saturated.data[middle], found.repaired.data[middle]], [0, 0, 0]);
});

test('a broken run of the current between agreeing neighbours is repaired, and only with ground.repair', () => {
  const spec = { seed: 'run', size, broken: [{ r: 50, lines: 2 as const, from: 30, to: 90, current: true }], things: [{ kind: 'bubble' as const, c: 30, r: 100, radiusPx: 9, peakNm: 20 }] };
  const { sample } = createScene(spec);
  const found = condition(sample);
  const wanted = Math.log10(terraceCurrentA(11, 5.9));
  for (let c = 30; c < 90; c++) {
    for (const i of [50 * size + c, 51 * size + c]) {
      assert.equal(found.repaired.data[i], 1);
      assert.ok(Math.abs(found.log10.data[i]! - wanted) < 0.3, `${found.log10.data[i]}`);
      assert.equal(found.floor.data[i], 0);
    }
  }
  assert.equal(found.repairedPixels, found.repaired.data.reduce((sum, mark) => sum + mark, 0));
  assert.equal(condition(sample, { ground: { repair: false } }).repairedPixels, 0);
});

test('without any spot free of current offset 0 is assumed and said', () => {
  const { currentA } = createScene({ seed: 'even', size, layersAt: threeTerraces(size) });
  const found = condition(createSample({ columns: size, rows: size, currentA, biasV: 5.9 }));
  assert.equal(found.offsetA, 0);
  assert.ok(found.codes.includes('current-offset-assumed'));
});

test('an even terrace whose contact scatters from pixel to pixel is no reading at zero current', () => {
  for (const heightM of [undefined, new Float32Array(size * size)]) {
    const { currentA } = createScene({ seed: 'even', size, layersAt: () => 10 });
    const found = condition(createSample({ columns: size, rows: size, currentA, biasV: 5.9, ...(heightM ? { heightM } : {}) }));
    assert.equal(found.offsetA, 0);
    assert.ok(found.codes.includes('current-offset-assumed'));
  }
});

test('a map at the limit nearly everywhere is refused with its file and share', () => {
  const random = seededRandom('full');
  const currentA = Float64Array.from({ length: size * size }, (_, i) => (i < 40 ? 1e-9 * (1 + 0.1 * random.uniform()) : 1e-8));
  assert.throws(
    () => condition(createSample({ columns: size, rows: size, currentA })),
    (error) => error instanceof Problem && error.code === 'current-saturated' && error.message.startsWith('made.current: 99.8 %'),
  );
});

test('amperes without a bias: said once, by the stage that misses it', () => {
  const sample = createSample({ columns: 32, rows: 32, currentA: createScene({ seed: 'nobias', size: 32 }).currentA, biasV: 'none' });
  assert.equal(condition(sample).biasV, undefined);
  assert.equal(evaluate(sample, createRecipe({})).warnings.filter(({ code }) => code === 'bias-missing').length, 1);
});

test('relative units: no remark about a bias, the unit is kept', () => {
  const found = condition(createSample({ columns: 32, rows: 32, currentA: createScene({ seed: 'rel', size: 32 }).currentA, unit: 'relative', biasV: 'none' }));
  assert.equal(found.unit, 'relative');
  assert.ok(!found.codes.includes('bias-missing'));
});

test('wear survives a contact that scatters by 0.1 decade from pixel to pixel', () => {
  const random = seededRandom('scattered wear');
  const rows = 256;
  for (const wear of [0.3, 0.8, 1.2]) {
    const level = terraceCurrentA(10, 5.9);
    const currentA = Float64Array.from({ length: rows * rows }, (_, i) => level * 10 ** (0.1 * random.normal() - (wear * ((i / rows) | 0)) / (rows - 1)));
    const found = condition(createSample({ columns: rows, rows, currentA }));
    assert.ok(Math.abs(found.wearDecades - wear) < 0.1, `${found.wearDecades} for ${wear}`);
  }
});

test('a run filled from saturated neighbours is saturated, not one layer thicker', () => {
  const random = seededRandom('saturated run');
  const currentA = Float64Array.from({ length: size * size }, (_, i) => {
    const [r, c] = [Math.floor(i / size), i % size];
    if (c >= 64) return terraceCurrentA(12, 5.9) * 10 ** (0.02 * random.normal());
    return r === 50 && c > 10 && c < 40 ? 0 : saturationA;
  });
  const found = condition(createSample({ columns: size, rows: size, currentA }));
  for (let c = 11; c < 40; c++) assert.deepEqual([found.repaired.data[50 * size + c], found.saturated.data[50 * size + c]], [1, 1], `column ${c}`);
});

test('what gains current along a line is no broken run: it may be a short', () => {
  const random = seededRandom('bright run');
  const level = terraceCurrentA(12, 5.9);
  const currentA = Float64Array.from({ length: size * size }, (_, i) => {
    const [r, c] = [Math.floor(i / size), i % size];
    return r === 60 && c >= 30 && c < 50 ? 50 * level : level * 10 ** (0.02 * random.normal());
  });
  const found = condition(createSample({ columns: size, rows: size, currentA }));
  assert.equal(found.repairedPixels, 0);
});

test('a current opposite to the bias nearly everywhere is an inverting amplifier: turned, and said', () => {
  const scene = createScene({ seed: 'inverted', size, layersAt: threeTerraces(size), things: typicalThings(size) });
  const upright = condition(scene.sample);
  const inverted = condition(createSample({ columns: size, rows: size, currentA: scene.currentA.map((value) => -value), biasV: 5.9 }));
  assert.ok(inverted.codes.includes('current-inverted') && !upright.codes.includes('current-inverted'));
  assert.equal(inverted.offsetFree.data.filter((value) => value > 1e-11).length, upright.offsetFree.data.filter((value) => value > 1e-11).length);
});

test('an even terrace beside saturated ground is not taken for zero current', () => {
  const random = seededRandom('bare injector');
  const level = terraceCurrentA(11, 5.9);
  for (const scatter of [0.05, 0.15, 0.3]) {
    const currentA = Float64Array.from({ length: size * size }, (_, i) => (i % size < 26 ? saturationA : level * 10 ** (scatter * random.normal())));
    const found = condition(createSample({ columns: size, rows: size, currentA }));
    assert.equal(found.offsetA, 0, `scatter ${scatter}: offset ${found.offsetA}`);
  }
});
