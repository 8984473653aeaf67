/** The same science as in Node, computed in Chromium: arrays, recipe and TIFF reading. */
import { assert } from 'chai';
import { fromArrayBuffer } from 'geotiff';
import ops from 'ndarray-ops';
import { pixelAreaM2, pixelCentre, scalarMap } from '../../src/grid/maps.ts';
import { recipeSchema } from '../../src/recipe/recipe.ts';

const grid = { columns: 3, rows: 2, pitchXM: 1e-8, pitchYM: 2e-8 };

describe('maps in the browser', () => {
  it('indexes row by row from the picture’s top', () => {
    const map = scalarMap(grid, Float32Array.of(1, 2, 3, 4, 5, 6));
    assert.deepEqual(map.shape, [2, 3]);
    assert.equal(map.get(0, 2), 3);
    assert.equal(map.get(1, 0), 4);
  });

  it('places the top-left pixel high on the sample', () => {
    const { xM, yM } = pixelCentre(grid, 0, 0);
    assert.closeTo(xM, 0.5e-8, 1e-20);
    assert.closeTo(yM, 3e-8, 1e-20);
    assert.closeTo(pixelAreaM2(grid), 2e-16, 1e-28);
  });

  it('computes whole-map arithmetic and keeps missing values missing', () => {
    const map = scalarMap(grid, Float32Array.of(1, 2, 3, Number.NaN, 5, 6));
    ops.mulseq(map, 2);
    assert.deepEqual([...map.data], [2, 4, 6, Number.NaN, 10, 12]);
  });

  it('refuses data of another size', () => {
    assert.throws(() => scalarMap(grid, new Float32Array(5)), /needs 6 values, got 5/);
  });
});

describe('the recipe in the browser', () => {
  const head = { format: 'evenglow-recipe', version: 1 };

  it('fills every section with its defaults', () => {
    const recipe = recipeSchema.parse(head);
    assert.equal(recipe.barrier.heightEv, 2.5);
    assert.equal(recipe.band.factor, 3);
    assert.equal(recipe.scan.surface, 'barrier');
  });

  it('refuses an unknown key and says where it stands', () => {
    const result = recipeSchema.safeParse({ ...head, band: { factr: 2 } });
    assert.isFalse(result.success);
    assert.deepEqual(result.error?.issues.map((issue) => [issue.code, issue.path]), [['unrecognized_keys', ['band']]]);
  });
});

describe('TIFF reading in the browser', () => {
  it('reads the float values of a strip', async () => {
    const image = await (await fromArrayBuffer(floatTiff(2, 2, [1.5, -2.25, 3e-12, Number.NaN]))).getImage();
    assert.equal(image.getWidth(), 2);
    const raster = await image.readRasters({ interleave: true });
    assert.deepEqual([...(raster as Float32Array)], [1.5, -2.25, Math.fround(3e-12), Number.NaN]);
  });
});

/** A little-endian TIFF of one strip of 32-bit floats, written entry by entry (TIFF 6.0, sections 2 and 19). */
function floatTiff(columns: number, rows: number, values: readonly number[]): ArrayBuffer {
  const long = 4;
  const short = 3;
  const entries: readonly (readonly [tag: number, type: number, value: number])[] = [
    [256, long, columns], [257, long, rows], [258, short, 32], [259, short, 1], [262, short, 1],
    [273, long, 8], [277, short, 1], [278, long, rows], [279, long, 4 * values.length], [339, short, 3],
  ];
  const directory = 8 + 4 * values.length;
  const view = new DataView(new ArrayBuffer(directory + 2 + 12 * entries.length + 4));
  view.setUint32(0, 0x002a4949, true);
  view.setUint32(4, directory, true);
  values.forEach((value, index) => { view.setFloat32(8 + 4 * index, value, true); });
  view.setUint16(directory, entries.length, true);
  entries.forEach(([tag, type, value], index) => {
    const at = directory + 2 + 12 * index;
    view.setUint16(at, tag, true);
    view.setUint16(at + 2, type, true);
    view.setUint32(at + 4, 1, true);
    view.setUint32(at + 8, value, true);
  });
  return view.buffer as ArrayBuffer;
}
