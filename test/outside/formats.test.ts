/**
 * The read stage against files that other programs wrote and values that other programs computed.
 * Skipped where the shared data are not beside the project.
 */
import assert from 'node:assert/strict';
import { createHash } from 'node:crypto';
import { existsSync, readFileSync, readdirSync } from 'node:fs';
import { test } from 'node:test';
import UTIF from 'utif2';
import { Problem } from '../../src/problems/problem.ts';
import { decodeMaps } from '../../src/read/decode.ts';
import type { DecodedMap } from '../../src/read/decoded-map.ts';
import { groupInputs } from '../../src/read/pairing.ts';
import { readSample } from '../../src/read/read-sample.ts';
import { scanSection } from '../../src/read/recipe.ts';
import type { Sample } from '../../src/read/sample.ts';
import { sha256 } from '../../src/read/sha256.ts';

const data = new URL('../../../shared/data/', import.meta.url);
const scenes = new URL('../../../shared/scenes/', import.meta.url);
const skip = existsSync(data) ? false : 'the shared data are not here';
const bytesOf = (path: string): Uint8Array => readFileSync(new URL(path, data));

interface Expected {
  readonly shape: [number, number];
  readonly min: number;
  readonly max: number;
  readonly sum: number;
  readonly first_row_first5: number[];
  readonly last_row_last5: number[];
  readonly files: Record<string, { bytes: number; sha256: string }>;
}

/** [P] NumPy's values of one block of USGS elevations, see the data's SOURCE.txt: our value is `from(numpy value)`. */
const sameBlock: Record<string, (value: number) => number> = {
  'f32.tif': (v) => v, 'f32_big.tif': (v) => v, 'f32_deflate.tif': (v) => v, 'f32_res_cm.tif': (v) => v, 'f32_rows8.tif': (v) => v,
  'f32_tiled.tif': (v) => v, 'f64.tif': (v) => v, 'u16_be.tif': (v) => v, 'u16_le_strip.tif': (v) => v, 'i16.tif': (v) => v - 600,
  'f4_le.npy': (v) => v, 'f4_fortran.npy': (v) => v, 'f4_v2.npy': (v) => v, 'f8_be.npy': (v) => v, 'i2_le.npy': (v) => v, 'f2_le.npy': (v) => v - 600,
  'u1.npy': (v) => v >> 2, 'matrix.tsv': (v) => v, 'matrix_decimal_comma.csv': (v) => v / 10, 'matrix_exp.csv': (v) => v * 1e-9,
};

/** What is refused, and the sentence that must be true of it. */
const refusals: Record<string, RegExp> = {
  'f8_0d.npy': /0 dimensions/, 'f8_1d.npy': /1 dimensions \(shape \(64,\)\)/, 'i8_3d.npy': /3 dimensions \(shape \(2, 48, 64\)\)/, 'structured.npy': /structured/,
  'classic.nc': /not a format Evenglow reads/, 'maps_earliest.h5': /not a format Evenglow reads/, 'maps_latest.h5': /not a format Evenglow reads/,
  'two.npz': /not a format Evenglow reads/, 'two_deflate.npz': /not a format Evenglow reads/, 'u16.png': /not a format Evenglow reads/,
  'esri.asc': /not a format Evenglow reads/, 'points.xyz': /not a format Evenglow reads/,
};

/** Read, but other values than the block's: tested one by one below. */
const special = ['two_pages.tif', 'u8_bilevel.tif', 'bool.npy', 'f4_nan_inf.npy'];

test('every file of the format collection is read or refused by a true sentence', { skip }, async () => {
  const expected = JSON.parse(readFileSync(new URL('formats/expected.json', data), 'utf8')) as Expected;
  const [rows, columns] = expected.shape;
  const block = (await decodeMaps({ name: 'f64.tif', bytes: bytesOf('formats/f64.tif') }))[0]!.values as Float64Array;
  assert.deepEqual([...block.subarray(0, 5)], expected.first_row_first5);
  assert.deepEqual([...block.subarray(-5)], expected.last_row_last5);
  assert.equal(block.reduce((sum, v) => sum + v, 0), expected.sum);
  assert.deepEqual([Math.min(...block), Math.max(...block)], [expected.min, expected.max]);

  const names = readdirSync(new URL('formats/', data)).filter((name) => !['SOURCE.txt', 'expected.json'].includes(name));
  for (const name of names) {
    const bytes = bytesOf(`formats/${name}`);
    assert.equal(createHash('sha256').update(bytes).digest('hex'), expected.files[name]?.sha256, name);
    const turn = sameBlock[name];
    if (turn !== undefined) {
      const [map] = await decodeMaps({ name, bytes });
      assert.deepEqual([map!.columns, map!.rows], [columns, rows], name);
      const worst = Array.from(map!.values).reduce((most, v, i) => Math.max(most, Math.abs(v - turn(block[i]!)) / Math.max(Math.abs(turn(block[i]!)), 1e-30)), 0);
      // Text is rounded to doubles twice on its way; binary files are exact.
      assert.ok(worst <= (name.startsWith('matrix') ? 1e-14 : 0), `${name}: ${worst}`);
    } else if (refusals[name] !== undefined) {
      await assert.rejects(decodeMaps({ name, bytes }), (error) => error instanceof Problem && error.message.startsWith(name) && refusals[name]!.test(error.message), name);
    } else {
      assert.ok(special.includes(name), `${name} is not covered`);
    }
  }
});

test('two pages, threshold masks, NaN and infinity', { skip }, async () => {
  const block = (await decodeMaps({ name: 'f64.tif', bytes: bytesOf('formats/f64.tif') }))[0]!.values;
  const pages = await decodeMaps({ name: 'two_pages.tif', bytes: bytesOf('formats/two_pages.tif') });
  assert.equal(pages.length, 2);
  assert.ok(pages[0]!.values.every((v, i) => v === block[i]));
  assert.ok(pages[1]!.values.every((v, i) => v === block[i]! + 1));
  const [mask] = await decodeMaps({ name: 'u8_bilevel.tif', bytes: bytesOf('formats/u8_bilevel.tif') });
  const [flags] = await decodeMaps({ name: 'bool.npy', bytes: bytesOf('formats/bool.npy') });
  assert.ok(mask!.values.every((v, i) => v === 255 * flags!.values[i]!));
  const [gaps] = await decodeMaps({ name: 'f4_nan_inf.npy', bytes: bytesOf('formats/f4_nan_inf.npy') });
  assert.ok(Number.isNaN(gaps!.values[5 * 64 + 7]));
  assert.equal(gaps!.values[40 * 64 + 60], Infinity);
});

/** A page's numbers as utif2 decodes them. */
function otherReader(bytes: Uint8Array, map: DecodedMap, page: number): number[] | undefined {
  const copy = bytes.slice().buffer as ArrayBuffer;
  const pages = UTIF.decode(copy);
  const ifd = pages[page]!;
  UTIF.decodeImage(copy, ifd);
  // utif2 hands out 16-bit samples low byte first, whatever the file's order; the other files are little-endian.
  const little = true;
  const bits = (ifd['t258'] as number[])[0]!;
  const format = ((ifd['t339'] as number[] | undefined) ?? [1])[0]!;
  const pixels = ifd.data as Uint8Array;
  const view = new DataView(pixels.buffer, pixels.byteOffset, pixels.byteLength);
  const at = (i: number) => {
    if (format === 3) return bits === 32 ? view.getFloat32(4 * i, little) : view.getFloat64(8 * i, little);
    if (bits === 16) return format === 2 ? view.getInt16(2 * i, little) : view.getUint16(2 * i, little);
    return bits === 8 ? view.getUint8(i) : undefined;
  };
  if (pixels.length < (map.columns * map.rows * bits) / 8 || at(0) === undefined) return undefined;
  return Array.from({ length: map.columns * map.rows }, (_, i) => at(i)!);
}

test('[P] TIFF values equal those of a second reader (utif2) wherever it reads the file', { skip }, async () => {
  const files = readdirSync(new URL('formats/', data)).filter((name) => name.endsWith('.tif') && name !== 'f32_big.tif').map((name) => `formats/${name}`);
  files.push('topography-x3p/sample-land_um_f32.tif');
  let compared = 0;
  for (const path of files) {
    const bytes = new Uint8Array(bytesOf(path));
    for (const [page, map] of (await decodeMaps({ name: path, bytes })).entries()) {
      const other = otherReader(bytes, map, page);
      if (other === undefined) continue;
      compared++;
      assert.ok(map.values.every((v, i) => Object.is(v, other[i]) || v === other[i]), `${path}, page ${page + 1}`);
    }
  }
  assert.ok(compared >= 10, `${compared} pages compared`);
});

test('[P] a measured topography: 918 × 256 pixels, 25 292 of them missing, the same as TIFF and as array', { skip }, async () => {
  const [tif] = await decodeMaps({ name: 'a.tif', bytes: bytesOf('topography-x3p/sample-land_um_f32.tif') });
  const [npy] = await decodeMaps({ name: 'a.npy', bytes: bytesOf('topography-x3p/sample-land_um_f32.npy') });
  for (const map of [tif!, npy!]) {
    assert.deepEqual([map.columns, map.rows], [918, 256]);
    assert.equal(map.values.filter((v) => Number.isNaN(v)).length, 25_292);
  }
  assert.deepEqual(tif!.values, npy!.values);
  const present = [...tif!.values].filter((v) => !Number.isNaN(v));
  // Range in the data's SOURCE.txt, in metres to five digits.
  const least = present.reduce((a, b) => Math.min(a, b), Infinity) * 1e-6;
  const most = present.reduce((a, b) => Math.max(a, b), -Infinity) * 1e-6;
  assert.deepEqual([least.toExponential(4), most.toExponential(4)], ['-7.9473e-5', '5.2499e-5']);
});

async function sampleOf(paths: readonly string[], base: URL, scan: Record<string, unknown>): Promise<Sample> {
  const files = paths.map((path) => ({ name: path.split('/').at(-1)!, bytes: new Uint8Array(readFileSync(new URL(path, base))) }));
  const { samples } = groupInputs(files.map((file) => ({ ...file, explicit: true })));
  return readSample(samples[0]!, files, scanSection.parse(scan), sha256);
}

test('a measured current map without any statement is refused by name of all options, and read with them', { skip }, async () => {
  await assert.rejects(sampleOf(['current-map/GO_cafm.tif'], data, {}), (error) => error instanceof Problem
    && ['scan.channel', 'scan.currentUnit', 'scan.widthUm'].every((option) => error.message.includes(option)));
  const scan = { channel: 'current', currentUnit: 'relative', widthUm: 0.015, heightUm: 0.015 };
  const sample = await sampleOf(['current-map/GO_cafm.tif', 'current-map/GO_cafm.json'], data, scan);
  assert.deepEqual([sample.grid.columns, sample.grid.rows, sample.channels[0]!.unit], [915, 915, 'relative']);
  assert.ok(Math.abs(sample.grid.pitchXM / (15e-9 / 915) - 1) < 1e-12);
  assert.deepEqual(sample.warnings.map((warning) => warning.code), ['sidecar-ignored']);
  const values = sample.channels[0]!.values.data;
  assert.deepEqual([values.reduce((a, b) => Math.min(a, b), Infinity), values.reduce((a, b) => Math.max(a, b), -Infinity)], [0, 65535]);
  // Against the bytes themselves: one uncompressed little-endian strip at byte 146.
  const raw = new DataView(new Uint8Array(bytesOf('current-map/GO_cafm.tif')).buffer);
  for (const i of [0, 1, 914, 915, 400_000, 837_224]) assert.equal(values[i], raw.getUint16(146 + 2 * i, true));
});

test('the scenes read with their sidecars, without a remark', { skip: existsSync(scenes) ? skip : 'the scenes are not here' }, async () => {
  const sample = await sampleOf(['base-6.height.tif', 'base-6.current.tif', 'base-6.json'], scenes, {});
  assert.deepEqual([sample.name, sample.grid.columns, sample.grid.rows, sample.warnings], ['base-6', 384, 384, []]);
  assert.ok(Math.abs(sample.grid.pitchXM * 384 / 10e-6 - 1) < 1e-12);
  const [height, current] = sample.channels;
  assert.deepEqual([height!.unit, current!.unit, current!.biasV], ['m', 'A', 4]);
  const largest = current!.values.data.reduce((most, v) => (v > most ? v : most), -Infinity);
  assert.equal(largest, Math.fround(1e-8));
});
