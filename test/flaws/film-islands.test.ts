import assert from 'node:assert/strict';
import { test } from 'node:test';
import { overPlanes } from '../../src/flaws/over-planes.ts';
import { maskMap, scalarMap } from '../../src/grid/maps.ts';
import type { Grid } from '../../src/grid/maps.ts';
import { seededRandom } from '../../src/stats/random.ts';

const layerNm = 0.333;
const side = 96;
const count = side * side;
const grid: Grid = { columns: side, rows: side, pitchXM: 20e-9, pitchYM: 20e-9 };
/** Islands are discs of about 450 pixels; larger ones than this are terraces whatever their height. */
const maxPixels = 1000;
const inDisc = (i: number, c0 = 48, r0 = 48, radius = 12): boolean => Math.hypot((i % side) - c0, Math.floor(i / side) - r0) < radius;

interface Drawn {
  /** Layers of the ground around, by the current, at a pixel. */
  readonly ground?: (i: number) => number;
  /** Layers over the common plane by the current. */
  readonly layers: number;
  /** How far the island lies off the height that belongs to them, nm. */
  readonly offNm: number | ((i: number) => number);
  /** Layers by which height and plane, not the current, are higher everywhere: a step of the conductor. */
  readonly step?: number;
  readonly island?: (i: number) => boolean;
  readonly films?: boolean;
  readonly maxPixels?: number;
}

/** Share of the island that is found on its plane, and its mean height over the planes against that of the ground left of it, nm. */
function look({ ground = () => 0, layers, offNm, step = 0, island = inDisc, films = true, maxPixels: most = maxPixels }: Drawn): { share: number; overNm: number } {
  const random = seededRandom('islands');
  const told = Float32Array.from({ length: count }, (_, i) => 1e-9 * layerNm * (island(i) ? layers : ground(i)));
  const plane = told.map((value) => value + 1e-9 * layerNm * step);
  const levelled = plane.map((value, i) => value + (island(i) ? 1e-9 * (typeof offNm === 'number' ? offNm : offNm(i)) : 0) + 0.08e-9 * random.normal());
  const { onPlane, over } = overPlanes(
    { levelled: scalarMap(grid, levelled), repaired: maskMap(grid), repairedPixels: 0, noiseM: 0.08e-9, plane, tiltM: 0 },
    side, side, new Uint8Array(count), 600, 1e-9 * layerNm, films ? { maxPixels: most, told } : undefined,
  );
  const all = Array.from({ length: count }, (_, i) => i);
  const pixels = all.filter((i) => island(i));
  const meanNm = (list: number[]): number => 1e9 * list.reduce((sum, i) => sum + over[i]!, 0) / list.length;
  return { share: pixels.filter((i) => onPlane[i] === 1).length / pixels.length, overNm: meanNm(pixels) - meanNm(all.filter((i) => i % side < 20)) };
}

test('a small terrace two or three layers up whose height agrees with its current keeps its plane', () => {
  for (const layers of [2, 3]) {
    for (const offNm of [0, 0.08, -0.08]) {
      const { share, overNm } = look({ layers, offNm });
      assert.ok(share > 0.98, `${layers} layers, ${offNm} nm off: ${share}`);
      assert.ok(Math.abs(overNm - offNm) < 0.02, `${overNm}`);
    }
  }
});

test('a film 0.2 nm off the height that its current suggests is no terrace, and stands over the ground beside it', () => {
  for (const layers of [2, 3]) {
    for (const offNm of [0.2, -0.2]) {
      const { share, overNm } = look({ layers, offNm });
      assert.equal(share, 0, `${layers} layers, ${offNm} nm off`);
      assert.ok(Math.abs(overNm - (layers * layerNm + offNm)) < 0.02, `${overNm}`);
      assert.ok(look({ layers, offNm, films: false }).share > 0.8, 'without the look at islands it would pass');
    }
  }
});

test('what of a film lies on the plane has been chosen by its height: the whole of it decides', () => {
  // A third of it agrees with the current.
  const offNm = (i: number): number => (i % side < 44 ? 0 : 0.7);
  assert.equal(look({ layers: 2, offNm }).share, 0);
  assert.ok(look({ layers: 2, offNm, films: false }).share > 0.2);
});

test('an island of one layer, one that lies lower and one that is large stay as they are', () => {
  assert.ok(look({ layers: 1, offNm: 0.2 }).share > 0.95);
  assert.ok(look({ layers: -2, offNm: 0.2 }).share > 0.95);
  assert.ok(look({ layers: 3, offNm: 0.2, maxPixels: 300 }).share > 0.95);
});

test('beside a terrace one layer lower an island stays as it is; where it only meets a corner of that, its height decides', () => {
  const ring = (i: number): number => (inDisc(i, 48, 48, 40) ? 2 : 0);
  assert.ok(look({ ground: ring, layers: 3, offNm: 0.2 }).share > 0.95);
  assert.equal(look({ ground: (i) => (i % side > 70 ? 2 : 0), layers: 3, offNm: 0.2 }).share, 0);
});

test('steps of the conductor that lift ground and island alike say nothing against the island', () => {
  assert.ok(look({ layers: 2, offNm: 0, step: 1 }).share > 0.98);
  assert.equal(look({ layers: 2, offNm: 0.2, step: 1 }).share, 0);
});

test('without large ground there is nothing to measure an island against', () => {
  assert.ok(look({ layers: 3, offNm: 0.2, maxPixels: 2 * count }).share > 0.95);
});
