import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { fromArrayBuffer } from 'geotiff';
import UTIF from 'utif2';
import { parseStatement } from '../../src/read/tiff-statement.ts';
import { writeGeoTiff } from '../../src/report/geotiff-writer.ts';
import type { TiffValues } from '../../src/report/geotiff-writer.ts';
import { resultMaps } from '../../src/report/result-maps.ts';
import { codes, createAppraisal, createHeightOnlyAppraisal, createRelativeAppraisal, currentsA, grid, heightsM } from '../fixtures/create-appraisal.ts';

const small = { columns: 3, rows: 2, pitchXM: 20e-9, pitchYM: 30e-9 };

function bufferOf(bytes: Uint8Array): ArrayBuffer {
  return new Uint8Array(bytes).buffer;
}

async function readByGeotiff(bytes: Uint8Array) {
  const image = await (await fromArrayBuffer(bufferOf(bytes))).getImage();
  const [values] = await image.readRasters();
  return { image, values: values as TiffValues };
}

/** Pixels as utif2 finds them: raw bytes, which on a little-endian host are the values. */
function readByUtif(bytes: Uint8Array) {
  const [page] = UTIF.decode(bufferOf(bytes));
  assert.ok(page);
  UTIF.decodeImage(bufferOf(bytes), page);
  return { page, bytes: new Uint8Array(page.data) };
}

describe('GeoTIFF writer against two independent readers', () => {
  const cases: readonly (readonly [string, TiffValues])[] = [
    ['uint8', Uint8Array.of(0, 1, 2, 200, 254, 255)],
    ['uint32', Uint32Array.of(0, 1, 65536, 2 ** 31, 2 ** 32 - 1, 7)],
    ['float32', Float32Array.of(0, -1.5, 1e-13, Number.NaN, 3.4e38, 1e-40)],
  ];
  for (const [name, values] of cases) {
    it(`returns every ${name} value bit for bit, row 0 first`, async () => {
      const bytes = writeGeoTiff(small, values, 'x');
      const { image, values: read } = await readByGeotiff(bytes);
      assert.equal(image.getWidth(), 3);
      assert.equal(image.getHeight(), 2);
      assert.equal(read.constructor, values.constructor);
      assert.deepEqual([...read], [...values]);
      const { page, bytes: raw } = readByUtif(bytes);
      assert.equal(page.width, 3);
      assert.equal(page.height, 2);
      assert.deepEqual(raw, new Uint8Array(values.buffer));
    });
  }

  it('ties pixel (0,0) to the upper-left corner and scales in µm', async () => {
    const { image } = await readByGeotiff(writeGeoTiff(small, new Float32Array(6), 'x'));
    // geotiff gives y downwards as a negative resolution.
    assert.deepEqual(image.getResolution(), [0.02, -0.03, 0]);
    assert.deepEqual(image.getOrigin(), [0, 0.06, 0]);
    assert.deepEqual(image.getBoundingBox(), [0, 0, 0.06, 0.06]);
    const { page } = readByUtif(writeGeoTiff(small, new Float32Array(6), 'x'));
    assert.deepEqual(page['t33550'], [0.02, 0.03, 0]);
    assert.deepEqual(page['t33922'], [0, 0, 0, 0, 0.06, 0]);
  });

  it('declares NaN as missing for floats only', async () => {
    const floats = await readByGeotiff(writeGeoTiff(small, new Float32Array(6), 'x'));
    assert.ok(Number.isNaN(floats.image.getGDALNoData()));
    const whole = await readByGeotiff(writeGeoTiff(small, new Uint8Array(6), 'x'));
    assert.equal(whole.image.getGDALNoData(), null);
  });

  it('splits a map of many strips and joins it again', async () => {
    const wide = { columns: 500, rows: 101, pitchXM: 1e-8, pitchYM: 1e-8 };
    const values = Uint32Array.from({ length: 500 * 101 }, (_, index) => index * 7919);
    const bytes = writeGeoTiff(wide, values, 'a longer description');
    assert.deepEqual((await readByGeotiff(bytes)).values, values);
    assert.deepEqual(readByUtif(bytes).bytes, new Uint8Array(values.buffer));
    // 32 rows of 2000 bytes fit into 64 kB.
    const offsets = readByUtif(bytes).page['t273'];
    assert.ok(Array.isArray(offsets) && offsets.length === 4);
  });

  it('refuses values that do not fill the map and descriptions that TIFF cannot hold', () => {
    assert.throws(() => writeGeoTiff(small, new Uint8Array(5), 'x'), RangeError);
    assert.throws(() => writeGeoTiff(small, new Uint8Array(6), 'µm'), RangeError);
    assert.throws(() => writeGeoTiff(small, new Uint8Array(6), 'a\u0000b'), RangeError);
  });

  it('writes only part of a larger buffer when given a view', async () => {
    const view = Float32Array.of(9, 9, 1, 2, 3, 4, 5, 6).subarray(2);
    assert.deepEqual([...(await readByGeotiff(writeGeoTiff(small, view, 'x'))).values], [1, 2, 3, 4, 5, 6]);
  });
});

describe('maps of an appraisal', () => {
  async function read(file: string) {
    const map = resultMaps(createAppraisal()).find((candidate) => candidate.file === file);
    assert.ok(map, file);
    const { image, values } = await readByGeotiff(map.bytes());
    const description = await image.fileDirectory.loadValue('ImageDescription');
    assert.equal(typeof description, 'string');
    return { values, statement: parseStatement(file, String(description).replace(/\0+$/, '')) };
  }

  it('gives codes, flaw numbers, nm and A, each with its statement', async () => {
    const causesMap = await read('causes.tif');
    assert.deepEqual([...causesMap.values], codes);
    assert.deepEqual(causesMap.statement, { quantity: 'causes', pitchUnit: 'um' });
    const flawsMap = await read('flaws.tif');
    assert.equal(flawsMap.values[1 * grid.columns + 4], 1);
    assert.equal(flawsMap.values[7 * grid.columns], 2);
    const height = await read('height.tif');
    assert.deepEqual(height.statement, { quantity: 'height', unit: 'nm', pitchUnit: 'um' });
    assert.ok(Number.isNaN(height.values[2 * grid.columns]));
    heightsM.forEach((value, index) => {
      if (!Number.isNaN(value)) assert.ok(Math.abs((height.values[index] ?? 0) - value * 1e9) < 1e-5, `pixel ${index}`);
    });
    const current = await read('current.tif');
    assert.deepEqual(current.statement, { quantity: 'current', unit: 'A', pitchUnit: 'um', biasV: 4 });
    assert.deepEqual([...current.values], [...Float32Array.from(currentsA)]);
    const conditioned = await read('conditioned.tif');
    assert.equal(conditioned.values[2], Math.fround(1.18e-10 * 1.5));
    const barrier = await read('barrier.tif');
    assert.ok(Math.abs((barrier.values[2] ?? 0) - 3.996) < 1e-6);
    assert.equal((await read('layers.tif')).values[2], 12);
    assert.equal((await read('glow.tif')).values[2], 1);
  });

  it('leaves out the maps that have no data', () => {
    const files = (appraisal: ReturnType<typeof createAppraisal>) => resultMaps(appraisal).map(({ file }) => file);
    assert.deepEqual(files(createHeightOnlyAppraisal()), ['causes.tif', 'flaws.tif', 'height.tif']);
    assert.deepEqual(files(createRelativeAppraisal()), ['causes.tif', 'flaws.tif', 'current.tif', 'conditioned.tif', 'glow.tif']);
  });
});
