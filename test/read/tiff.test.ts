import assert from 'node:assert/strict';
import { deflateSync } from 'node:zlib';
import { test } from 'node:test';
import { fromArrayBuffer } from 'geotiff';
import { Problem } from '../../src/problems/problem.ts';
import { decodeMaps } from '../../src/read/decode.ts';
import { differences, encodeLzw, encodePackBits, float32Bytes, floatDifferences, floatTiff, mapTags, packCodes, writeTiff } from './write-tiff.ts';
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

// First in the file: once a process has read five kinds of numbers, geotiff's inner loop takes about three times as long.
test('a map of 1024 × 1024 floats reads in under 60 ms', async () => {
  const block = new Uint8Array(new Float32Array(1 << 20).fill(2.5).buffer);
  const bytes = writeTiff([{ tags: mapTags(1024, 1024, 32, 3), blocks: [block] }]);
  let best = Infinity;
  for (let run = 0; run < 5; run++) {
    const start = performance.now();
    const [map] = await read(bytes);
    assert.equal(map!.values[1_000_000], 2.5);
    best = Math.min(best, performance.now() - start);
  }
  assert.ok(best < 60, `${best.toFixed(1)} ms`);
});

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

test('deflate, LZW and PackBits with all predictors give the same values', async () => {
  const plain = float32Bytes(values);
  const horizontal = differences(5, new Uint32Array(plain.buffer));
  const floating = floatDifferences(5, values);
  for (const [compression, pack] of [[8, deflateSync], [32946, deflateSync], [5, encodeLzw], [32773, encodePackBits]] as const) {
    for (const [predictor, stored] of [[1, plain], [2, horizontal], [3, floating]] as const) {
      const block = new Uint8Array(pack(stored));
      const bytes = writeTiff([{ tags: mapTags(5, 4, 32, 3, { 259: short(compression), 317: short(predictor) }), blocks: [block] }]);
      const [map] = await read(bytes);
      assert.deepEqual([...map!.values], values, `compression ${compression}, predictor ${predictor}`);
    }
  }
});

/** The first page as geotiff alone reads it. */
async function geotiffAlone(bytes: Uint8Array): Promise<number[]> {
  const image = await (await fromArrayBuffer(bytes.slice().buffer)).getImage();
  return [...(await image.readRasters({ interleave: false }))[0]!];
}

test('predictors in a big-endian file are right, where geotiff alone is wrong', async () => {
  const words = new Uint32Array(float32Bytes(values).buffer);
  const horizontal = differences(5, words);
  for (let i = 0; i < horizontal.length; i += 4) horizontal.subarray(i, i + 4).reverse();
  for (const [predictor, stored] of [[2, horizontal], [3, floatDifferences(5, values)]] as const) {
    const bytes = writeTiff([{ tags: mapTags(5, 4, 32, 3, { 259: short(8), 317: short(predictor) }), blocks: [new Uint8Array(deflateSync(stored))] }], { bigEndian: true });
    assert.deepEqual([...(await read(bytes))[0]!.values], values, `predictor ${predictor}`);
    // When a newer geotiff makes this fail, the correction in tiff-values.ts can go.
    assert.notDeepEqual(await geotiffAlone(bytes), values, `predictor ${predictor}`);
  }
});

test('predictor 2 in big-endian tiles starts anew in each tile, with signs', async () => {
  const numbers = Array.from({ length: 20 }, (_, i) => (i * 7919) % 4001 - 2000);
  const tile = (c0: number) => {
    const view = new DataView(new ArrayBuffer(32));
    const at = (i: number) => (c0 + (i % 4) < 5 ? numbers[Math.floor(i / 4) * 5 + c0 + (i % 4)]! : 0);
    for (let i = 0; i < 16; i++) view.setInt16(2 * i, i % 4 === 0 ? at(i) : at(i) - at(i - 1));
    return new Uint8Array(deflateSync(new Uint8Array(view.buffer)));
  };
  const { 278: _, ...tags } = mapTags(5, 4, 16, 2, { 259: short(8), 317: short(2), 322: long(4), 323: long(4) });
  const [map] = await read(writeTiff([{ tags, blocks: [tile(0), tile(4)], tiled: true }], { bigEndian: true }));
  assert.deepEqual([...map!.values], numbers);
});

test('a big-endian file of very many strips is right, where geotiff alone is wrong', async () => {
  const numbers = Array.from({ length: 2400 }, (_, i) => i / 8);
  const blocks = Array.from({ length: 600 }, (_, r) => float32Bytes(numbers.slice(4 * r, 4 * r + 4), true));
  const bytes = writeTiff([{ tags: mapTags(4, 600, 32, 3, { 278: long(1) }), blocks }], { bigEndian: true });
  assert.deepEqual([...(await read(bytes))[0]!.values], numbers);
  // It reads the lists of strips, kept away from the directory, low byte first. Without this, they need not be passed to it.
  assert.notDeepEqual(await geotiffAlone(bytes).catch(() => undefined), numbers);
});

test('LZW survives table resets, junk after its end and a missing end code', async () => {
  let state = 1;
  const input = Uint8Array.from({ length: 60_000 }, () => { state = (state * 48271) % 2147483647; return state & 15; });
  const packed = encodeLzw(input);
  const tags = mapTags(300, 200, 8, 1, { 259: short(5) });
  const junk = Uint8Array.from([...packed, ...Array(5000).fill(0xff)]);
  for (const block of [packed, junk]) assert.deepEqual(Uint8Array.from((await read(writeTiff([{ tags, blocks: [block] }])))[0]!.values), input);
  const endless = writeTiff([{ tags: mapTags(4, 4, 8, 1, { 259: short(5) }), blocks: [packCodes([256, ...Array<number>(16).fill(3)])] }]);
  assert.deepEqual([...(await read(endless))[0]!.values], Array<number>(16).fill(3));
});

test('LZW blocks that would run away in geotiff are refused', async () => {
  const block = (side: number, ...codes: number[]) => writeTiff([{ tags: mapTags(side, side, 8, 1, { 259: short(5) }), blocks: [packCodes(codes)] }]);
  const cases: Record<string, Uint8Array> = {
    // 3838 ones fill the table and the map; from code 4093 geotiff would never come back.
    'a code without room': block(60, 256, ...Array<number>(3838).fill(1), 4093, 257),
    // Each code is one byte longer than the one before: 5 kB stand for 7 MB where the pixels need 60 kB.
    'a swelling block': block(245, 256, 1, ...Array.from({ length: 3800 }, (_, i) => 258 + i), 257),
    'a code not yet defined': block(4, 256, ...Array<number>(20).fill(1), 300, 257),
    'no first string': block(4, 256, 258, ...Array<number>(20).fill(1), 257),
    'an early end': block(60, 256, ...Array<number>(200).fill(1), 257),
  };
  for (const [name, bytes] of Object.entries(cases)) assert.match((await refused(bytes)).message, /compressed data are damaged/, name);
  // The same table, full, without that code.
  const [map] = await read(block(60, 256, ...Array<number>(3838).fill(1), 4092, 257));
  assert.ok(map!.values.every((value) => value === 1));
  const { 278: _, ...large } = mapTags(10_000, 10_000, 8, 1, { 259: short(5) });
  assert.match((await refused(writeTiff([{ tags: large, blocks: [new Uint8Array(40_000)] }]))).message, /100000000 bytes is too large for compression 5/);
});

test('PackBits blocks are cut where their pixels end, damaged ones refused', async () => {
  const tags = mapTags(5, 4, 8, 1, { 259: short(32773) });
  const block = (...bytes: number[]) => writeTiff([{ tags, blocks: [Uint8Array.from(bytes)] }]);
  const [map] = await read(block(2, 10, 11, 12, 256 - 16, 7, 0x81, 9, 0x81, 9));
  assert.deepEqual([...map!.values], [10, 11, 12, ...Array<number>(17).fill(7)]);
  for (const bytes of [[2, 10, 11, 12], [0x80, 1, 0x80, 1], [127, 1, 2, 3]]) assert.match((await refused(block(...bytes))).message, /compressed data are damaged/);
});

test('a deflate block that swells far beyond its pixels is refused and costs no more than they do', async () => {
  const swollen = new Uint8Array(deflateSync(new Uint8Array(80 << 20)));
  const before = process.memoryUsage().arrayBuffers;
  assert.match((await refused(writeTiff([{ tags: mapTags(200, 100, 32, 3, { 259: short(8) }), blocks: [swollen] }]))).message, /damaged or end too early/);
  assert.ok(process.memoryUsage().arrayBuffers - before < 16 << 20);
});

test('blocks that the file leaves out are missing, in strips and tiles', async () => {
  const { 278: _, ...tags } = mapTags(6, 8, 32, 3, { 322: long(4), 323: long(4), 324: long(8, 0, 72, 0), 325: long(64, 0, 64, 0) });
  const bytes = writeTiff([{ tags, blocks: [float32Bytes(Array<number>(16).fill(1)), float32Bytes(Array<number>(16).fill(2))], tiled: true }]);
  const [map] = await read(bytes);
  const row = (v: number) => [v, v, v, v, Number.NaN, Number.NaN];
  assert.deepEqual([...map!.values], [1, 1, 1, 1, 2, 2, 2, 2].flatMap(row));
  // Half floats, five to a strip: 0x3c00 is 1.
  const halves = mapTags(5, 4, 16, 3, { 278: long(1), 273: long(8, 8, 0, 8), 279: long(10, 10, 0, 10) });
  const [half] = await read(writeTiff([{ tags: halves, blocks: [Uint8Array.from({ length: 30 }, (_, i) => (i % 2) * 0x3c)] }]));
  assert.deepEqual([...half!.values], [1, 1, Number.NaN, 1].flatMap((v) => [v, v, v, v, v]));
});

test('large deflate blocks are read, also with junk after them, and refused when cut', async () => {
  let state = 7;
  const noise = Array.from({ length: 256 * 256 }, () => { state = (state * 48271) % 2147483647; return Math.fround(state / 2147483647); });
  const block = new Uint8Array(deflateSync(float32Bytes(noise)));
  // Junk after the stream, as files with an overstated count have, is no damage.
  const padded = new Uint8Array(block.length + 100);
  padded.set(block);
  const tags = mapTags(256, 256, 32, 3, { 259: short(8) });
  for (const stored of [block, padded]) assert.deepEqual([...(await read(writeTiff([{ tags, blocks: [stored] }])))[0]!.values], noise);
  assert.match((await refused(writeTiff([{ tags, blocks: [block.slice(0, 70_000)] }]))).message, /damaged or end too early/);
  const broken = block.slice();
  broken.fill(0xff, 1000, 2000);
  assert.match((await refused(writeTiff([{ tags, blocks: [broken] }]))).message, /damaged or end too early/);
  // All bytes are there, their checksum is another.
  const altered = block.slice();
  altered[altered.length - 1]! ^= 1;
  assert.match((await refused(writeTiff([{ tags, blocks: [altered] }]))).message, /damaged or end too early/);
});

test('integers of every width and sign are exact', async () => {
  const cases: [number, 1 | 2, (view: DataView, i: number, v: number) => void, number[]][] = [
    [8, 1, (view, i, v) => view.setUint8(i, v), [0, 255]],
    [8, 2, (view, i, v) => view.setInt8(i, v), [-128, 127]],
    [16, 2, (view, i, v) => view.setInt16(2 * i, v, true), [-32768, 32767]],
    [32, 1, (view, i, v) => view.setUint32(4 * i, v, true), [0, 4294967295]],
    [32, 2, (view, i, v) => view.setInt32(4 * i, v, true), [-2147483648, 2147483647]],
    [64, 1, (view, i, v) => view.setBigUint64(8 * i, BigInt(v), true), [0, 9007199254740991]],
    [64, 2, (view, i, v) => view.setBigInt64(8 * i, BigInt(v), true), [-9007199254740991, 9007199254740991, -1, -4294967296]],
  ];
  for (const [bits, format, set, ends] of cases) {
    const numbers = Array.from({ length: 16 }, (_, i) => ends[i] ?? i);
    const view = new DataView(new ArrayBuffer(2 * bits));
    numbers.forEach((v, i) => set(view, i, v));
    const [map] = await read(writeTiff([{ tags: mapTags(4, 4, bits, format), blocks: [new Uint8Array(view.buffer)] }]));
    assert.deepEqual([...map!.values], numbers, `${bits} bits, format ${format}`);
    const turned = new Uint8Array(view.buffer.slice(0));
    for (let at = 0; at < turned.length; at += bits / 8) turned.subarray(at, at + bits / 8).reverse();
    const [other] = await read(writeTiff([{ tags: mapTags(4, 4, bits, format), blocks: [turned] }], { bigEndian: true }));
    assert.deepEqual([...other!.values], numbers, `${bits} bits, format ${format}, big-endian`);
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
