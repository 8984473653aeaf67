import assert from 'node:assert/strict';
import { test } from 'node:test';
import { surfaceTexture } from '../../src/ground/texture.ts';
import { assertClose } from '../fixtures/assert-close.ts';

const nan = Number.NaN;
const grid = { columns: 4, rows: 3, pitchXM: 2, pitchYM: 5 };
const all = new Uint8Array(12).fill(1);

test('four heights by hand; what is missing or off the mask has no say', () => {
  const height = Float32Array.of(1, 3, nan, 900, 5, 7, nan, 900, -900, -900, nan, nan);
  const mask = Uint8Array.of(1, 1, 1, 0, 1, 1, 1, 0, 0, 0, 1, 1);
  const found = surfaceTexture(height, grid, mask);
  // About the mean 4: −3, −1, 1, 3.
  assert.equal(found.pixels, 4);
  assertClose(found.sqM, Math.sqrt(5), 1e-12);
  assertClose(found.saM, 2, 1e-12);
  assertClose(found.ssk, 0, 0, '', 1e-12);
  assertClose(found.sku, 41 / 25, 1e-12);
  assert.deepEqual([found.spM, found.svM, found.szM], [3, 3, 6]);
  assert.equal(found.gradientPixels, 0);
  assert.ok(Number.isNaN(found.sdq) && Number.isNaN(found.sdr));
});

test('slopes are central differences with each direction’s own pitch, only where all four neighbours count', () => {
  const height = Float32Array.from({ length: 12 }, (_, i) => 8 * (i % 4) + 15 * Math.floor(i / 4));
  const { gradientPixels, sdq, sdr } = surfaceTexture(height, grid, all);
  assert.equal(gradientPixels, 2);
  // 8 per 2 along a line, 15 per 5 across: slope 5.
  assertClose(sdq, 5, 1e-12);
  assertClose(sdr, Math.sqrt(26) - 1, 1e-12);
  for (const gap of [1, 4, 6, 9]) {
    const holed = height.slice();
    holed[gap] = nan;
    assert.ok(surfaceTexture(holed, grid, all).gradientPixels < 2, `missing ${gap}`);
    assert.ok(surfaceTexture(height, grid, all.map((_, i) => (i === gap ? 0 : 1))).gradientPixels < 2, `masked ${gap}`);
  }
  // A corner is nobody's neighbour.
  assert.equal(surfaceTexture(height, grid, all.map((_, i) => (i === 0 ? 0 : 1))).gradientPixels, 2);
});

test('a constant changes nothing, a factor scales, a mirror turns the skewness of heights turned over', () => {
  const height = Float32Array.of(0, 4, 1, 0, 2, 0, 0, 8, 1, 0, 0, 0);
  const base = surfaceTexture(height, grid, all);
  const raised = surfaceTexture(height.map((z) => z + 64), grid, all);
  assertClose(raised.sqM, base.sqM, 1e-12);
  assertClose(raised.ssk, base.ssk, 1e-12);
  const turned = surfaceTexture(height.map((z) => -2 * z), grid, all);
  assertClose(turned.sqM, 2 * base.sqM, 1e-12);
  assertClose(turned.ssk, -base.ssk, 1e-12);
  assertClose(turned.sku, base.sku, 1e-12);
  assertClose(turned.svM, 2 * base.spM, 1e-12);
  assertClose(turned.sdq, 2 * base.sdq, 1e-12);
});

test('nothing on the mask gives no number; flat ground no skewness', () => {
  const none = surfaceTexture(new Float32Array(12), grid, new Uint8Array(12));
  assert.equal(none.pixels, 0);
  for (const value of [none.sqM, none.saM, none.ssk, none.sku, none.spM, none.svM, none.szM, none.sdq, none.sdr]) assert.ok(Number.isNaN(value));
  const flat = surfaceTexture(new Float32Array(12), grid, all);
  assert.deepEqual([flat.sqM, flat.szM, flat.sdq, flat.sdr], [0, 0, 0, 0]);
  assert.ok(Number.isNaN(flat.ssk) && Number.isNaN(flat.sku));
});
