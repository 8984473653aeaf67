import assert from 'node:assert/strict';
import { test } from 'node:test';
import type { HeightGround } from '../../src/ground/ground.ts';
import { levelGround } from '../../src/ground/level-ground.ts';
import { firstLevels, levelHeight } from '../../src/ground/level-height.ts';
import { refineLevels } from '../../src/ground/refine-levels.ts';
import { assertClose } from '../fixtures/assert-close.ts';
import { createRecipe, createSample } from '../fixtures/create-sample.ts';
import { createScene, flipped, layerNm, threeTerraces, transposed, typicalThings } from '../fixtures/create-scene.ts';

const size = 128;

/** The height stage of a map, alone or beside a current, which then tells its terraces. */
function level(heightM: Float32Array, section: Record<string, unknown> = {}, currentA?: Float32Array): HeightGround {
  const recipe = createRecipe({ ground: section });
  const sample = createSample({ columns: size, rows: size, heightM, biasV: 5.9, ...(currentA ? { currentA } : {}) });
  return levelGround(sample, recipe.ground, recipe.scan, layerNm * 1e-9).height!;
}
const busy = (seed: string, bowNm = 2) => createScene({ seed, size, layersAt: threeTerraces(size), things: typicalThings(size), tiltNm: 10, bowNm, lineNm: 0.2 });

/** Values plus a form in u, v from 0 to 1 over the map, nanometres. */
function withForm(values: Float32Array, form: (u: number, v: number) => number): Float32Array {
  return values.map((value, i) => value + 1e-9 * form((i % size) / (size - 1), Math.floor(i / size) / (size - 1)));
}

function largestDifference(a: Float32Array, b: Float32Array): number {
  let most = 0;
  for (let i = 0; i < a.length; i++) {
    if (Number.isNaN(a[i]!) !== Number.isNaN(b[i]!)) assert.fail(`missing in one only at ${i}`);
    if (!Number.isNaN(a[i]!)) most = Math.max(most, Math.abs(a[i]! - b[i]!));
  }
  return most;
}

test('a plane is removed to float32 rounding and its peak-to-peak is told', () => {
  const plane = withForm(new Float32Array(size * size), (u, v) => 100 * u - 40 * v + 7);
  const found = level(plane, { order: 1 });
  // One float32 rounding at 107 nm is 4e-6 nm; two subtractions may double it.
  assert.ok(largestDifference(found.levelled.data, new Float32Array(size * size)) < 2e-14);
  assertClose(found.tiltM, 140e-9, 1e-5);
  assert.equal(found.repairedPixels, 0);
});

test('tilt, bow and bumps: order 2 leaves the flat ground at 0 and the bump at its height', () => {
  const inside = (i: number) => Math.hypot((i % size) - 40, Math.floor(i / size) - 90) < 9;
  const bump = new Float32Array(size * size).map((_, i) => (inside(i) ? 20e-9 : 0));
  const found = level(withForm(bump, (u, v) => 50 * u * u - 30 * u * v + 12 * v - 3), { order: 2 });
  for (let i = 0; i < bump.length; i++) assert.ok(Math.abs(found.levelled.data[i]! - (inside(i) ? 20e-9 : 0)) < 1e-12, `${i}: ${found.levelled.data[i]}`);
});

/** Straight line through the column means from `from` to `to`, read at `at`; nanometres. */
function lineAt(values: Float32Array, from: number, to: number, at: number): number {
  let sum = 0;
  let moment = 0;
  let norm = 0;
  const middle = (from + to - 1) / 2;
  for (let c = from; c < to; c++) {
    let mean = 0;
    for (let r = 0; r < size; r++) mean += (values[r * size + c]! * 1e9) / size;
    sum += mean / (to - from);
    moment += (c - middle) * mean;
    norm += (c - middle) ** 2;
  }
  return sum + (moment / norm) * (at - middle);
}

for (const seed of ['a', 'b']) {
  test(`level(map + plane) = level(map), seed ${seed}`, () => {
    const { heightM } = busy(seed);
    const tilted = withForm(heightM, (u, v) => 37 * u - 21 * v + 5);
    // Rounding of 60 nm to float32 is below 4e-6 nm; the fit carries some of it on.
    assert.ok(largestDifference(level(heightM).levelled.data, level(tilted).levelled.data) < 5e-14);
    const plain = busy(seed, 0).heightM;
    assert.ok(largestDifference(level(plain, { order: 1 }).levelled.data, level(withForm(plain, (u, v) => 37 * u - 21 * v + 5), { order: 1 }).levelled.data) < 5e-14);
  });

  test(`level(map + quadratic) = level(map) at order 2, seed ${seed}`, () => {
    const { heightM } = busy(seed);
    const bowed = withForm(heightM, (u, v) => 9 * u * u - 14 * u * v + 6 * v * v - 20 * v);
    assert.ok(largestDifference(level(heightM).levelled.data, level(bowed).levelled.data) < 5e-14);
  });

  test(`a mirrored map levels to the mirrored result, seed ${seed}`, () => {
    const { heightM } = busy(seed);
    // What counts as ground is settled on every second pixel, and these are others in the mirror: a few pixels at its limits.
    const close = 1e-11;
    assert.ok(largestDifference(flipped(level(heightM).levelled.data, size), level(flipped(heightM, size)).levelled.data) < close);
    // Line offsets and broken runs belong to the fast axis: without them rows and columns are alike.
    const still = { lines: false, repair: false };
    assert.ok(largestDifference(transposed(level(heightM, still).levelled.data, size), level(transposed(heightM, size), still).levelled.data) < close);
  });

  test(`line offsets are found on a terraced map, and the terrace's step survives, seed ${seed}`, () => {
    const edge = 84;
    const { heightM, cleanNm } = createScene({ seed, size, layersAt: (c) => (c < edge ? 11 : 12), lineNm: 0.3, tiltNm: 8 });
    const { levelled } = level(heightM);
    const rowError: number[] = [];
    for (let r = 0; r < size; r++) {
      let sum = 0;
      for (let c = 0; c < size; c++) sum += (levelled.data[r * size + c]! * 1e9 - cleanNm[r * size + c]!) / size;
      rowError.push(sum);
    }
    // White noise of 0.08 nm over 128 pixels allows 0.007 nm per line. A row's error must not follow its offset of 0.3 nm.
    const mean = rowError.reduce((sum, e) => sum + e / size, 0);
    const rms = Math.sqrt(rowError.reduce((sum, e) => sum + (e - mean) ** 2 / size, 0));
    assert.ok(rms < 0.02, `rows are off by ${rms} nm rms`);
    // The step's height as ISO 5436-1 reads it: straight lines on both sides, carried on to the edge between the two pixels.
    const step = lineAt(levelled.data, edge, edge + 12, edge - 0.5) - lineAt(levelled.data, edge - 12, edge, edge - 0.5);
    assert.ok(Math.abs(step - layerNm) < 0.02, `step ${step} nm`);
  });

  test(`a terrace along the fast axis keeps its step too, seed ${seed}`, () => {
    // A slanted border: nearby lines cross it in a few columns only, a line's mean would follow it.
    const { heightM } = createScene({ seed, size, layersAt: (c, r) => (c + 1.5 * r < 110 ? 12 : 11), lineNm: 0.3 });
    const { levelled } = level(heightM);
    const steps: number[] = [];
    for (let r = 5; r < 70; r++) {
      const edge = Math.ceil(110 - 1.5 * r);
      for (let k = 0; k < 4; k++) if (edge - 1 - k >= 0 && edge + k < size) steps.push((levelled.data[r * size + edge - 1 - k]! - levelled.data[r * size + edge + k]!) * 1e9);
    }
    const step = steps.reduce((sum, s) => sum + s / steps.length, 0);
    assert.ok(Math.abs(step - layerNm) < 0.03, `step ${step} nm over ${steps.length} pairs`);
  });

  test(`noise within 10 %, with terraces, flaws, tilt and line offsets, seed ${seed}`, () => {
    for (const noiseNm of [0.05, 0.15]) {
      const { heightM } = createScene({ seed, size, layersAt: threeTerraces(size), things: typicalThings(size), tiltNm: 10, lineNm: 0.2, noiseNm });
      assertClose(level(heightM).noiseM, noiseNm * 1e-9, 0.1, `noise ${noiseNm} nm`);
    }
  });
}

test('missing pixels stay missing without repair and do not move the rest', () => {
  const { heightM } = busy('holes');
  const holed = heightM.slice();
  const holes = [0, 5 * size + 7, 60 * size + 60, size * size - 1];
  for (const i of holes) holed[i] = Number.NaN;
  const whole = level(heightM, { repair: false }).levelled.data;
  const found = level(holed, { repair: false });
  assert.deepEqual([...found.levelled.data.keys()].filter((i) => Number.isNaN(found.levelled.data[i]!)), holes);
  assert.equal(found.repairedPixels, 0);
  for (let i = 0; i < whole.length; i++) if (!holes.includes(i)) assert.ok(Math.abs(found.levelled.data[i]! - whole[i]!) < 1e-11, `${i}`);
});

test('with repair single missing pixels are filled beside a current, a hole of 6 × 6 is not; a height alone keeps what is missing', () => {
  const { heightM, currentA } = createScene({ seed: 'hole', size, tiltNm: 5 });
  heightM[40 * size + 40] = Number.NaN;
  for (let r = 80; r < 86; r++) heightM.fill(Number.NaN, r * size + 80, r * size + 86);
  const alone = level(heightM);
  assert.ok(Number.isNaN(alone.levelled.data[40 * size + 40]!) && alone.repairedPixels === 0);
  const found = level(heightM, {}, currentA);
  assert.ok(Math.abs(found.levelled.data[40 * size + 40]!) < 4 * 0.08e-9);
  assert.equal(found.repaired.data[40 * size + 40], 1);
  assert.ok(Number.isNaN(found.levelled.data[82 * size + 82]!));
  assert.equal(found.repaired.data[82 * size + 82], 0);
  assert.equal(found.repairedPixels, found.repaired.data.reduce((sum, mark) => sum + mark, 0));
});

test('broken runs of one and two lines are repaired, a fold across the lines is not touched', () => {
  const { heightM, cleanNm } = createScene({
    seed: 'runs', size, things: [{ kind: 'ridge', c: 100, r: 64, angle: Math.PI / 2, lengthPx: 90, sigmaPx: 2, peakNm: 8 }],
    broken: [{ r: 30, lines: 1, from: 10, to: 60, current: false }, { r: 70, lines: 2, from: 20, to: 70, current: false }],
  });
  const { levelled, repaired } = level(heightM);
  for (const [r, from, to] of [[30, 10, 60], [70, 20, 70], [71, 20, 70]] as const) {
    for (let c = from; c < to; c++) {
      assert.equal(repaired.data[r * size + c], 1, `row ${r} column ${c}`);
      assert.ok(Math.abs(levelled.data[r * size + c]!) < 0.5e-9);
    }
  }
  assert.ok(Math.abs(levelled.data[64 * size + 100]! * 1e9 - cleanNm[64 * size + 100]!) < 0.5);
  assert.equal(repaired.data[64 * size + 100], 0);
});

test('two broken lines beside each other that stand off by different amounts, and broken lines at the border, are repaired', () => {
  const pairs = [[60, -5], [61, 4], [90, -3], [91, -9]] as const;
  for (const runs of [pairs, [[0, -5]], [[1, 4]], [[size - 1, -5]], [[size - 2, 4]]] as const) {
    for (const withCurrent of [true, false]) {
      const { heightM, currentA } = createScene({ seed: 'beside', size, layersAt: threeTerraces(size), tiltNm: 10, lineNm: 0.2 });
      const whole = level(heightM, {}, withCurrent ? currentA : undefined).levelled.data;
      const broken = heightM.slice();
      for (const [r, off] of runs) for (let c = 30; c < 95; c++) broken[r * size + c]! += off * 1e-9;
      const { levelled, repaired } = level(broken, {}, withCurrent ? currentA : undefined);
      for (const [r, off] of runs) {
        for (let c = 30; c < 95; c++) {
          const i = r * size + c;
          assert.equal(repaired.data[i], 1, `row ${r} by ${off} nm, column ${c}`);
          // What is put there is measured beside it: noise, and a step of the barrier where a border runs between.
          assert.ok(Math.abs(levelled.data[i]! - whole[i]!) < 0.9e-9, `row ${r} by ${off} nm, column ${c}: ${levelled.data[i]! - whole[i]!}`);
        }
      }
      const elsewhere = repaired.data.reduce((sum, mark) => sum + mark, 0) - runs.length * 65;
      assert.ok(elsewhere <= 4 * runs.length, `${elsewhere} pixels repaired elsewhere`);
    }
  }
});

test('a single spike is repaired', () => {
  const { heightM } = createScene({ seed: 'spike', size });
  heightM[50 * size + 50]! += 4e-9;
  const found = level(heightM);
  assert.ok(Math.abs(found.levelled.data[50 * size + 50]!) < 1e-9, `${found.levelled.data[50 * size + 50]}`);
});

test('a footprint of one row is levelled like any other', () => {
  const size = 256;
  const height = Float64Array.from({ length: size * size }, (_, i) => 1e-9 * (i % size) * 0.05);
  for (const row of [100, 101]) {
    const inside = new Uint8Array(size * size).fill(1, row * size, (row + 1) * size);
    const sample = createSample({ columns: size, rows: size, heightM: height });
    const recipe = createRecipe({});
    const first = firstLevels(sample.channels[0]!.values, sample.grid, recipe.ground, inside);
    const levels = refineLevels(sample.channels[0]!.values.data, sample.grid, recipe.ground, { start: first, inside, layerM: layerNm * 1e-9 });
    const { levelled } = levelHeight(sample.channels[0]!.values, sample.grid, recipe.ground, levels, inside);
    for (let c = 0; c < size; c++) assert.ok(Math.abs(levelled.data[row * size + c]!) < 1e-11, `row ${row}, column ${c}: ${levelled.data[row * size + c]}`);
  }
});
