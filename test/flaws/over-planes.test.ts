import assert from 'node:assert/strict';
import { test } from 'node:test';
import { overPlanes } from '../../src/flaws/over-planes.ts';
import { maskMap, scalarMap } from '../../src/grid/maps.ts';
import type { Grid } from '../../src/grid/maps.ts';
import type { HeightGround } from '../../src/ground/ground.ts';
import { seededRandom } from '../../src/stats/random.ts';

const layerM = 0.333e-9;
const side = 80;
const count = side * side;
const grid: Grid = { columns: side, rows: side, pitchXM: 20e-9, pitchYM: 20e-9 };
const at = (c: number, r: number): number => r * side + c;
type Drawn = (c: number, r: number) => number;

function height(layers: Drawn, plane: Drawn, seed = 'planes'): HeightGround {
  const random = seededRandom(seed);
  const over = (of: Drawn, noiseM: number): Float32Array => Float32Array.from({ length: count }, (_, i) => layerM * of(i % side, Math.floor(i / side)) + noiseM * random.normal());
  return { levelled: scalarMap(grid, over(layers, 0.08e-9)), repaired: maskMap(grid), repairedPixels: 0, noiseM: 0.08e-9, plane: over(plane, 0), tiltM: 0 };
}
const terraces: Drawn = (c) => (c < 40 ? 0 : 2);
const off = (radius: number, c0 = 40, r0 = 40) => (c: number, r: number): boolean => Math.hypot(c - c0, r - r0) < radius;

test('terraces leave nothing over their planes', () => {
  const { over, onPlane } = overPlanes(height(terraces, terraces), side, side, undefined, 600, layerM);
  assert.ok(onPlane.filter((value) => value === 1).length > 0.99 * count);
  for (let i = 0; i < count; i++) if (onPlane[i] === 1) assert.ok(Math.abs(over[i]!) < 0.5e-9);
});

test('under a thing the plane is that of the nearest ground, whatever its own current suggests', () => {
  const thing = off(8, 20, 40);
  for (const suggested of [Number.NaN, 3]) {
    const { over, onPlane } = overPlanes(height((c, r) => (thing(c, r) ? 12 : terraces(c, r)), (c, r) => (thing(c, r) ? suggested : terraces(c, r))), side, side, undefined, 600, layerM);
    assert.ok(Math.abs(over[at(20, 40)]! - 12 * layerM) < 0.4e-9, `${over[at(20, 40)]}`);
    assert.equal(onPlane[at(20, 40)], 0);
  }
});

test('a terrace at the floor is found by its height: large ones always, small ones one or two layers up', () => {
  const patch = off(9);
  const floor = Uint8Array.from({ length: count }, (_, i) => (patch(i % side, Math.floor(i / side)) ? 1 : 0));
  const onPlaneAt = (layers: number, least: number): number => {
    const drawn: Drawn = (c, r) => (patch(c, r) ? layers : 0);
    return overPlanes(height(drawn, drawn), side, side, floor, least, layerM).onPlane[at(40, 40)]!;
  };
  // About 254 pixels.
  assert.deepEqual([0, 1, 2, 4, -1].map((layers) => onPlaneAt(layers, 600)), [0, 1, 1, 0, 0]);
  assert.deepEqual([0, 1, 2, 4, -1].map((layers) => onPlaneAt(layers, 100)), [1, 1, 1, 1, 1]);
});

test('missing heights stay missing; a map without planes is measured against nothing', () => {
  const drawn = height(() => 0, () => 0);
  drawn.levelled.data[at(10, 10)] = Number.NaN;
  const { over, onPlane } = overPlanes(drawn, side, side, undefined, 600, layerM);
  assert.ok(Number.isNaN(over[at(10, 10)]!) && onPlane[at(10, 10)] === 0);
  const unknown = overPlanes(height(() => 3, () => Number.NaN), side, side, undefined, 600, layerM);
  assert.ok(unknown.onPlane.every((value) => value === 0));
  assert.ok(Math.abs(unknown.over[at(40, 40)]! - 3 * layerM) < 0.5e-9);
});
