import assert from 'node:assert/strict';
import { deflateSync } from 'node:zlib';
import { test } from 'node:test';
import { fromArrayBuffer, getDecoder } from 'geotiff';
import { Problem } from '../../src/problems/problem.ts';
import { decodeMaps } from '../../src/read/decode.ts';
import { decodeLzw } from '../../src/read/tiff-lzw.ts';
import { float32Bytes, floatTiff, mapTags, writeTiff } from './write-tiff.ts';
import type { TagValue } from './write-tiff.ts';

const short = (value: number): TagValue => ({ type: 'short', values: [value] });
const long = (...values: number[]): TagValue => ({ type: 'long', values });

/** 5 × 4 map with fractions and both signs. */
const values = Array.from({ length: 20 }, (_, i) => (i - 7) * 1.25);

async function read(bytes: Uint8Array) {
  return decodeMaps({ name: 'a.tif', bytes });
}

async function refused(bytes: Uint8Array): Promise<Problem> {
  try {
    await read(bytes);
  } catch (error) {
    assert.ok(error instanceof Problem, String(error));
    assert.match(error.message, /^a\.tif/);
    return error;
  }
  assert.fail('it was read');
}

/** Horizontal differences of 32-bit words per row, as predictor 2 stores them. */
function differences(columns: number, words: Uint32Array): Uint8Array {
  const out = words.slice();
  for (let i = 0; i < out.length; i++) if (i % columns !== 0) out[i] = words[i]! - words[i - 1]!;
  return new Uint8Array(out.buffer);
}

/** Predictor 3: byte planes, most significant first, then byte differences per row. */
function floatDifferences(columns: number, source: readonly number[]): Uint8Array {
  const out: number[] = [];
  for (let start = 0; start < source.length; start += columns) {
    const big = float32Bytes(source.slice(start, start + columns), true);
    const planes = [0, 1, 2, 3].flatMap((b) => Array.from({ length: columns }, (_, i) => big[4 * i + b]!));
    planes.forEach((byte, i) => out.push((byte - (i === 0 ? 0 : planes[i - 1]!)) & 255));
  }
  return Uint8Array.from(out);
}

/** LZW encoder after TIFF 6.0, section 13. */
function encodeLzw(input: Uint8Array): Uint8Array {
  const out: number[] = [];
  let bits = 0;
  let held = 0;
  let width = 9;
  let next = 258;
  let table = new Map<string, number>();
  const emit = (code: number) => {
    bits = (bits << width) | code;
    held += width;
    while (held >= 8) { held -= 8; out.push((bits >> held) & 255); }
    bits &= (1 << held) - 1;
  };
  const codeOf = (text: string) => (text.length === 1 ? text.charCodeAt(0) : table.get(text));
  emit(256);
  let text = '';
  for (const byte of input) {
    const longer = text + String.fromCharCode(byte);
    if (codeOf(longer) !== undefined) { text = longer; continue; }
    emit(codeOf(text)!);
    table.set(longer, next++);
    text = String.fromCharCode(byte);
    if (next === 512 || next === 1024 || next === 2048) width++;
    if (next === 4095) { emit(256); table = new Map(); next = 258; width = 9; }
  }
  if (text !== '') { emit(codeOf(text)!); if (next + 1 === 512 || next + 1 === 1024 || next + 1 === 2048) width++; }
  emit(257);
  if (held > 0) out.push((bits << (8 - held)) & 255);
  return Uint8Array.from(out);
}

test('plain floats in both byte orders and as BigTIFF are read exactly', async () => {
  for (const bigEndian of [false, true]) {
    for (const big of [false, true]) {
      const bytes = writeTiff([{ tags: mapTags(5, 4, 32, 3), blocks: [float32Bytes(values, bigEndian)] }], { bigEndian, big });
      const [map] = await read(bytes);
      assert.deepEqual([map!.columns, map!.rows, [...map!.values]], [5, 4, values]);
    }
  }
});

test('strips of unequal height and tiles beyond the edge are put together', async () => {
  const strips = [values.slice(0, 15), values.slice(15)].map((part) => float32Bytes(part));
  const [striped] = await read(writeTiff([{ tags: mapTags(5, 4, 32, 3, { 278: long(3) }), blocks: strips }]));
  assert.deepEqual([...striped!.values], values);
  // Two tiles of 4 × 4: the second holds one column of the map and padding of 99.
  const tile = (c0: number) => float32Bytes(Array.from({ length: 16 }, (_, i) => { const c = c0 + (i % 4); return c < 5 ? values[Math.floor(i / 4) * 5 + c]! : 99; }));
  const { 278: _, ...tags } = mapTags(5, 4, 32, 3, { 322: long(4), 323: long(4) });
  const [tiled] = await read(writeTiff([{ tags, blocks: [tile(0), tile(4)], tiled: true }]));
  assert.deepEqual([...tiled!.values], values);
});

test('deflate and LZW with all predictors give the same values, and geotiff agrees', async () => {
  const plain = float32Bytes(values);
  const horizontal = differences(5, new Uint32Array(plain.buffer));
  const floating = floatDifferences(5, values);
  for (const [compression, pack] of [[8, deflateSync], [32946, deflateSync], [5, encodeLzw]] as const) {
    for (const [predictor, stored] of [[1, plain], [2, horizontal], [3, floating]] as const) {
      const block = new Uint8Array(pack(stored));
      const bytes = writeTiff([{ tags: mapTags(5, 4, 32, 3, { 259: short(compression), 317: short(predictor) }), blocks: [block] }]);
      const [map] = await read(bytes);
      assert.deepEqual([...map!.values], values, `compression ${compression}, predictor ${predictor}`);
      const image = await (await fromArrayBuffer(bytes.slice().buffer)).getImage();
      const [band] = await image.readRasters() as unknown as [Float32Array];
      assert.deepEqual([...band], values, `geotiff, compression ${compression}, predictor ${predictor}`);
    }
  }
});

test('predictors in a big-endian file are undone in its own byte order', async () => {
  const words = new Uint32Array(float32Bytes(values).buffer);
  const horizontal = differences(5, words);
  for (let i = 0; i < horizontal.length; i += 4) horizontal.subarray(i, i + 4).reverse();
  for (const [predictor, stored] of [[2, horizontal], [3, floatDifferences(5, values)]] as const) {
    const page = { tags: mapTags(5, 4, 32, 3, { 259: short(8), 317: short(predictor) }), blocks: [new Uint8Array(deflateSync(stored))] };
    const [map] = await read(writeTiff([page], { bigEndian: true }));
    assert.deepEqual([...map!.values], values);
  }
});

test('LZW survives table resets, agrees with geotiff and stops at the expected length', async () => {
  let state = 1;
  const input = Uint8Array.from({ length: 60_000 }, () => { state = (state * 48271) % 2147483647; return state & 15; });
  const packed = encodeLzw(input);
  assert.deepEqual(decodeLzw(packed, input.length), input);
  const other = await getDecoder(5, { tileWidth: 0, tileHeight: 0, predictor: 1, bitsPerSample: [8], planarConfiguration: 1 });
  assert.deepEqual(new Uint8Array(await other.decodeBlock(packed.slice().buffer)), input);
  assert.deepEqual(decodeLzw(packed, 1001), input.slice(0, 1001));
  assert.equal(decodeLzw(packed, 70_000)!.length, 60_000);
  assert.equal(decodeLzw(Uint8Array.of(0x80, 0x7f, 0xff, 0xff), 10), undefined);
});

test('large deflate blocks go through the platform’s stream and give the same values', async () => {
  const columns = 256;
  const rows = 256;
  let state = 7;
  const noise = Array.from({ length: columns * rows }, () => { state = (state * 48271) % 2147483647; return Math.fround(state / 2147483647); });
  const block = new Uint8Array(deflateSync(float32Bytes(noise)));
  assert.ok(block.length > 65536, 'long enough for the stream');
  // Junk after the stream, as files with an overstated count have, is no damage.
  const padded = new Uint8Array(block.length + 100);
  padded.set(block);
  const tags = mapTags(columns, rows, 32, 3, { 259: short(8) });
  for (const stored of [block, padded]) assert.deepEqual([...(await read(writeTiff([{ tags, blocks: [stored] }])))[0]!.values], noise);
  const cut = await refused(writeTiff([{ tags, blocks: [block.slice(0, 70_000)] }]));
  assert.ok(['tiff-damaged', 'file-truncated'].includes(cut.code), cut.code);
});

test('integers of every width and sign are exact', async () => {
  const cases: [number, 1 | 2, (view: DataView, i: number, v: number) => void, number[]][] = [
    [8, 1, (view, i, v) => view.setUint8(i, v), [0, 255]],
    [8, 2, (view, i, v) => view.setInt8(i, v), [-128, 127]],
    [16, 2, (view, i, v) => view.setInt16(2 * i, v, true), [-32768, 32767]],
    [32, 1, (view, i, v) => view.setUint32(4 * i, v, true), [0, 4294967295]],
    [32, 2, (view, i, v) => view.setInt32(4 * i, v, true), [-2147483648, 2147483647]],
    [64, 2, (view, i, v) => view.setBigInt64(8 * i, BigInt(v), true), [-9007199254740991, 9007199254740991]],
  ];
  for (const [bits, format, set, ends] of cases) {
    const numbers = Array.from({ length: 16 }, (_, i) => ends[i] ?? i);
    const view = new DataView(new ArrayBuffer(2 * bits));
    numbers.forEach((v, i) => set(view, i, v));
    const [map] = await read(writeTiff([{ tags: mapTags(4, 4, bits, format), blocks: [new Uint8Array(view.buffer)] }]));
    assert.deepEqual([...map!.values], numbers, `${bits} bits, format ${format}`);
  }
});

test('byte counts that overstate a strip are clamped, ones that understate it are refused', async () => {
  const block = float32Bytes(values);
  const page = (count: number) => writeTiff([{ tags: mapTags(5, 4, 32, 3, { 279: long(count) }), blocks: [block] }]);
  assert.deepEqual([...(await read(page(640)))[0]!.values], values);
  assert.equal((await refused(page(40))).code, 'tiff-damaged');
});

test('GDAL’s missing value and orientation are applied', async () => {
  const [missing] = await read(floatTiff(5, 4, values, { 42113: { type: 'ascii', text: '-8.75' } }));
  assert.ok(Number.isNaN(missing!.values[0]));
  assert.deepEqual([...missing!.values.subarray(1)], values.slice(1));
  const [flipped] = await read(floatTiff(5, 4, values, { 274: short(4) }));
  assert.deepEqual([...flipped!.values.subarray(0, 5)], values.slice(15));
  const [turned] = await read(floatTiff(5, 4, values, { 274: short(3) }));
  assert.deepEqual([...turned!.values], [...values].reverse());
  assert.match((await refused(floatTiff(5, 4, values, { 274: short(6) }))).message, /on its side/);
});

test('pictures, odd types and unread compressions are refused by what they are', async () => {
  const block = new Uint8Array(1000);
  const page = (tags: Record<number, TagValue>) => writeTiff([{ tags, blocks: [block] }]);
  const cases: [Record<number, TagValue>, RegExp][] = [
    [mapTags(5, 4, 8, 1, { 262: short(2), 277: short(3), 258: { type: 'short', values: [8, 8, 8] } }), /coloured picture, not data/],
    [mapTags(5, 4, 8, 1, { 262: short(3) }), /coloured picture, not data/],
    [mapTags(16, 16, 1, 1), /1 bit per pixel/],
    [mapTags(5, 4, 32, 3, { 277: short(2) }), /2 values per pixel/],
    [mapTags(5, 4, 24, 3), /float values of 24 bits/],
    [mapTags(5, 4, 32, 3, { 339: short(6) }), /complex values of 32 bits/],
    [mapTags(5, 4, 8, 1, { 259: short(7) }), /compression 7/],
    [mapTags(1, 4, 32, 3), /at least 4 × 4/],
  ];
  for (const [tags, sentence] of cases) assert.match((await refused(page(tags))).message, sentence);
});

test('sizes that the file cannot hold are refused before anything is allocated', async () => {
  const huge = await refused(writeTiff([{ tags: mapTags(2 ** 31, 2 ** 31, 32, 3), blocks: [new Uint8Array(64)] }]));
  assert.equal(huge.code, 'map-too-large');
  assert.match(huge.message, /2147483648 × 2147483648/);
  const claimed = await refused(writeTiff([{ tags: mapTags(19_000, 19_000, 32, 3, { 279: long(19_000 * 19_000 * 4) }), blocks: [new Uint8Array(64)] }]));
  assert.equal(claimed.code, 'file-truncated');
  const packed = await refused(writeTiff([{ tags: mapTags(19_000, 19_000, 32, 3, { 259: short(8) }), blocks: [new Uint8Array(64)] }]));
  assert.equal(packed.code, 'file-truncated');
  // Many strips that all point at the same bytes.
  const shared = writeTiff([{ tags: mapTags(100, 4000, 32, 3, { 278: long(1), 273: long(...Array(4000).fill(8)), 279: long(...Array(4000).fill(400)) }), blocks: [] }]);
  assert.equal((await refused(shared)).code, 'file-truncated');
});

test('a file cut anywhere gives one sentence and never another kind of error', async () => {
  const whole = floatTiff(5, 4, values, { 33550: { type: 'double', values: [0.02, 0.02, 0] } });
  for (let length = 4; length < whole.length - 4; length++) {
    const problem = await refused(whole.slice(0, length));
    assert.ok(problem.message.length < 200);
  }
});

test('a circle of pages is refused', async () => {
  const bytes = floatTiff(5, 4, values);
  const at = new DataView(bytes.buffer).getUint32(4, true);
  const entries = new DataView(bytes.buffer).getUint16(at, true);
  new DataView(bytes.buffer).setUint32(at + 2 + 12 * entries, at, true);
  assert.match((await refused(bytes)).message, /circle/);
});

test('pages, their names and what they state; previews are left out', async () => {
  const block = float32Bytes(values);
  const tags = (more: Record<number, TagValue>) => mapTags(5, 4, 32, 3, more);
  const maps = await read(writeTiff([
    { tags: tags({ 285: { type: 'ascii', text: 'Height' } }), blocks: [block] },
    { tags: tags({ 254: long(1) }), blocks: [block] },
    { tags: tags({ 270: { type: 'ascii', text: 'Current retrace' } }), blocks: [block] },
    { tags: tags({ 270: { type: 'ascii', text: '{"evenglow":1,"quantity":"current","unit":"pA","pitchUnit":"um","biasV":-4.5}' }, 33550: { type: 'double', values: [0.02, 0.03, 0] } }), blocks: [block] },
    { tags: tags({ 282: { type: 'rational', values: [1_000_000] }, 283: { type: 'rational', values: [500_000] }, 296: short(3) }), blocks: [block] },
    { tags: tags({ 282: { type: 'rational', values: [300] }, 283: { type: 'rational', values: [300] }, 296: short(2) }), blocks: [block] },
  ]));
  assert.deepEqual(maps.map(({ quantity, direction }) => [quantity, direction]), [['height', undefined], ['current', 'return'], ['current', undefined], [undefined, undefined], [undefined, undefined]]);
  assert.deepEqual(maps[2]!.unit, { word: 'pA', by: 'tag' });
  assert.equal(maps[2]!.biasV, -4.5);
  assert.deepEqual(maps[2]!.pitches, [{ by: 'tag', xM: 0.02e-6, yM: 0.03e-6 }]);
  assert.deepEqual(maps[3]!.pitches, [{ by: 'resolution', xM: 1e-8, yM: 2e-8 }]);
  // 300 dots per inch are 85 µm: the resolution of a picture, not of a scan.
  assert.deepEqual(maps[4]!.pitches, []);
});

test('a map of 1024 × 1024 floats reads in well under 150 ms', async () => {
  const block = new Uint8Array(4 << 20);
  // Built by hand: the test's writer works byte by byte.
  const head = floatTiff(4, 4, Array(16).fill(1));
  const at = new DataView(head.buffer).getUint32(4, true);
  const bytes = new Uint8Array(head.length + block.length);
  bytes.set(head);
  const view = new DataView(bytes.buffer);
  const edit: Record<number, number> = { 256: 1024, 257: 1024, 278: 1024, 273: head.length, 279: block.length };
  for (let i = 0; i < view.getUint16(at, true); i++) {
    const entry = at + 2 + 12 * i;
    const value = edit[view.getUint16(entry, true)];
    if (value !== undefined) view.setUint32(entry + 8, value, true);
  }
  new Float32Array(bytes.buffer, Math.ceil(head.length / 4) * 4, 1000).fill(2.5);
  let best = Infinity;
  for (let run = 0; run < 5; run++) {
    const start = performance.now();
    await read(bytes);
    best = Math.min(best, performance.now() - start);
  }
  assert.ok(best < 150, `${best.toFixed(1)} ms`);
});
