import assert from 'node:assert/strict';
import { test } from 'node:test';
import { maskMap, scalarMap } from '../../src/grid/maps.ts';
import type { Grid } from '../../src/grid/maps.ts';
import type { CurrentGround } from '../../src/ground/ground.ts';
import { layerPlanes } from '../../src/ground/layer-planes.ts';
import { seededRandom } from '../../src/stats/random.ts';
import { assertClose } from '../fixtures/assert-close.ts';

const layerM = 0.333e-9;
const side = 90;
const count = side * side;
const grid: Grid = { columns: side, rows: side, pitchXM: 20e-9, pitchYM: 20e-9 };
const floorA = 1e-13;
const at = (c: number, r: number): number => r * side + c;

/** A conditioned current by decades below 1 nA; at the floor where it falls to it, saturated at 10 nA. */
function current(decadesBelow: (c: number, r: number) => number, seed = 'planes'): CurrentGround {
  const random = seededRandom(seed);
  const log10 = Float32Array.from({ length: count }, (_, i) => Math.min(-8, Math.max(-13, -9 - decadesBelow(i % side, Math.floor(i / side)) + 0.05 * random.normal())));
  const map = scalarMap(grid, log10.map((value) => 10 ** value));
  return {
    unit: 'A', offsetFree: map, conditioned: map, log10: scalarMap(grid, log10),
    saturated: maskMap(grid, Uint8Array.from(log10, (value) => (value >= -8 ? 1 : 0))), floor: maskMap(grid, Uint8Array.from(log10, (value) => (value <= -13 ? 1 : 0))),
    repaired: maskMap(grid), repairedPixels: 0, offsetA: 0, noiseA: 3e-14, floorA, saturatedPixels: 0, wearDecades: 0, lagPx: 0,
  };
}
const terraces = (c: number): number => Math.floor(c / 30);
const heights = (layersPerGap: number, more: (c: number, r: number) => number = () => 0): Float32Array =>
  Float32Array.from({ length: count }, (_, i) => layersPerGap * layerM * terraces(i % side) + more(i % side, Math.floor(i / side)));

test('terraces by their current are planes a whole number of layers apart, by the height at their borders', () => {
  for (const layers of [1, 2]) {
    const found = layerPlanes(current((c) => 0.55 * layers * terraces(c)), heights(layers), side, layerM)!;
    assertClose(found.gapM, layers * layerM, 1e-9);
    assertClose(found.ladder.stepDecades!, 0.55 * layers, 0.03);
    for (const [c, rung] of [[10, 0], [45, 1], [80, 2]] as const) assertClose(found.planes[at(c, 40)], rung * layers * layerM, 1e-6, `column ${c}`);
  }
});

test('tilt and line offsets under the heights do not change the gap', () => {
  const { gapM } = layerPlanes(current((c) => 0.55 * terraces(c)), heights(1, (c, r) => 2e-12 * c + 3e-9 * Math.sin(r)), side, layerM)!;
  assertClose(gapM, layerM, 1e-9);
});

test('nothing is told at the floor, at saturation, on features and between terraces', () => {
  const patch = (c: number, r: number, row: number): boolean => c < 10 && Math.abs(r - row) < 5;
  const found = layerPlanes(
    current((c, r) => (patch(c, r, 10) ? 9 : patch(c, r, 30) ? -2 : patch(c, r, 50) ? 0.27 : 0.55 * terraces(c))),
    heights(1, (c, r) => (patch(c, r, 70) ? 6e-9 : 0)), side, layerM,
  )!;
  for (const row of [10, 30, 70]) assert.ok(Number.isNaN(found.planes[at(5, row)]!), `row ${row}`);
  const between = Array.from({ length: 9 }, (_, k) => found.planes[at(5, 46 + k)]!).filter((plane) => Number.isNaN(plane)).length;
  assert.ok(between >= 5, `${between} of 9 left open`);
  assert.equal(found.planes[at(5, 85)], 0);
});

test('one terrace is one plane; a map at the floor has none', () => {
  const single = layerPlanes(current(() => 1), heights(0), side, layerM)!;
  assert.equal(single.ladder.stepDecades, undefined);
  assert.ok(single.planes.every((plane) => plane === 0));
  assert.equal(layerPlanes(current(() => 9), heights(0), side, layerM), undefined);
});
