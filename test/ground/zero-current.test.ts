import assert from 'node:assert/strict';
import { test } from 'node:test';
import { evaluate } from '../../src/evaluate/evaluate.ts';
import { levelGround } from '../../src/ground/level-ground.ts';
import { quantisationStep } from '../../src/ground/quantisation.ts';
import { findZeroCurrent } from '../../src/ground/zero-current.ts';
import type { Outline } from '../../src/read/sample.ts';
import { seededRandom } from '../../src/stats/random.ts';
import { digitised, smeared } from '../fixtures/amplify.ts';
import { assertClose } from '../fixtures/assert-close.ts';
import { createRecipe, createSample } from '../fixtures/create-sample.ts';
import type { RecipeChanges } from '../fixtures/create-sample.ts';
import { createScene, noiseA, saturationA, terraceCurrentA, threeTerraces, typicalThings } from '../fixtures/create-scene.ts';

const size = 128;
/** 16 bits over ±10 nA. */
const stepA = 2e-8 / 65_536;
const busy = (seed: string, more: object = {}) => createScene({ seed, size, layersAt: threeTerraces(size), things: typicalThings(size), ...more });
function condition(sample: ReturnType<typeof createSample>, changes: RecipeChanges = {}) {
  const recipe = createRecipe(changes);
  const { current, warnings } = levelGround(sample, recipe.ground, recipe.scan, 0.333e-9);
  return { ...current!, codes: warnings.map(({ code }) => code) };
}

test('the step of digitised readings is found, with an offset and in any unit; readings on a scale without steps have none', () => {
  const random = seededRandom('steps');
  const smooth = Float32Array.from({ length: 20_000 }, () => 1e-9 * random.uniform() ** 3 + 3e-13 * random.normal());
  assert.equal(quantisationStep(smooth), undefined);
  for (const [scale, offset] of [[1, 0], [1, 7.77e-12], [1e12, 0], [1e3, -4e-9]] as const) {
    const current = digitised(smooth.map((value) => value * scale + offset), stepA * scale);
    assertClose(quantisationStep(current), stepA * scale, 1e-3, `scale ${scale}, offset ${offset}`);
  }
  assert.equal(quantisationStep(new Float32Array(100).fill(1e-9)), undefined, 'one level shows no step');
  assert.equal(quantisationStep(new Float32Array(100).fill(Number.NaN)), undefined);
});

for (const seed of ['a', 'b', 'c']) {
  test(`a current digitised to 16 bits over the rail: floor of two steps, noise of rounding, nothing invented, seed ${seed}`, () => {
    const { heightM, currentA, sample } = busy(seed, { offsetA: 1e-12 });
    const found = condition(createSample({ columns: size, rows: size, heightM, currentA: digitised(currentA, stepA), biasV: 5.9 }));
    assertClose(found.stepA, stepA, 1e-3, 'step');
    assert.ok(found.codes.includes('current-quantised') && !found.codes.includes('current-offset-assumed'));
    assert.ok(Math.abs(found.offsetA - 1e-12) <= stepA / 2, `offset ${found.offsetA}`);
    assertClose(found.offsetSeA, stepA / Math.sqrt(12), 0.05, 'error of the offset');
    assert.ok(found.noiseA >= (0.999 * stepA) / Math.sqrt(12) && found.noiseA < stepA, `noise ${found.noiseA}`);
    assert.ok(found.floorA >= 1.999 * stepA && found.floorA < 3.5 * stepA, `floor ${found.floorA}`);
    // Off the floor rounding makes at most half a step in three: 0.07 decades.
    const plain = condition(sample);
    let compared = 0;
    for (let i = 0; i < size * size; i++) {
      if (found.floor.data[i] === 1 || found.saturated.data[i] === 1 || plain.floor.data[i] === 1 || found.repaired.data[i] === 1) continue;
      assert.ok(Math.abs(found.log10.data[i]! - plain.log10.data[i]!) < 0.12, `${found.log10.data[i]} for ${plain.log10.data[i]}`);
      compared++;
    }
    assert.ok(compared > 0.8 * size * size);
  });

  test(`the same appraised: usable ground as without digitising, seed ${seed}`, () => {
    const { heightM, currentA, sample } = busy(seed);
    const coarse = createSample({ columns: size, rows: size, heightM, currentA: digitised(currentA, stepA), biasV: 5.9 });
    const [a, b] = [evaluate(sample, createRecipe({})).ledger.usable.share, evaluate(coarse, createRecipe({})).ledger.usable.share];
    assert.ok(Math.abs(a - b) < 0.002, `${b} for ${a}`);
  });
}

test('the errors of offset and floor are those of repeated maps', () => {
  const offsets: number[] = [];
  const floors: number[] = [];
  let [offsetSe, floorSe] = [0, 0];
  for (let k = 0; k < 40; k++) {
    const random = seededRandom(`repeat ${k}`);
    const values = Float32Array.from({ length: 64 * 64 }, (_, i) => (i % 64 < 12 ? 5e-13 : 1e-10 * 10 ** (0.1 * random.normal())) + noiseA * random.normal());
    const zero = findZeroCurrent(values, 64, { blocked: (i) => i % 64 < 12 });
    assert.equal(zero.from, 'blocked');
    offsets.push(zero.offset);
    floors.push(zero.noise);
    offsetSe += zero.offsetSe! / 40;
    floorSe += zero.noiseSe! / 40;
  }
  const sd = (list: number[]): number => {
    const mean = list.reduce((sum, value) => sum + value / list.length, 0);
    return Math.sqrt(list.reduce((sum, value) => sum + (value - mean) ** 2, 0) / (list.length - 1));
  };
  // A standard deviation from 40 maps scatters by 11 %.
  assertClose(offsetSe, sd(offsets), 0.4, 'offset');
  assertClose(floorSe, sd(floors), 0.4, 'noise');
});

test('insulating ground off the sample shows the offset, where outlines leave it out', () => {
  const offsetA = 3e-12;
  const random = seededRandom('beside');
  const level = terraceCurrentA(11, 5.9);
  const currentA = Float32Array.from({ length: size * size }, (_, i) => (i % size < 30 ? 0 : level * 10 ** (0.1 * random.normal())) + offsetA + noiseA * random.normal());
  const pitch = 20e-9;
  const ring = [[32 * pitch, 0], [size * pitch, 0], [size * pitch, size * pitch], [32 * pitch, size * pitch]] as const;
  const outlines: Outline[] = [{ layer: 'barrier', rings: [ring] }];
  const footprint = Uint8Array.from({ length: size * size }, (_, i) => (i % size < 32 ? 0 : 1));
  const found = condition(createSample({ columns: size, rows: size, currentA, biasV: 5.9, outlines, footprint }));
  assert.equal(found.offsetFrom, 'off the sample');
  assert.ok(Math.abs(found.offsetA - offsetA) < 4 * found.offsetSeA!, `${found.offsetA} ± ${found.offsetSeA}`);
  // A conductor beside the sample is no reference: more of the map lies below it than noise could.
  const bare = currentA.map((value, i) => (i % size < 30 ? 30 * level * 10 ** (0.05 * random.normal()) : value));
  const conducting = condition(createSample({ columns: size, rows: size, currentA: bare, biasV: 5.9, outlines, footprint }));
  assert.notEqual(conducting.offsetFrom, 'off the sample');
});

test('ground.offsetA is taken as the file has it, its sign turned with the current', () => {
  const { heightM, currentA } = busy('hand');
  for (const sign of [1, -1]) {
    const sample = createSample({ columns: size, rows: size, heightM, currentA: currentA.map((value) => sign * value), biasV: sign * 5.9 });
    const found = condition(sample, { ground: { offsetA: sign * 4e-13 } });
    assert.equal(found.offsetFrom, 'given');
    assertClose(found.offsetA, 4e-13, 1e-9);
    assert.equal(found.offsetSeA, undefined);
  }
});

test('noise that a slow amplifier has correlated along the lines still shows the offset', () => {
  const random = seededRandom('filtered');
  const white = Float32Array.from({ length: size * size }, () => 3 * noiseA * random.normal());
  const slow = smeared(white, size, 2);
  const level = terraceCurrentA(11, 5.9);
  const values = slow.map((value, i) => value + 2e-12 + (i % size < 40 ? 0 : level));
  const zero = findZeroCurrent(values, size, { blocked: (i) => i % size < 40, saturation: saturationA });
  assert.equal(zero.from, 'blocked');
  assert.ok(Math.abs(zero.offset - 2e-12) < 0.3 * noiseA, `${zero.offset}`);
});
