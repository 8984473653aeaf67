import assert from 'node:assert/strict';
import { test } from 'node:test';
import { parseMapName } from '../../src/read/file-name.ts';
import { filesOf, groupInputs } from '../../src/read/pairing.ts';
import { textBytes } from './refused.ts';

const folder = (...names: string[]) => groupInputs(names.map((name) => ({ name })));

test('names: synonyms, separators, return and bias', () => {
  const cases: [string, object][] = [
    ['S.height.tif', { sample: 'S', quantity: 'height' }],
    ['S_topo.npy', { sample: 'S', quantity: 'height' }],
    ['S-topography.csv', { sample: 'S', quantity: 'height' }],
    ['S.z.tif', { sample: 'S', quantity: 'height' }],
    ['S_I.tif', { sample: 'S', quantity: 'current' }],
    ['S-Current.TIF', { sample: 'S', quantity: 'current' }],
    ['S.current.return.tif', { sample: 'S', quantity: 'current', direction: 'return' }],
    ['S_height_retrace.tif', { sample: 'S', quantity: 'height', direction: 'return' }],
    ['S.current.5V.tif', { sample: 'S', quantity: 'current', biasV: 5 }],
    ['S.current.-2.5V.tif', { sample: 'S', quantity: 'current', biasV: -2.5 }],
    ['S.5V.current.return.tif', { sample: 'S', quantity: 'current', direction: 'return', biasV: 5 }],
    ['S_current_800mV.tif', { sample: 'S', quantity: 'current', biasV: 0.8 }],
    ['flake-3.b_2.height.tif', { sample: 'flake-3.b_2', quantity: 'height' }],
    ['height.tif', { sample: '', quantity: 'height' }],
    // Without a word for the quantity nothing is taken off.
    ['device.5V.tif', { sample: 'device.5V' }],
    ['bright.tif', { sample: 'bright' }],
    ['S.heights.tif', { sample: 'S.heights' }],
  ];
  for (const [name, expected] of cases) assert.deepEqual(parseMapName(name), expected, name);
});

test('a folder: pairs, companions, and what is skipped', () => {
  const { samples, skipped, failed } = folder('A.height.tif', 'A_current.tif', 'A.json', 'A.iv.csv', 'A.outlines.geojson', 'B.tif', 'C.iv.csv', 'README.md', 'x.h5', 'D.json', 'A.tif');
  assert.deepEqual(samples.map((sample) => [sample.name, filesOf(sample)]), [
    ['A', ['A.height.tif', 'A_current.tif', 'A.json', 'A.iv.csv', 'A.outlines.geojson']], ['B', ['B.tif']],
  ]);
  assert.deepEqual(skipped.map((file) => file.name).sort(), ['A.tif', 'C.iv.csv', 'D.json', 'README.md', 'x.h5']);
  assert.deepEqual(failed, []);
});

test('notes in a folder are told from text matrices by content; explicit files are never skipped', () => {
  const note = { name: 'note.txt', bytes: textBytes('Scanned in air.\n') };
  const map = { name: 'map.txt', bytes: textBytes('1 2 3 4\n5 6 7 8\n1 2 3 4\n1 2 3 4\n') };
  assert.deepEqual(groupInputs([note, map]).samples.map((sample) => sample.name), ['map']);
  const explicit = groupInputs([{ ...note, explicit: true }, { name: 'S.geojson', explicit: true }, { name: 'q.h5', explicit: true }, { name: 'D.json', explicit: true }]);
  // Their decoder refuses note.txt and q.h5 with its own sentence.
  assert.deepEqual(explicit.samples.map((sample) => sample.name), ['note', 'q']);
  assert.deepEqual(explicit.failed.map(({ problem }) => problem.code), ['file-unpaired', 'file-unpaired']);
  assert.deepEqual(explicit.skipped, []);
});

test('several biases and return scans stay one sample', () => {
  const { samples } = folder('S.height.tif', 'S.height.return.tif', 'S.current.4V.tif', 'S.current.5V.tif');
  assert.deepEqual(samples[0]!.maps.map((map) => [map.quantity, map.direction, map.biasV]), [
    ['current', undefined, 4], ['current', undefined, 5], ['height', 'return', undefined], ['height', undefined, undefined],
  ]);
});

test('a manifest claims its files, may pick pages, and its bad rows fail alone', () => {
  const manifest = { name: 'tray.csv', explicit: true, bytes: textBytes('sample,height,current,iv,widthUm\none,a.tif,./b.tif,c.iv.csv,10\ntwo,stack.tif#1,stack.tif#2,,\nthree,gone.tif,,,\nfour,,,,\n') };
  const grouping = groupInputs([manifest, ...['a.tif', 'b.tif', 'c.iv.csv', 'stack.tif', 'E.height.tif'].map((name) => ({ name }))]);
  assert.deepEqual(grouping.samples.map((sample) => sample.name), ['E', 'one', 'two']);
  const [, one, two] = grouping.samples;
  assert.deepEqual([filesOf(one!), one!.row?.stated.widthUm], [['a.tif', 'b.tif', 'c.iv.csv'], 10]);
  assert.deepEqual(two!.maps.map((map) => [map.file, map.quantity, map.page]), [['stack.tif', 'height', 1], ['stack.tif', 'current', 2]]);
  assert.deepEqual(grouping.failed.map(({ name, problem }) => [name, problem.code]), [['three', 'file-absent'], ['four', 'sample-no-map']]);
  assert.match(grouping.failed[0]!.problem.message, /tray\.csv line 4 names gone\.tif/);
});

test('files called just height and current are one sample', () => {
  assert.deepEqual(folder('height.tif', 'current.tif').samples.map((sample) => [sample.name, sample.maps.length]), [['sample', 2]]);
});
