/** Each kernel against its plain-TypeScript twin: the same to the bit. */
import assert from 'node:assert/strict';
import { test } from 'node:test';
import { dilate, nearestAdmitted, riseAboveGround } from '../../src/flaws/local-ground.ts';
import { squaredDistance } from '../../src/grid/distance.ts';
import { labelComponents } from '../../src/grid/label-components.ts';
import { scalarMap } from '../../src/grid/maps.ts';
import { greyOpening } from '../../src/grid/opening.ts';
import { formSurface, subtractForm } from '../../src/ground/form.ts';
import { lineDifferencesSolved } from '../../src/ground/lines.ts';
import { dilateByKernel } from '../../src/kernels/dilate.ts';
import { openedMap } from '../../src/kernels/grey-opening.ts';
import { labelRuns } from '../../src/kernels/label-runs.ts';
import { nearestByKernel } from '../../src/kernels/nearest-admitted.ts';
import { riseOverGround } from '../../src/kernels/rise-above-ground.ts';
import { rowDifferenceMedians } from '../../src/kernels/row-difference-medians.ts';
import { squaredDistances } from '../../src/kernels/squared-distances.ts';
import { seededRandom } from '../../src/stats/random.ts';
import { drawPicture } from '../../workers/picture.ts';
import { createAppraisal } from '../fixtures/create-appraisal.ts';
import { assertSame, bothWays, randomMap, randomMask, shapes, shares } from './both-ways.ts';

test('labels, their count and their sizes', () => {
  const random = seededRandom('labels');
  for (const [columns, rows] of shapes) {
    for (const share of shares) {
      const mask = randomMask(random, columns * rows, share);
      for (const connectivity of [4, 8] as const) {
        const { plain, kernel } = bothWays(() => labelComponents(mask, columns, rows, connectivity), () => labelRuns(mask, columns, rows, connectivity));
        const what = `${columns} × ${rows}, share ${share}, connectivity ${connectivity}`;
        assertSame(kernel.labels, plain.labels, what);
        assertSame(kernel.pixels, plain.pixels, what);
        assert.equal(kernel.count, plain.count, what);
      }
    }
  }
});

test('labels of a comb and of nested cups, whose parts join in their last rows', () => {
  const side = 61;
  const comb = Uint8Array.from({ length: side * side }, (_, i) => ((i % side) % 2 === 0 || i >= side * (side - 1) ? 1 : 0));
  // Cup d: columns d and side − 1 − d, and row side − 1 − d between them.
  const cups = Uint8Array.from({ length: side * side }, (_, i) => {
    const x = i % side;
    const inwards = Math.min(x, side - 1 - x, side - 1 - Math.floor(i / side));
    return inwards % 2 === 0 ? 1 : 0;
  });
  for (const [mask, regions] of [[comb, 1], [cups, 16]] as const) {
    for (const connectivity of [4, 8] as const) {
      const { plain, kernel } = bothWays(() => labelComponents(mask, side, side, connectivity), () => labelRuns(mask, side, side, connectivity));
      assert.equal(kernel.count, regions);
      assertSame(kernel.labels, plain.labels, `${regions} regions, connectivity ${connectivity}`);
    }
  }
});

test('squared distances, for equal and unequal pitch, with and without background beyond the border', () => {
  const random = seededRandom('distances');
  for (const [columns, rows] of shapes) {
    for (const share of shares) {
      const mask = randomMask(random, columns * rows, share);
      for (const outside of [false, true]) {
        for (const [pitchX, pitchY] of [[1, 1], [9.765625e-9, 9.765625e-9], [1, 1.7], [3e-9, 1.234e-9]] as const) {
          const { plain, kernel } = bothWays(
            () => squaredDistance(mask, columns, rows, { pitchX, pitchY, outsideIsBackground: outside }),
            () => squaredDistances(mask, columns, rows, pitchX, pitchY, outside),
          );
          assertSame(kernel, plain, `${columns} × ${rows}, share ${share}, outside ${outside}, pitch ${pitchX} × ${pitchY}`);
        }
      }
    }
  }
});

test('squared distances inside large patches', () => {
  const random = seededRandom('patches');
  const [columns, rows] = [301, 203];
  const mask = new Uint8Array(columns * rows).fill(1);
  for (let k = 0; k < 12; k++) {
    const [x, y, radius] = [random.integer(columns), random.integer(rows), random.integer(12)];
    for (let i = 0; i < mask.length; i++) if (Math.hypot((i % columns) - x, Math.floor(i / columns) - y) <= radius) mask[i] = 0;
  }
  for (const pitchY of [1, 0.37]) {
    const { plain, kernel } = bothWays(() => squaredDistance(mask, columns, rows, { pitchY }), () => squaredDistances(mask, columns, rows, 1, pitchY, false));
    assertSame(kernel, plain, `pitch ${pitchY}`);
  }
});

test('grey openings, with windows up to the whole map and with missing values', () => {
  const random = seededRandom('openings');
  for (const [columns, rows] of shapes) {
    for (const missing of [0, 0.01, 0.2]) {
      const map = randomMap(random, columns * rows, missing);
      for (const [widthX, widthY] of [[1, 1], [2, 3], [5, 4], [19, 19], [40, 7], [columns, rows]] as const) {
        const { plain, kernel } = bothWays(() => greyOpening(map, columns, rows, widthX, widthY), () => openedMap(map, columns, rows, widthX >> 1, widthY >> 1));
        assertSame(kernel, plain, `${columns} × ${rows}, missing ${missing}, ${widthX} × ${widthY}`);
      }
    }
  }
});

test('rise above the ground, where windows hold enough ground, too little, and none', () => {
  const random = seededRandom('rise');
  for (const [columns, rows] of shapes) {
    for (const missing of [0, 0.2, 1]) {
      const map = randomMap(random, columns * rows, missing);
      for (const startM of [1e-9, 0.1, 0.4, 5]) {
        const half = Math.max(15, Math.round(Math.min(columns, rows) / 8)) >> 1;
        const { plain, kernel } = bothWays(() => riseAboveGround(map, columns, rows, startM), () => riseOverGround(map, columns, rows, half, startM, 3));
        assertSame(kernel, plain, `${columns} × ${rows}, missing ${missing}, start ${startM}`);
      }
    }
  }
});

test('line differences, through their solution', () => {
  const random = seededRandom('lines');
  for (const [columns, rows] of [...shapes, [1030, 40], [2050, 20]] as const) {
    if (rows < 2) continue;
    for (const missing of [0, 0.2, 0.9, 1]) {
      const map = randomMap(random, columns * rows, missing);
      const admitted = randomMask(random, columns * rows, 0.8);
      const use = (i: number): boolean => admitted[i] !== 0;
      for (const limit of [Number.POSITIVE_INFINITY, 0.5]) {
        // The wrapper gives medians, the caller their solution: the caller is what is compared.
        const { plain, kernel } = bothWays(() => lineDifferencesSolved(map, columns, rows, use, limit), () => lineDifferencesSolved(map, columns, rows, use, limit));
        assertSame(kernel, plain, `${columns} × ${rows}, missing ${missing}, limit ${limit}`);
      }
    }
  }
});

test('a median of differences by hand: the odd one, the mean of the two in the middle, and none of too few', () => {
  const columns = 9;
  const rows = 4;
  const map = Float32Array.from({ length: columns * rows }, (_, i) => [0, 0, 1, 0][Math.floor(i / columns)]! * ((i % columns) ** 2));
  const use = (i: number): boolean => i < 3 * columns + 8;
  const { kernel } = bothWays(() => undefined, () => rowDifferenceMedians(map, columns, rows, [1, 2], 1, Number.POSITIVE_INFINITY, 8, use));
  assert.deepEqual([...kernel.counts], [0, 9, 9, 8, 0, 0, 9, 8]);
  // Row 3 − row 2: −{0, 1, 4, 9, 16, 25, 36, 49}; row 2 − row 1 and row 2 − row 0: the squares up to 64.
  assert.deepEqual([kernel.medians[1], kernel.medians[2], kernel.medians[3], kernel.medians[6], kernel.medians[7]], [0, 16, -12.5, 16, 0]);
});

test('nearest admitted pixels, ties included, near ones only and all', () => {
  const random = seededRandom('nearest');
  for (const [columns, rows] of shapes) {
    for (const share of shares) {
      const use = randomMask(random, columns * rows, share);
      const whole = nearestAdmitted(use, columns, rows);
      for (const withinPx of [0, 1, 7, columns + rows]) {
        const { plain, kernel } = bothWays(() => nearestAdmitted(use, columns, rows, withinPx), () => nearestByKernel(use, columns, rows, withinPx));
        assertSame(kernel, plain, `${columns} × ${rows}, share ${share}, within ${withinPx}`);
        // The limit leaves out what is further away, and changes nothing else.
        const away = (i: number, from: number): number => Math.abs((i % columns) - (from % columns)) + Math.abs(Math.floor(i / columns) - Math.floor(from / columns));
        assertSame(plain, whole.map((from, i) => (from >= 0 && away(i, from) <= withinPx ? from : -1)), `${columns} × ${rows}, share ${share}, limit ${withinPx}`);
      }
    }
  }
});

test('grown masks, by nothing up to more than the map', () => {
  const random = seededRandom('dilate');
  for (const [columns, rows] of shapes) {
    for (const share of [0, 0.002, 0.05, 1]) {
      const mask = randomMask(random, columns * rows, share);
      for (const radius of [0, 1, 3, 40, 400]) {
        const { plain, kernel } = bothWays(() => dilate(mask, columns, rows, radius), () => dilateByKernel(mask, columns, rows, radius));
        assertSame(kernel, plain, `${columns} × ${rows}, share ${share}, radius ${radius}`);
      }
    }
  }
});

test('maps less a form, of every order', () => {
  const random = seededRandom('form');
  for (const [columns, rows] of shapes) {
    const map = randomMap(random, columns * rows, 0.1);
    for (let order = 0; order <= 5; order++) {
      const coefficients = Float64Array.from({ length: ((order + 1) * (order + 2)) / 2 }, () => random.normal());
      const subtract = (): Float32Array => subtractForm(map, { order, coefficients }, columns, rows);
      const surface = formSurface({ order, coefficients }, columns, rows);
      const { plain, kernel } = bothWays(subtract, subtract);
      assertSame(kernel, plain, `${columns} × ${rows}, order ${order}`);
      assertSame(plain, map.map((value, i) => value - surface[i]!), `${columns} × ${rows}, order ${order}, by definition`);
    }
  }
});

test('colours, magnified, reduced, beside the map, with equal limits and infinities', () => {
  const random = seededRandom('colours');
  const [columns, rows] = [37, 23];
  const map = randomMap(random, columns * rows, 0.2);
  map[5] = Number.POSITIVE_INFINITY;
  map[6] = Number.NEGATIVE_INFINITY;
  // 255 entries over 255 units: halves fall right between two entries.
  for (let i = 60; i < 90; i++) map[i] = i + 0.5;
  const grid = { columns, rows, pitchXM: 1e-8, pitchYM: 1e-8 };
  const { sample, ledger, ...rest } = createAppraisal();
  const appraised = { ...rest, sample: { ...sample, grid }, ledger: { ...ledger, glow: scalarMap(grid, map) } };
  for (const [left, top, wide, high, width, height] of [[0, 0, 37, 23, 37, 23], [-5, 3, 20, 40, 64, 50], [0, 0, 37, 23, 9, 5], [100, 100, 10, 10, 8, 8], [3.3, 4.7, 1.5, 1.5, 1, 1]] as const) {
    for (const [low, upper] of [[0, 255], [-1, 1], [0.5, 0.5]] as const) {
      const request = { id: '', map: 'glow', left, top, columns: wide, rows: high, width, height, pixelRatio: 1, low, high: upper, log: false, causes: 'none' } as const;
      const draw = (): Uint8ClampedArray => drawPicture(appraised, request).rgba;
      const { plain, kernel } = bothWays(draw, draw);
      assertSame(kernel, plain, `${left}, ${top}, ${wide} × ${high} on ${width} × ${height}, ${low} to ${upper}`);
    }
  }
});
