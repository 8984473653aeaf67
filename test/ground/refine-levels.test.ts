/** Levelling through the whole stage, and its core on maps without noise. */
import assert from 'node:assert/strict';
import { test } from 'node:test';
import { scalarMap } from '../../src/grid/maps.ts';
import type { Grid } from '../../src/grid/maps.ts';
import { formSurface } from '../../src/ground/form.ts';
import type { HeightGround } from '../../src/ground/ground.ts';
import { levelGround } from '../../src/ground/level-ground.ts';
import { firstLevels } from '../../src/ground/level-height.ts';
import { refineLevels } from '../../src/ground/refine-levels.ts';
import { seededRandom } from '../../src/stats/random.ts';
import { createRecipe, createSample } from '../fixtures/create-sample.ts';
import { createScene, layerNm, threeTerraces, typicalThings } from '../fixtures/create-scene.ts';
import type { Scene } from '../fixtures/create-scene.ts';

const size = 128;
const layerM = layerNm * 1e-9;

function level(heightM: Float32Array, currentA: Float32Array | undefined, section: Record<string, unknown> = {}): HeightGround {
  const recipe = createRecipe({ ground: section });
  return levelGround(createSample({ columns: size, rows: size, heightM, biasV: 5.9, ...(currentA ? { currentA } : {}) }), recipe.ground, recipe.scan, layerM).height!;
}

/** Nearly along the fast axis: no line crosses more than two borders, and on most lines one terrace is all there is. */
const stripes = (c: number, r: number): number => (r + 0.3 * (c - 64) < 40 ? 10 : r + 0.3 * (c - 64) < 90 ? 11 : 12);
const layouts = { 'three terraces': threeTerraces(size), stripes, 'one terrace': () => 11 } as const;
const solid = typicalThings(size).filter((thing) => thing.kind !== 'residue');

function largestDifference(a: Float32Array, b: Float32Array): number {
  let most = 0;
  for (let i = 0; i < a.length; i++) {
    if (Number.isNaN(a[i]!) !== Number.isNaN(b[i]!)) assert.fail(`missing in one only at ${i}`);
    if (!Number.isNaN(a[i]!)) most = Math.max(most, Math.abs(a[i]! - b[i]!));
  }
  return most;
}

/** Median error of each terrace's levelled height, nm, against that of 11 layers. */
function terraceErrors(scene: Scene, levelled: Float32Array): Map<number, number> {
  const by = new Map<number, number[]>();
  for (let i = 0; i < levelled.length; i++) {
    if (scene.things[i] !== '') continue;
    const list = by.get(scene.layers[i]!) ?? [];
    list.push(levelled[i]! * 1e9 - scene.cleanNm[i]!);
    by.set(scene.layers[i]!, list);
  }
  const median = (list: number[]): number => list.sort((p, q) => p - q)[list.length >> 1]!;
  const own = median(by.get(11)!);
  return new Map([...by].map(([layers, list]) => [layers, median(list) - own]));
}

for (const [name, layersAt] of Object.entries(layouts)) {
  const scene = createScene({ seed: name, size, layersAt, things: solid, tiltNm: 10, bowNm: 2, lineNm: 0.2 });
  for (const currentA of [scene.currentA, undefined]) {
    const what = `${name}, ${currentA ? 'with its current' : 'height alone'}`;

    test(`level(map + form) = level(map) for every order, ${what}`, () => {
      const random = seededRandom(`form ${name}`);
      // What the form cannot take must not be in the map: ground that is bent to the last is all threshold.
      for (let order = 2; order <= 4; order++) {
        const coefficients = Float64Array.from({ length: ((order + 1) * (order + 2)) / 2 }, () => 8e-9 * random.normal());
        const form = formSurface({ order, coefficients }, size, size);
        const formed = scene.heightM.map((value, i) => value + form[i]!);
        // Rounding of some 30 nm to float32 is 4e-6 nm; where it takes a pixel into the ground or out of it, a line's median moves by half a rank of 128, 1e-3 nm.
        const difference = largestDifference(level(scene.heightM, currentA, { order }).levelled.data, level(formed, currentA, { order }).levelled.data);
        // On stripes a line may have all its ground on the part of it that one terrace covers, and its ranks lie further apart.
        assert.ok(difference < (name === 'stripes' ? 2e-11 : 2e-12), `order ${order}: ${difference}`);
      }
    });

    // A height alone on stripes has nothing but its borders to tell a step from lines.
    if (name === 'stripes' && !currentA) continue;
    test(`an offset added to every line changes nothing, ${what}`, () => {
      const own = level(scene.heightM, currentA).levelled.data;
      for (const mostNm of [0.1, 0.5]) {
        const random = seededRandom(`lines ${mostNm}`);
        const offsets = Array.from({ length: size }, () => mostNm * 1e-9 * (2 * random.uniform() - 1));
        const moved = scene.heightM.map((value, i) => value + offsets[Math.floor(i / size)]!);
        // A pixel that rounding takes into the ground or out of it moves a line's median by a rank, on lines with little ground by some.
        const difference = largestDifference(own, level(moved, currentA).levelled.data);
        assert.ok(difference < 2e-11, `${mostNm} nm: ${difference}`);
      }
    });
  }

  test(`terraces keep their steps, ${name}, told by the current`, () => {
    for (const [layers, errorNm] of terraceErrors(scene, level(scene.heightM, scene.currentA).levelled.data)) assert.ok(Math.abs(errorNm) < 0.02, `${layers} layers: off by ${errorNm} nm`);
  });
}

test('without line offsets none is taken out, and stripes along the lines keep their steps exactly', () => {
  const along = createScene({ seed: 'along', size, layersAt: (_, r) => (r < 40 ? 10 : r < 90 ? 11 : 12), things: solid, tiltNm: 10 });
  for (const currentA of [along.currentA, undefined]) {
    const { levelled } = level(along.heightM, currentA, { lines: false, order: 1 });
    for (const [layers, errorNm] of terraceErrors(along, levelled.data)) assert.ok(Math.abs(errorNm) < 0.02, `${layers} layers: off by ${errorNm} nm`);
  }
});

test('a step of the conductor, whole layers in height under an unchanged current, is levelled as a terrace of its own', () => {
  for (const graphite of [1, 2, 3, 6]) {
    const made = createScene({ seed: `graphite ${graphite}`, size, things: solid, tiltNm: 8, lineNm: 0.2 });
    const upper = (i: number): boolean => (i % size) + 0.3 * Math.floor(i / size) > 90;
    const { levelled, plane } = level(made.heightM.map((value, i) => value + (upper(i) ? graphite * layerM : 0)), made.currentA);
    const sides = [false, true].map((side) => {
      const list = [...levelled.data.keys()].filter((i) => made.things[i] === '' && upper(i) === side && made.cleanNm[i] === 0);
      const median = (of: Float32Array): number => list.map((i) => of[i]!).filter((value) => !Number.isNaN(value)).sort((p, q) => p - q)[list.length >> 1]!;
      return { height: median(levelled.data), plane: median(plane) };
    });
    assert.ok(Math.abs(sides[1]!.height - sides[0]!.height - graphite * layerM) < 0.02e-9, `${graphite} layers: ${sides[1]!.height - sides[0]!.height}`);
    assert.ok(Math.abs(sides[1]!.plane - sides[0]!.plane - graphite * layerM) < 0.03e-9, `${graphite} layers: plane ${sides[1]!.plane - sides[0]!.plane}`);
  }
});

test('a map without noise comes apart exactly into form, lines and planes', () => {
  const [columns, rows] = [120, 80];
  const grid: Grid = { columns, rows, pitchXM: 20e-9, pitchYM: 30e-9 };
  const random = seededRandom('exact');
  const form = formSurface({ order: 2, coefficients: Float64Array.from({ length: 6 }, () => 5e-9 * random.normal()) }, columns, rows);
  const lines = Array.from({ length: rows }, () => 0.5e-9 * random.normal());
  const planes = Float32Array.from({ length: columns * rows }, (_, i) => layerM * Math.floor((i % columns) / 40));
  // Some noise of a hundredth of a layer, or the scatter of the ground would be nothing at all.
  const height = Float32Array.from({ length: columns * rows }, (_, i) => form[i]! + lines[Math.floor(i / columns)]! + planes[i]! + 0.003e-9 * random.normal());
  const section = createRecipe().ground;
  const start = firstLevels(scalarMap(grid, height), grid, section);
  for (const known of [planes, undefined]) {
    const found = refineLevels(height, grid, section, { start, planes: known, layerM });
    const surface = formSurface(found.form, columns, rows);
    let [least, most] = [Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY];
    for (let i = 0; i < height.length; i++) {
      const rest = height[i]! - surface[i]! - found.lines[Math.floor(i / columns)]! - planes[i]!;
      least = Math.min(least, rest);
      most = Math.max(most, rest);
    }
    assert.ok(most - least < 0.05e-9, `${known ? 'planes known' : 'planes unknown'}: ${most - least} left`);
  }
});

test('one level more or less of all planes changes only the planes', () => {
  const scene = createScene({ seed: 'common', size, layersAt: threeTerraces(size), tiltNm: 10, lineNm: 0.2 });
  const grid: Grid = { columns: size, rows: size, pitchXM: 20e-9, pitchYM: 20e-9 };
  const section = createRecipe().ground;
  const start = firstLevels(scalarMap(grid, scene.heightM), grid, section);
  const planes = Float32Array.from(scene.layers, (layers) => (layers - 10) * layerM);
  const own = refineLevels(scene.heightM, grid, section, { start, planes, layerM });
  const raised = refineLevels(scene.heightM, grid, section, { start, planes: planes.map((value) => value + 2 * layerM), layerM });
  assert.ok(largestDifference(Float32Array.from(own.lines), Float32Array.from(raised.lines)) < 2e-12);
  for (let i = 0; i < own.plane.length; i += 101) {
    if (!Number.isNaN(own.plane[i]!)) assert.ok(Math.abs(raised.plane[i]! - own.plane[i]! - 2 * layerM) < 2e-12, `${i}: ${raised.plane[i]! - own.plane[i]!}`);
  }
});
