import assert from 'node:assert/strict';
import { test } from 'node:test';
import type { Grid } from '../../src/grid/maps.ts';
import { levelSegments } from '../../src/ground/segment-levels.ts';
import { seededRandom } from '../../src/stats/random.ts';
import { assertClose } from '../fixtures/assert-close.ts';

const layerM = 0.333e-9;
const side = 100;
const count = side * side;
const grid: Grid = { columns: side, rows: side, pitchXM: 20e-9, pitchYM: 20e-9 };

type Drawn = (c: number, r: number) => number;

function map(layers: Drawn, seed = 'segments'): Float32Array {
  const random = seededRandom(seed);
  return Float32Array.from({ length: count }, (_, i) => layerM * layers(i % side, Math.floor(i / side)) + 0.05e-9 * random.normal());
}

function levels(layers: Drawn, planes?: Float32Array, on: Grid = grid): { at: (c: number, r: number) => number; terraceAt: (c: number, r: number) => number | undefined } {
  const found = levelSegments(map(layers), on, layerM, planes);
  assert.equal(found.levelM[0], 0);
  const of = (c: number, r: number): number => found.segment[r * side + c]!;
  return { at: (c, r) => found.levelM[of(c, r)]! / layerM, terraceAt: (c, r) => (of(c, r) === 0 ? undefined : found.terrace[of(c, r)]) };
}

test('steps of whole layers are whole, against the largest segment, over borders of any direction', () => {
  const { at } = levels((c, r) => (c < 50 ? 0 : r < 40 ? 1 : -2));
  assert.equal(at(20, 50), 0);
  assertClose(at(80, 20), 1, 1e-9);
  assertClose(at(80, 70), -2, 1e-9);
});

test('ground that undulates is linked across its borders, not over the map', () => {
  const { at } = levels((c) => (c < 30 ? 0 : c < 65 ? 1 : 2) + 1.2 * Math.sin((2 * Math.PI * c) / 220));
  assertClose(at(45, 50) - at(10, 50), 1, 1e-9);
  assertClose(at(85, 50) - at(45, 50), 1, 1e-9);
});

test('a height between layers is kept as it is: a large stretch is a terrace of its own, a small raised one may be a film', () => {
  const patch: Drawn = (c, r) => (c > 40 && c < 70 && r > 40 && r < 70 ? 2.5 : 0);
  const small = levels(patch);
  assert.ok(Math.abs(small.at(55, 55) - 2.5) < 0.1, `${small.at(55, 55)}`);
  assert.equal(small.terraceAt(55, 55), 0);
  assert.equal(small.terraceAt(10, 10), 1);
  // The same pixels on a map ten times as wide are too large for a film.
  const large = levels(patch, undefined, { ...grid, pitchXM: 200e-9, pitchYM: 200e-9 });
  assert.equal(large.terraceAt(55, 55), 1);
  // A hollow is no film either.
  assert.equal(levels((c, r) => -patch(c, r)).terraceAt(55, 55), 1);
});

test('planes that the current tells: a small step that agrees with it is a terrace, and so is a step of the conductor under an unchanged current', () => {
  const inside: Drawn = (c, r) => (c > 40 && c < 70 && r > 40 && r < 70 ? 1 : 0);
  const planes = (rung: number) => Float32Array.from({ length: count }, (_, i) => layerM * rung * inside(i % side, Math.floor(i / side)));
  // The heights are over the planes: nothing is left of a step that agrees.
  const agrees = levels(() => 0, planes(1));
  assert.equal(agrees.terraceAt(55, 55), 1);
  const conductor = levels((c, r) => 2 * inside(c, r), planes(0));
  assert.equal(conductor.terraceAt(55, 55), 1);
  assertClose(conductor.at(55, 55), 2, 1e-9);
  // Two layers up by the height for a current that fell by one: no barrier, no conductor.
  assert.equal(levels((c, r) => 2 * inside(c, r), planes(1)).terraceAt(55, 55), 0);
});

test('a stretch that nothing links to the rest has no level', () => {
  const heights = map(() => 0);
  for (let r = 0; r < side; r++) heights.fill(Number.NaN, r * side + 35, r * side + 65);
  const { segment, levelM } = levelSegments(heights, grid, layerM, undefined);
  const [left, right] = [segment[50 * side + 10]!, segment[50 * side + 90]!];
  assert.ok(left > 0 && right > 0 && left !== right);
  assert.equal([levelM[left]!, levelM[right]!].filter((level) => Number.isNaN(level)).length, 1);
});

test('no ground at all: no segment', () => {
  const found = levelSegments(new Float32Array(count).fill(Number.NaN), grid, layerM, undefined);
  assert.deepEqual([found.levelM.length, found.segment.every((n) => n === 0)], [1, true]);
});
