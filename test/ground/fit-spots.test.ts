import assert from 'node:assert/strict';
import { test } from 'node:test';
import type { Grid } from '../../src/grid/maps.ts';
import { fitSpots } from '../../src/ground/fit-spots.ts';
import { pixelAt } from '../../src/grid/pixel-at.ts';
import { formSurface } from '../../src/ground/form.ts';
import { levelGround } from '../../src/ground/level-ground.ts';
import { seededRandom } from '../../src/stats/random.ts';
import { createRecipe, createSample } from '../fixtures/create-sample.ts';

const grid: Grid = { columns: 96, rows: 64, pitchXM: 20e-9, pitchYM: 30e-9 };
const { columns, rows } = grid;
const noLines = new Float64Array(rows);
type Spot = { readonly xUm: number; readonly yUm: number };
/** The place of a pixel's middle as a recipe states it. */
const spot = (column: number, row: number): Spot => ({ xUm: (column + 0.5) * 0.02, yUm: (rows - row - 0.5) * 0.03 });
const corners = [spot(20, 10), spot(80, 15), spot(40, 55)];

function map(heightNm: (c: number, r: number) => number): Float32Array {
  return Float32Array.from({ length: columns * rows }, (_, i) => 1e-9 * heightNm(i % columns, Math.floor(i / columns)));
}
/** Largest difference between a form and a height in nm, nm. */
function offNm(form: { readonly order: number; readonly coefficients: Float64Array }, heightNm: (c: number, r: number) => number): number {
  return formSurface(form, columns, rows).reduce((most, value, i) => Math.max(most, Math.abs(value * 1e9 - heightNm(i % columns, Math.floor(i / columns)))), 0);
}
const plane = (c: number, r: number): number => 0.3 * c - 0.2 * r + 5;

test('three spots give the plane through them, whatever order is stated, and whatever stands elsewhere', () => {
  const bubble = (c: number, r: number): number => 30 * Math.max(0, 1 - ((c - 60) ** 2 + (r - 38) ** 2) / 196);
  for (const order of [1, 2, 5]) {
    const found = fitSpots(map((c, r) => plane(c, r) + bubble(c, r)), grid, { order, spots: corners }, noLines)!;
    assert.equal(found.order, 1);
    assert.equal(found.used, 3);
    assert.ok(offNm(found.form, plane) < 1e-4, `order ${order}: ${offNm(found.form, plane)} nm`);
  }
});

test('the order is lowered to what the number of spots supports', () => {
  const bowed = (c: number, r: number): number => plane(c, r) + 0.002 * (c - 40) ** 2 - 0.001 * c * r;
  for (const [count, order] of [[5, 1], [6, 2], [9, 2], [10, 3], [14, 3], [45, 5]] as const) {
    // On rows of 1, 2, 3 … spots, each at other columns: in general position for every order.
    const spots = Array.from({ length: count }, (_, k) => {
      const line = Math.floor((Math.sqrt(8 * k + 1) - 1) / 2);
      const place = k - (line * (line + 1)) / 2;
      const lines = count > 20 ? 9 : 5;
      return spot(6 + Math.round((78 / lines) * place + line), 6 + Math.round((52 / lines) * line));
    });
    assert.equal(fitSpots(map(bowed), grid, { order: 5, spots }, noLines)!.order, order, `${count} spots`);
  }
  // Six spots in general position carry the bow exactly; medians over five pixels of a curved surface are off by its sag there.
  const six = fitSpots(map(bowed), grid, { order: 2, spots: [...corners, spot(10, 55), spot(85, 50), spot(50, 30)] }, noLines)!;
  assert.equal(six.order, 2);
  assert.ok(offNm(six.form, bowed) < 0.1, `${offNm(six.form, bowed)} nm`);
});

test('spots on one line leave the tilt across it open: no tilt is made up', () => {
  const found = fitSpots(map(plane), grid, { order: 2, spots: [spot(20, 20), spot(40, 30), spot(60, 40)] }, noLines)!;
  assert.equal(found.order, 0);
  assert.deepEqual([...found.form.coefficients.subarray(1)], [0, 0, 0, 0, 0]);
});

test('spots beside the map and on missing ground do not count; fewer than three give nothing', () => {
  const holed = map((c, r) => (c < 30 && r < 25 ? Number.NaN : plane(c, r)));
  assert.equal(fitSpots(holed, grid, { order: 1, spots: corners }, noLines), undefined);
  assert.equal(fitSpots(holed, grid, { order: 1, spots: [...corners.slice(1), { xUm: -1, yUm: 1 }] }, noLines), undefined);
  const found = fitSpots(holed, grid, { order: 1, spots: [...corners, spot(85, 60)] }, noLines)!;
  assert.equal(found.used, 3);
  assert.ok(offNm(found.form, plane) < 1e-4);
});

test('a spot on the far edge of the map belongs to its last pixels', () => {
  const wide = { xUm: columns * 0.02, yUm: rows * 0.03 };
  const edges = [{ xUm: columns * 0.02, yUm: 0.9 }, { xUm: 0.4, yUm: rows * 0.03 }, spot(20, 50)];
  assert.deepEqual(edges.map(({ xUm, yUm }) => pixelAt(grid, [xUm * 1e-6, yUm * 1e-6]) !== undefined), [true, true, true]);
  assert.equal(pixelAt(grid, [wide.xUm * 1e-6, wide.yUm * 1e-6]), columns - 1);
  const found = fitSpots(map(plane), grid, { order: 1, spots: edges }, noLines)!;
  assert.equal(found.used, 3);
  assert.ok(offNm(found.form, plane) < 1e-4);
});

test('a form of the fitted order added to the height is added to the result; a single spike under a spot moves nothing', () => {
  const random = seededRandom('spots');
  const rough = map(() => 0.1 * random.normal());
  const before = fitSpots(rough, grid, { order: 2, spots: corners }, noLines)!;
  const tilted = rough.map((value, i) => value + 1e-9 * plane(i % columns, Math.floor(i / columns)));
  const after = fitSpots(tilted, grid, { order: 2, spots: corners }, noLines)!;
  const [a, b] = [formSurface(before.form, columns, rows), formSurface(after.form, columns, rows)];
  for (let i = 0; i < a.length; i += 97) assert.ok(Math.abs(b[i]! - a[i]! - 1e-9 * plane(i % columns, Math.floor(i / columns))) < 0.15e-9);
  const spiked = map(plane);
  spiked[10 * columns + 20] = 1e-6;
  assert.ok(offNm(fitSpots(spiked, grid, { order: 1, spots: corners }, noLines)!.form, plane) < 0.02);
});

test('the stage levels by spots on a terrace: the terrace is even, a step stays, offsets of lines are still taken out', () => {
  const size = 128;
  const random = seededRandom('spots on a terrace');
  const offsets = Array.from({ length: size }, () => 0.3 * random.normal());
  // Most of the map is a dome that the form would follow; an even strip at the left is the ground, with a step of one layer in it.
  const shape = (c: number): number => (c < 44 ? 0 : 6 * Math.sin((Math.PI * (c - 44)) / 84) ** 2) + (c >= 26 && c < 44 ? 0.333 : 0);
  const heightM = Float32Array.from({ length: size * size }, (_, i) => {
    const [c, r] = [i % size, Math.floor(i / size)];
    return 1e-9 * (shape(c) + 0.2 * c - 0.1 * r + offsets[r]! + 0.03 * random.normal());
  });
  const at = (c: number, r: number): Spot => ({ xUm: (c + 0.5) * 0.02, yUm: (size - r - 0.5) * 0.02 });
  const recipe = createRecipe({ ground: { spots: [at(6, 10), at(19, 30), at(6, 110), at(19, 95)] } });
  const ground = levelGround(createSample({ columns: size, rows: size, heightM }), recipe.ground, recipe.scan, 0.333e-9);
  const { levelled, levels } = ground.height!;
  assert.equal(levels!.formFrom, 'spots');
  assert.equal(levels!.order, 1);
  assert.equal(levels!.spotsUsed, 4);
  assert.ok(levels!.lineRmsM! > 0.1e-9);
  const meanNm = (c0: number, c1: number, r0: number, r1: number): number => {
    let sum = 0;
    for (let r = r0; r < r1; r++) for (let c = c0; c < c1; c++) sum += levelled.data[r * size + c]! * 1e9;
    return sum / ((c1 - c0) * (r1 - r0));
  };
  const level = meanNm(1, 24, 4, 124);
  for (const [c, r] of [[1, 4], [13, 4], [1, 100], [13, 100]] as const) assert.ok(Math.abs(meanNm(c, c + 11, r, r + 24) - level) < 0.1, `terrace at ${c}, ${r}: ${meanNm(c, c + 11, r, r + 24) - level}`);
  assert.ok(Math.abs(meanNm(28, 42, 4, 124) - level - 0.333) < 0.1, `step ${meanNm(28, 42, 4, 124) - level}`);
  assert.deepEqual(ground.warnings.map(({ code }) => code).filter((code) => code.startsWith('spots')), ['spots-order-lowered']);
});

test('spots that miss the map are said, and the ground is found automatically', () => {
  const heightM = Float32Array.from({ length: 64 * 64 }, (_, i) => 1e-10 * (i % 64));
  const recipe = createRecipe({ ground: { spots: [{ xUm: -1, yUm: 0 }, { xUm: -2, yUm: 0 }, { xUm: -1, yUm: 9 }] } });
  const ground = levelGround(createSample({ columns: 64, rows: 64, heightM }), recipe.ground, recipe.scan, 0.333e-9);
  assert.equal(ground.height!.levels!.formFrom, 'ground');
  assert.ok(ground.warnings.some(({ code }) => code === 'spots-too-few'));
});

test('a recipe takes no spot or three and more, and names the path otherwise', () => {
  assert.throws(() => createRecipe({ ground: { spots: corners.slice(1) } }), /recipe\.ground\.spots/);
  assert.throws(() => createRecipe({ ground: { spots: [...corners, { xUm: 1, yUm: 'b' }] } }), /recipe\.ground\.spots/);
  assert.equal(createRecipe({ ground: { spots: corners } }).ground.spots.length, 3);
});
