import assert from 'node:assert/strict';
import { test } from 'node:test';
import { footprintOf, layerMask } from '../../src/read/footprint.ts';
import { readOutlines } from '../../src/read/outlines.ts';
import type { Outline } from '../../src/read/sample.ts';
import { refused, textBytes } from './refused.ts';

type Point = [number, number];
const box = (x0: number, y0: number, x1: number, y1: number): Point[] => [[x0, y0], [x1, y0], [x1, y1], [x0, y1], [x0, y0]];
const feature = (layer: unknown, coordinates: unknown, type = 'Polygon') => ({ type: 'Feature', properties: { layer }, geometry: { type, coordinates } });
const read = (...features: unknown[]) => readOutlines({ name: 'S.outlines.geojson', bytes: textBytes(JSON.stringify({ type: 'FeatureCollection', features })) });

/** 6 × 5 pixels of 1 µm. */
const grid = { columns: 6, rows: 5, pitchXM: 1e-6, pitchYM: 1e-6 };
const drawn = (mask: { data: Uint8Array }) => Array.from({ length: 5 }, (_, r) => [...mask.data.subarray(6 * r, 6 * r + 6)].map((v) => (v ? '#' : '.')).join(''));

test('y is up: a box at the lower left fills the last rows', () => {
  const [outline] = read(feature('barrier', [box(0, 0, 2, 1)]));
  assert.deepEqual(outline!.rings[0]![1], [2e-6, 0]);
  assert.deepEqual(drawn(layerMask(grid, [outline!], 'barrier')), ['......', '......', '......', '......', '##....']);
});

test('holes, several polygons of a layer, parts beyond the map', () => {
  const outlines = read(feature('emitter', [box(-5, 0, 5, 5), box(1, 1, 3, 3)]), feature('emitter', [[box(5, 4, 9, 9)]], 'MultiPolygon'));
  assert.deepEqual(drawn(layerMask(grid, outlines, 'emitter')), ['######', '#####.', '#..##.', '#..##.', '#####.']);
});

test('pixel centres decide; polygons that share a side share no pixel', () => {
  // The side runs exactly through the centres of column 2.
  const left = read(feature('barrier', [box(0, 0, 2.5, 5)]));
  const right = read(feature('barrier', [box(2.5, 0, 6, 5)]));
  assert.equal(drawn(layerMask(grid, left, 'barrier'))[0], '##....');
  assert.equal(drawn(layerMask(grid, right, 'barrier'))[0], '..####');
  const triangle = read(feature('barrier', [[[0, 0], [5, 0], [0, 5], [0, 0]]]));
  assert.deepEqual(drawn(layerMask(grid, triangle, 'barrier')), ['......', '#.....', '##....', '###...', '####..']);
});

test('footprint = injector ∩ barrier ∩ emitter − keep-outs; contacts do not limit it', () => {
  const outlines = read(
    feature('injector', [box(0, 0, 5, 5)]), feature('barrier', [box(1, 0, 6, 5)]),
    feature('keep-out', [box(2, 2, 3, 3)]), feature('contact-emitter', [box(0, 0, 1, 1)]),
  );
  assert.deepEqual(drawn(footprintOf(grid, outlines)), ['.####.', '.####.', '.#.##.', '.####.', '.####.']);
  assert.deepEqual(drawn(footprintOf(grid, [])), Array(5).fill('######'));
});

test('the area of a tilted square is its own within a pixel’s edge', () => {
  const fine = { columns: 400, rows: 400, pitchXM: 0.01e-6, pitchYM: 0.01e-6 };
  const square: Outline = { layer: 'barrier', rings: [[[2e-6, 0.5e-6], [3.5e-6, 2e-6], [2e-6, 3.5e-6], [0.5e-6, 2e-6], [2e-6, 0.5e-6]]] };
  const area = layerMask(fine, [square], 'barrier').data.reduce((sum, v) => sum + v, 0) * 1e-16;
  assert.ok(Math.abs(area / 4.5e-12 - 1) < 0.005, String(area));
});

test('what is no outline is refused by feature and reason', async () => {
  const cases: [() => unknown, RegExp][] = [
    [() => read(feature('gate', [box(0, 0, 1, 1)])), /feature 1: its layer "gate" is not known; use one of injector/],
    [() => read({ type: 'Feature', properties: null, geometry: null }), /its layer is missing/],
    [() => read(feature('barrier', [[[0, 0], [1, 0], [1, 1], [0, 1]]])), /ring 1 is not closed/],
    [() => read(feature('barrier', [[[0, 0], [1, 0], [0, 0]]])), /fewer than four points/],
    [() => read(feature('barrier', [[[0, 0], [1, 'a'], [1, 1], [0, 0]]])), /no pair of numbers at point 2/],
    [() => read(feature('barrier', [0, 0], 'Point')), /"Point"; use Polygon/],
    [() => read(feature('barrier', [])), /no ring/],
    [() => readOutlines({ name: 'S.outlines.geojson', bytes: textBytes('{"type":"Topology"}') }), /no FeatureCollection/],
    [() => readOutlines({ name: 'S.outlines.geojson', bytes: textBytes('{') }), /not valid GeoJSON/],
  ];
  for (const [run, sentence] of cases) assert.match((await refused(run)).message, sentence);
});
