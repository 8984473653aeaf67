import assert from 'node:assert/strict';
import { test } from 'node:test';
import type { InputFile } from '../../src/read/input.ts';
import { groupInputs } from '../../src/read/pairing.ts';
import { readSample } from '../../src/read/read-sample.ts';
import { scanSection } from '../../src/read/recipe.ts';
import { channelOf } from '../../src/read/sample.ts';
import type { Sample } from '../../src/read/sample.ts';
import { sha256 } from '../../src/read/sha256.ts';
import { refused, textBytes } from './refused.ts';
import { float32Bytes, floatTiff, mapTags, writeTiff } from './write-tiff.ts';
import type { TagValue } from './write-tiff.ts';

const heights = Array.from({ length: 20 }, (_, i) => i * 0.5);
const currents = Array.from({ length: 20 }, (_, i) => (i - 1) * 2);
const scaleTag = (um: number): Record<number, TagValue> => ({ 33550: { type: 'double', values: [um, um, 0] } });
const ours = (text: object, um = 0.02): Record<number, TagValue> => ({ 270: { type: 'ascii', text: JSON.stringify({ evenglow: 1, pitchUnit: 'um', ...text }) }, ...scaleTag(um) });
const height = (more: Record<number, TagValue> = {}, values = heights) => floatTiff(5, 4, values, more);
const current = (more: Record<number, TagValue> = {}, values = currents) => floatTiff(5, 4, values, more);
const sidecar = (value: object) => textBytes(JSON.stringify(value));
const full = { widthUm: 0.1, heightUm: 0.08, heightUnit: 'nm', currentUnit: 'pA', biasV: 4 };

/** Reads the only sample of some files. */
async function read(files: Record<string, Uint8Array>, scan: Record<string, unknown> = {}): Promise<Sample> {
  const inputs: InputFile[] = Object.entries(files).map(([name, bytes]) => ({ name, bytes }));
  const { samples } = groupInputs(inputs.map((file) => ({ ...file, explicit: true })));
  assert.equal(samples.length, 1);
  return readSample(samples[0]!, inputs, scanSection.parse(scan), sha256);
}

const codes = (sample: Sample) => sample.warnings.map((warning) => warning.code);

test('a pair with its sidecar: SI values, pitch, bias, sources', async () => {
  const files = { 'S.height.tif': height(scaleTag(0.02)), 'S.current.tif': current(scaleTag(0.02)), 'S.json': sidecar(full) };
  const sample = await read(files);
  assert.deepEqual([sample.name, sample.grid.columns, sample.grid.rows, sample.surface], ['S', 5, 4, 'barrier']);
  assert.deepEqual([sample.grid.pitchXM, sample.grid.pitchYM].map((v) => Number(v.toPrecision(9))), [2e-8, 2e-8]);
  assert.deepEqual(sample.channels.map(({ quantity, unit, direction, biasV }) => [quantity, unit, direction, biasV]), [['height', 'm', 'forward', undefined], ['current', 'A', 'forward', 4]]);
  assert.deepEqual([...sample.channels[0]!.values.data], heights.map((v) => Math.fround(v * 1e-9)));
  assert.deepEqual([...sample.channels[1]!.values.data], currents.map((v) => Math.fround(v * 1e-12)));
  assert.deepEqual(sample.channels[0]!.values.shape, [4, 5]);
  assert.deepEqual(sample.sources.map((source) => source.name), ['S.current.tif', 'S.height.tif', 'S.json']);
  assert.equal(sample.sources[1]!.sha256, await sha256(files['S.height.tif']));
  assert.equal(sample.sources[1]!.bytes, files['S.height.tif'].length);
  assert.deepEqual([sample.footprint.data.every((v) => v === 1), sample.warnings], [true, []]);
});

test('NaN and infinities are missing', async () => {
  const values = heights.map((v, i) => (i === 3 ? NaN : i === 7 ? Infinity : i === 8 ? -Infinity : v));
  const sample = await read({ 'S.height.tif': height({}, values), 'S.json': sidecar(full) });
  const missing = [...sample.channels[0]!.values.data].flatMap((v, i) => (Number.isNaN(v) ? [i] : []));
  assert.deepEqual(missing, [3, 7, 8]);
});

test('mirroring and a bias on the tip', async () => {
  const files = { 'S.height.tif': height(), 'S.current.tif': current(), 'S.json': sidecar(full) };
  const sample = await read(files, { flipX: true, flipY: true, biasOn: 'tip' });
  assert.deepEqual([...sample.channels[0]!.values.data], [...heights].reverse().map((v) => Math.fround(v * 1e-9)));
  const tip = channelOf(sample, 'current')!;
  assert.equal(tip.biasV, -4);
  assert.deepEqual([...tip.values.data], [...currents].reverse().map((v) => Math.fround(-v * 1e-12)));
  const [row] = (await read(files, { flipX: true })).channels;
  assert.deepEqual([...row!.values.data.subarray(0, 5)], [2, 1.5, 1, 0.5, 0].map((v) => Math.fround(v * 1e-9)));
});

test('everything that nothing states is asked for in one sentence', async () => {
  const lone = await refused(() => read({ 'S.tif': height() }));
  assert.equal(lone.message, 'S: nothing states whether S.tif is a height or a current, its unit and the size of the map; add --set scan.channel=height|current, '
    + '--set scan.heightUnit=nm or --set scan.currentUnit=nA (or relative) and --set scan.widthUm=10.');
  const pair = await refused(() => read({ 'S.height.npy': height(), 'S.current.npy': current() }));
  for (const word of ['the unit of S.height.npy', 'the unit of S.current.npy', 'the size of the map', 'scan.heightUnit', 'scan.currentUnit', 'scan.widthUm']) assert.ok(pair.message.includes(word), word);
  assert.doesNotMatch(pair.message, /scan\.channel/);
  const sized = await refused(() => read({ 'S.height.tif': height() }, { widthUm: 10 }));
  assert.doesNotMatch(sized.message, /widthUm/);
});

test('a lone map takes its role from the recipe, the sidecar, its tag or its unit', async () => {
  const scan = { widthUm: 0.1, heightUnit: 'nm', currentUnit: 'nA' };
  assert.equal((await read({ 'S.tif': height() }, { ...scan, channel: 'height' })).channels[0]!.quantity, 'height');
  assert.equal((await read({ 'S.tif': height(), 'S.json': sidecar({ role: 'current' }) }, scan)).channels[0]!.quantity, 'current');
  const tagged = await read({ 'S.tif': height(ours({ quantity: 'height', unit: 'nm' })) });
  assert.deepEqual([tagged.channels[0]!.quantity, tagged.warnings], ['height', []]);
  const byUnit = await read({ 'S.tif': current({ 270: { type: 'ascii', text: '{"unit":"pA"}' } }) }, { widthUm: 0.1 });
  assert.deepEqual([byUnit.channels[0]!.quantity, byUnit.channels[0]!.unit], ['current', 'A']);
  const relative = await read({ 'S.current.tif': current() }, { widthUm: 0.1, currentUnit: 'relative' });
  assert.deepEqual([relative.channels[0]!.unit, relative.channels[0]!.values.data[5]], ['relative', 8]);
});

test('pages of one file are the channels of one sample', async () => {
  const page = (values: number[], tags: Record<number, TagValue>) => ({ tags: mapTags(5, 4, 32, 3, tags), blocks: [float32Bytes(values)] });
  const name = (text: string): Record<number, TagValue> => ({ 285: { type: 'ascii', text } });
  const named = writeTiff([page(heights, name('Height')), page(currents, name('Current')), page(currents, name('Phase'))]);
  const sample = await read({ 'S.tif': named }, full);
  assert.deepEqual(sample.channels.map((channel) => [channel.quantity, channel.source]), [['height', 'S.tif#1 (Height)'], ['current', 'S.tif#2 (Current)']]);
  assert.deepEqual(codes(sample), ['channel-ignored']);
  const silent = writeTiff([page(heights, {}), page(currents, {})]);
  assert.match((await refused(() => read({ 'S.tif': silent }, full))).message, /2 maps and none says/);
  const picked = await read({ 'S.tif': silent, 'S.json': sidecar({ ...full, height: 'S.tif#1', current: 'S.tif#2' }) });
  assert.deepEqual(picked.channels.map((channel) => channel.quantity), ['height', 'current']);
  assert.equal((await refused(() => read({ 'S.tif': silent, 'S.json': sidecar({ ...full, height: 'S.tif#3' }) }))).code, 'page-absent');
  assert.equal((await refused(() => read({ 'S.tif': silent, 'S.json': sidecar({ ...full, height: 'T.tif' }) }))).code, 'file-absent');
});

test('sizes: assumed scale with a remark, confirmed without, contradicted refused', async () => {
  const bare = await read({ 'S.height.tif': height(scaleTag(0.02)) }, { heightUnit: 'nm' });
  assert.deepEqual([codes(bare), Number(bare.grid.pitchXM.toPrecision(9))], [['size-assumed'], 2e-8]);
  const wrong = await refused(() => read({ 'S.height.tif': height(scaleTag(0.02)), 'S.json': sidecar({ ...full, widthUm: 0.2 }) }));
  assert.match(wrong.message, /^S\.height\.tif: the map is 0\.1 µm wide by its pixel scale but 0\.2 µm by the sidecar S\.json/);
  assert.equal((await refused(() => read({ 'S.height.tif': height(ours({ quantity: 'height', unit: 'nm' })) }, { widthUm: 0.2 }))).code, 'size-disagreement');
  // A map that states nothing lies on its partner's grid.
  const partner = await read({ 'S.height.tif': height(ours({ quantity: 'height', unit: 'nm' })), 'S.current.tif': current() }, { currentUnit: 'A' });
  assert.equal(Number(partner.grid.pitchYM.toPrecision(9)), 2e-8);
});

test('channels that do not lie on one grid are refused', async () => {
  const other = await refused(() => read({ 'S.height.tif': height(), 'S.current.tif': floatTiff(4, 4, currents.slice(0, 16)) }, full));
  assert.match(other.message, /S\.current\.tif is 4 × 4 pixels but S\.height\.tif is 5 × 4 pixels/);
  const pitch = await refused(() => read({ 'S.height.tif': height(ours({ quantity: 'height', unit: 'nm' }, 0.02)), 'S.current.tif': current(ours({ quantity: 'current', unit: 'A' }, 0.021)) }));
  assert.equal(pitch.code, 'grid-mismatch');
  assert.match(pitch.message, /21 × 21 nm per pixel but S\.height\.tif is 20 × 20 nm/);
});

test('maps that cannot be right are refused in one sentence', async () => {
  const flat = Array<number>(20).fill(3);
  const cases: [Record<string, Uint8Array>, Record<string, unknown>, RegExp][] = [
    [{ 'S.height.tif': height({}, Array<number>(20).fill(NaN)) }, full, /^S\.height\.tif: every value is missing/],
    [{ 'S.current.tif': current({}, flat) }, full, /^S\.current\.tif: every current value is 3 pA/],
    [{ 'S.height.tif': height({}, heights.map((v) => v * 1e-5)) }, full, /spans only 0\.095 pm/],
    [{ 'S.height.tif': height(ours({ quantity: 'height', unit: 'A' })) }, {}, /taken for a height but its unit is A/],
    [{ 'S.current.tif': current(ours({ quantity: 'current', unit: 'nm' })) }, {}, /taken for a current but its unit is nm/],
    [{ 'S.height.tif': height(ours({ quantity: 'current', unit: 'A' })) }, {}, /is called a height but says inside that it is a current/],
    [{ 'S.height.tif': height(), 'S_topo.tif': height() }, full, /S\.height\.tif and S_topo\.tif are both its height/],
    [{ 'S.height.tif': floatTiff(1, 20, heights) }, full, /1 × 20 values; a map needs at least 4 × 4/],
  ];
  for (const [files, scan, sentence] of cases) {
    const { biasV: _, ...usable } = { biasV: 0, ...scan };
    assert.match((await refused(() => read(files, usable))).message, sentence);
  }
});

test('several biases: names tell them apart, the recipe says which comes first', async () => {
  const files = { 'S.current.4V.tif': current(), 'S.current.5V.tif': current(), 'S.current.5V.return.tif': current(), 'S.height.tif': height() };
  const scan = { widthUm: 0.1, heightUnit: 'nm', currentUnit: 'pA' };
  const order = (sample: Sample) => sample.channels.map(({ quantity, direction, biasV }) => [quantity, direction, biasV]);
  assert.deepEqual(order(await read(files, scan)), [['height', 'forward', undefined], ['current', 'forward', 5], ['current', 'forward', 4], ['current', 'return', 5]]);
  assert.deepEqual(order(await read(files, { ...scan, biasV: 4 }))[1], ['current', 'forward', 4]);
  const one = await read({ 'S.current.4V.tif': current() }, { ...scan, biasV: 4.2 });
  assert.deepEqual([one.channels[0]!.biasV, codes(one)], [4.2, ['bias-overridden']]);
});

test('surface, frame and outlines', async () => {
  const polygon = { type: 'Feature', properties: { layer: 'barrier' }, geometry: { type: 'Polygon', coordinates: [[[0, 0], [0.05, 0], [0.05, 0.02], [0, 0.02], [0, 0]]] } };
  const files = { 'S.height.tif': height(), 'S.json': sidecar({ ...full, surface: 'stack' }), 'S.outlines.geojson': sidecar(polygon) };
  const sample = await read(files, { centreXUm: 3, centreYUm: -2, rotationDeg: 30, slowUp: true });
  assert.equal(sample.surface, 'stack');
  assert.deepEqual(sample.frame, { centreXM: 3e-6, centreYM: -2e-6, rotationDeg: 30, slowUp: true });
  assert.deepEqual([...sample.footprint.data.subarray(15)], [1, 1, 0, 0, 0]);
  assert.equal(sample.footprint.data.reduce((sum, v) => sum + v, 0), 2);
  assert.equal(sample.outlines.length, 1);
  assert.equal(sample.sources.length, 3);
  const away = { ...polygon, geometry: { type: 'Polygon', coordinates: [[[5, 5], [6, 5], [6, 6], [5, 5]]] } };
  assert.equal((await refused(() => read({ ...files, 'S.outlines.geojson': sidecar(away) }))).code, 'footprint-empty');
});

test('a sidecar with none of our keys is ignored with a remark', async () => {
  const sample = await read({ 'S.height.tif': height(), 'S.json': sidecar({ operator: 'x' }) }, { widthUm: 0.1, heightUnit: 'nm' });
  assert.deepEqual(codes(sample), ['sidecar-ignored']);
});

test('a manifest row states what a sidecar would, and must not contradict it', async () => {
  const manifest = textBytes('sample,height,widthUm,heightUnit,surface\nflake,a.tif,0.1,nm,stack\n');
  const sample = await read({ 'tray.csv': manifest, 'a.tif': height() });
  assert.deepEqual([sample.name, sample.surface, Number(sample.grid.pitchXM.toPrecision(9))], ['flake', 'stack', 2e-8]);
  const both = await refused(() => read({ 'tray.csv': manifest, 'a.tif': height(), 'flake.json': sidecar({ widthUm: 0.2 }) }));
  assert.match(both.message, /flake: tray\.csv line 2 says widthUm 0\.1, flake\.json says 0\.2/);
});

test('a bias in the file, its name and sidecar or manifest must agree within 1 %; the recipe decides with a remark', async () => {
  const tagged = current(ours({ quantity: 'current', unit: 'pA', biasV: 5.9 }));
  const scan = { widthUm: 0.1 };
  const found = await read({ 'S.current.tif': tagged, 'S.json': sidecar({ biasV: 5.92 }) }, scan);
  assert.deepEqual([found.channels[0]!.biasV, codes(found)], [5.9, []]);
  const bySidecar = await refused(() => read({ 'S.current.tif': tagged, 'S.json': sidecar({ biasV: 4 }) }, scan));
  assert.equal(bySidecar.message, 'S.current.tif: its own description gives 5.9 V but the sidecar S.json gives 4 V; correct the wrong one, or decide with --set scan.biasV.');
  const manifest = textBytes('sample,current,biasV\nS,S.current.tif,4\n');
  assert.match((await refused(() => read({ 'tray.csv': manifest, 'S.current.tif': tagged }, scan))).message, /5\.9 V but tray\.csv line 2 gives 4 V/);
  assert.equal((await refused(() => read({ 'S.current.4V.tif': tagged }, scan))).code, 'bias-disagreement');
  assert.equal((await refused(() => read({ 'S.current.4V.tif': tagged, 'S.current.5V.tif': current() }, { ...scan, currentUnit: 'pA' }))).code, 'bias-disagreement');
  const decided = await read({ 'S.current.tif': tagged, 'S.json': sidecar({ biasV: 4 }) }, { ...scan, biasV: 4 });
  assert.deepEqual([decided.channels[0]!.biasV, codes(decided)], [4, ['bias-overridden']]);
});

test('a manifest row is among the sources: by what it states, not by how, nor by other rows', async () => {
  const files = (manifest: string) => ({ 'tray.csv': textBytes(manifest), 'a.tif': height() });
  const first = (await read(files('sample,height,widthUm,heightUnit,surface\nflake,a.tif,0.1,nm,stack\n'))).sources;
  assert.deepEqual(first.map(({ name }) => name), ['a.tif', 'tray.csv line 2']);
  const said = (await read(files('sample;surface;widthUm;heightUnit;height\n"flake";stack;0,10;nm;a.tif\n'))).sources;
  assert.deepEqual(said, first, 'the same statements');
  const bare = (await read(files('sample,height,widthUm,heightUnit,surface\nflake,a.tif,0.1,nm,barrier\n'))).sources;
  assert.deepEqual([bare[0], bare[1]!.sha256 === first[1]!.sha256], [first[0], false]);
});
