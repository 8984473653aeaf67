import assert from 'node:assert/strict';
import { test } from 'node:test';
import { boxMean } from '../../src/ground/flat-segments.ts';
import { findRaised } from '../../src/flaws/find-raised.ts';
import type { RaisedInput } from '../../src/flaws/find-raised.ts';
import { seededRandom } from '../../src/stats/random.ts';

const side = 60;
const count = side * side;
const floorLog10 = -13;
const at = (c: number, r: number): number => r * side + c;
type Drawn = (c: number, r: number) => number;
const disc = (c0: number, r0: number, radius: number) => (c: number, r: number): boolean => Math.hypot(c - c0, r - r0) < radius;

interface Spec {
  readonly riseNm: Drawn;
  /** log10 of the current, A. */
  readonly log10?: Drawn;
  readonly onPlane?: (c: number, r: number) => boolean;
  readonly change?: Partial<RaisedInput>;
}

function find({ riseNm, log10, onPlane, change }: Spec) {
  const random = seededRandom('raised');
  const map = (of: Drawn, noise: number): Float32Array => Float32Array.from({ length: count }, (_, i) => of(i % side, Math.floor(i / side)) + noise * random.normal());
  const rise = map((c, r) => 1e-9 * riseNm(c, r), 0.05e-9);
  const current = log10 && map(log10, 0.04).map((value) => Math.min(-8, Math.max(floorLog10, value)));
  return findRaised({
    columns: side, rows: side, rise, smooth: boxMean(rise, side, side, 1), startM: 0.8e-9, edgeShare: 0.35, dropDecades: 0.5, minPixels: 4, layerM: 0.333e-9, layerDecades: 0.55,
    onPlane: Uint8Array.from({ length: count }, (_, i) => (onPlane?.(i % side, Math.floor(i / side)) ? 1 : 0)),
    ...(current ? { log10: current, floorLog10, floor: current.map((value) => (value <= floorLog10 ? 1 : 0)) as unknown as Uint8Array, saturated: current.map((value) => (value >= -8 ? 1 : 0)) as unknown as Uint8Array } : {}),
    ...change,
  });
}
const pixels = (mask: Uint8Array): number => mask.reduce((sum, value) => sum + value, 0);

const bubble = disc(30, 30, 10);
const dome: Drawn = (c, r) => Math.max(0, 20 * (1 - ((c - 30) ** 2 + (r - 30) ** 2) / 100));

test('what rises and has lost its current is flawed, out to where the current is lost', () => {
  const { mask, drop, conductingPixels } = find({ riseNm: dome, log10: (c, r) => (bubble(c, r) ? -13 : -9) });
  for (let i = 0; i < count; i++) if ((mask[i] === 1) !== bubble(i % side, Math.floor(i / side))) assert.fail(`pixel ${i % side}, ${Math.floor(i / side)}: ${mask[i]}`);
  assert.ok(drop![at(30, 30)]! > 3.8);
  assert.equal(conductingPixels, 0);
});

test('a flaw follows the missing current beyond its rise, which ends at 9.93 pixels, out to 12', () => {
  const { mask } = find({ riseNm: dome, log10: (c, r) => (Math.hypot(c - 30, r - 30) < 12 ? -13 : -9) });
  assert.equal(Array.from({ length: 30 }, (_, k) => mask[at(30 + k, 30)]!).lastIndexOf(1), 11);
});

test('what rises and conducts as before is a remark, what rises a little and conducts is nothing', () => {
  const high = find({ riseNm: (c, r) => (bubble(c, r) ? 3 : 0), log10: () => -9 });
  assert.deepEqual([pixels(high.mask), high.conductingPixels > 250], [0, true]);
  const low = find({ riseNm: (c, r) => (bubble(c, r) ? 0.5 : 0), log10: () => -9 });
  assert.deepEqual([pixels(low.mask), low.conductingPixels], [0, 0]);
});

test('height alone: from the start of the rise out to its edge share; no drop is known', () => {
  const found = find({ riseNm: dome });
  // 0.28 nm of 20: 0.993 of the radius.
  assert.ok(Math.abs(pixels(found.mask) - Math.PI * 100 * (1 - 0.28 / 20)) < 12, `${pixels(found.mask)}`);
  assert.equal(found.drop, undefined);
  assert.equal(found.byHeight, undefined);
});

test('beside saturated ground, beside ground at the floor and where the current is missing the height decides', () => {
  for (const around of [-7, -13, Number.NaN]) {
    const { mask } = find({ riseNm: dome, log10: (c, r) => (bubble(c, r) ? Math.min(-10, around) : around) });
    assert.equal(mask[at(30, 30)], 1, `${around}`);
    assert.ok(Math.abs(pixels(mask) - 314) < 30, `${around}: ${pixels(mask)}`);
  }
});

test('a pixel on its own terrace’s plane is no flaw, however far its current has fallen', () => {
  const terrace = (c: number): boolean => c >= 41;
  const { mask } = find({ riseNm: (c, r) => (bubble(c, r) ? dome(c, r) : 0), log10: (c, r) => (bubble(c, r) ? -13 : terrace(c) ? -10.1 : -9), onPlane: terrace });
  assert.equal(pixels(mask.filter((_, i) => terrace(i % side))), 0);
});

test('fewer pixels than the smallest flaw are noise, and what does not reach the start neither', () => {
  const speck = { riseNm: (c: number, r: number) => (c < 32 && c >= 30 && r === 30 ? 5 : 0), log10: (c: number, r: number) => (c < 32 && c >= 30 && r === 30 ? -12 : -9) };
  assert.equal(pixels(find(speck).mask), 0);
  assert.equal(pixels(find({ ...speck, change: { minPixels: 2 } }).mask), 2);
  assert.equal(pixels(find({ riseNm: (c, r) => (bubble(c, r) ? 0.6 : 0), log10: (c, r) => (bubble(c, r) ? -12 : -9) }).mask), 0);
});

test('a strip as high as one layer that costs as much as one is a step of the barrier; of another height, or at another cost, it is a film', () => {
  const strip = (c: number): boolean => c >= 28 && c < 34;
  const found = (layers: number, lost: number): number => pixels(find({ riseNm: (c) => (strip(c) ? 0.333 * layers : 0), log10: (c) => (strip(c) ? -9 - 0.55 * lost : -9), change: { startM: 0.25e-9, dropDecades: 0.3 } }).mask);
  assert.equal(found(1, 1), 0);
  assert.equal(found(2, 2), 0);
  assert.ok(found(1, 3) > 250);
  assert.ok(found(6, 3) > 250);
});

test('missing heights take no part', () => {
  const { mask } = find({ riseNm: (c, r) => (c < 30 ? Number.NaN : dome(c, r)), log10: (c, r) => (bubble(c, r) ? -13 : -9) });
  assert.equal(pixels(mask.filter((_, i) => i % side < 26)), 0);
  assert.ok(mask[at(34, 30)] === 1);
});
