import assert from 'node:assert/strict';
import { test } from 'node:test';
import type { Grid } from '../../src/grid/maps.ts';
import { traceOutline } from '../../src/grid/trace-outline.ts';
import type { TracedRing } from '../../src/grid/trace-outline.ts';
import { layerMask } from '../../src/read/footprint.ts';
import { seededRandom } from '../../src/stats/random.ts';

const grid = (columns: number, rows: number, pitchXM = 1, pitchYM = 1): Grid => ({ columns, rows, pitchXM, pitchYM });
const draw = (columns: number, rows: number, at: (c: number, r: number) => boolean) =>
  Uint8Array.from({ length: columns * rows }, (_, i) => (at(i % columns, Math.floor(i / columns)) ? 1 : 0));

/** Signed area by the shoelace formula; positive = anticlockwise with y up. */
function area(ring: TracedRing): number {
  let twice = 0;
  for (let k = 0; k + 1 < ring.length; k++) twice += ring[k]![0] * ring[k + 1]![1] - ring[k + 1]![0] * ring[k]![1];
  return twice / 2;
}

const filled = (g: Grid, polygons: readonly TracedRing[][]) => layerMask(g, polygons.map((rings) => ({ layer: 'barrier' as const, rings })), 'barrier').data;
const differing = (a: Uint8Array, b: Uint8Array) => a.reduce((sum, value, i) => sum + (value === b[i] ? 0 : 1), 0);

test('a full mask is the map itself: four corners, anticlockwise, closed', () => {
  const [polygon, ...others] = traceOutline(new Uint8Array(6 * 4).fill(1), grid(6, 4, 0.5, 0.25));
  assert.deepEqual(others, []);
  assert.equal(polygon!.length, 1);
  const ring = polygon![0]!;
  assert.equal(ring.length, 5);
  assert.deepEqual(ring[0], ring[4]);
  assert.deepEqual(ring.slice(0, 4).map(String).sort(), ['0,0', '0,1', '3,0', '3,1']);
  assert.equal(area(ring), 3);
});

test('an empty mask has no outline', () => {
  assert.deepEqual(traceOutline(new Uint8Array(20), grid(5, 4)), []);
});

test('row 0 is the top: the upper half of the map has the higher y', () => {
  const ring = traceOutline(draw(20, 20, (_, r) => r < 10), grid(20, 20))[0]![0]!;
  assert.deepEqual(ring.slice(0, -1).map(String).sort(), ['0,10', '0,20', '20,10', '20,20']);
});

test('a hole is a clockwise ring behind the outer one and stays a hole when filled again', () => {
  const g = grid(40, 30, 2, 1);
  const mask = draw(40, 30, (c, r) => c < 35 && !(c >= 10 && c < 20 && r >= 8 && r < 20));
  const polygons = traceOutline(mask, g);
  assert.equal(polygons.length, 1);
  const [outer, hole, ...more] = polygons[0]!;
  assert.deepEqual(more, []);
  assert.equal(area(outer!), 35 * 30 * 2);
  assert.equal(area(hole!), -10 * 12 * 2);
  assert.deepEqual(filled(g, polygons), mask);
});

test('a slanted border keeps a third of its stairs at most and its area is right within a hundredth', () => {
  const g = grid(200, 160);
  const mask = draw(200, 160, (c, r) => c + 0.5 > 0.37 * (r + 0.5) + 40);
  const [[ring]] = traceOutline(mask, g) as [[TracedRing]];
  const stairs = traceOutline(mask, g, { tolerancePx: 1e-9 })[0]![0]!.length;
  assert.ok(stairs > 100 && ring.length <= stairs / 3, `${ring.length} of ${stairs} points`);
  // [F] trapezium: (200 − 40)·160 − 0.37·160²/2.
  const wanted = 160 * 160 - (0.37 * 160 * 160) / 2;
  assert.ok(Math.abs(area(ring) / wanted - 1) < 0.01, `${area(ring)} for ${wanted}`);
  assert.ok(differing(filled(g, [[ring]]), mask) <= 160);
});

test('two patches are two polygons, each with its own hole', () => {
  const ringed = (c: number, r: number, c0: number) => Math.hypot(c - c0, r - 20) < 15 && Math.hypot(c - c0, r - 20) > 6;
  const mask = draw(80, 40, (c, r) => ringed(c, r, 20) || ringed(c, r, 60));
  const polygons = traceOutline(mask, grid(80, 40));
  assert.deepEqual(polygons.map((polygon) => polygon.length), [2, 2]);
  for (const [outer, hole] of polygons) {
    assert.ok(area(outer!) > 0 && area(hole!) < 0);
    assert.ok(Math.abs(area(outer!) / (Math.PI * 15 ** 2) - 1) < 0.05);
    assert.ok(Math.abs(area(hole!) / (-Math.PI * 6.25 ** 2) - 1) < 0.1);
  }
});

test('a ragged border is thinned until the vertices suffice', () => {
  const random = seededRandom('ragged');
  const edge = Float64Array.from({ length: 600 }, () => 200 + 12 * random.normal());
  const g = grid(600, 400);
  const mask = draw(600, 400, (c, r) => r > edge[c]!);
  const count = (polygons: readonly TracedRing[][]) => polygons.flat().reduce((sum, ring) => sum + ring.length - 1, 0);
  assert.ok(count(traceOutline(mask, g, { mostVertices: 1e6 })) > 500, 'the case needs thinning');
  const thinned = traceOutline(mask, g);
  assert.ok(count(thinned) <= 500);
  for (const ring of thinned.flat()) assert.ok(ring.length >= 4);
  const total = thinned.flat().reduce((sum, ring) => sum + area(ring), 0);
  const pixels = mask.reduce((sum, value) => sum + value, 0);
  assert.ok(Math.abs(total / pixels - 1) < 0.05, `${total} for ${pixels}`);
});

test('a mask of the wrong size is refused', () => {
  assert.throws(() => traceOutline(new Uint8Array(7), grid(2, 3)), RangeError);
});
