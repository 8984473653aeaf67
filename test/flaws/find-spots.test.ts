import assert from 'node:assert/strict';
import test from 'node:test';
import { findOpens, findShorts } from '../../src/flaws/find-spots.ts';
import type { SpotsInput } from '../../src/flaws/find-spots.ts';
import { seededRandom } from '../../src/stats/random.ts';

const [columns, rows] = [64, 48];
const layerDecades = 1.2;
const saturationLog = -8;
const floorLog = -13;

interface Picture {
  /** log10 of the current before the amplifier clips it. */
  readonly log10: (c: number, r: number) => number;
  readonly riseM?: (c: number, r: number) => number;
  readonly lost?: (c: number, r: number) => boolean;
  readonly onPlane?: (c: number, r: number) => boolean;
}

/** A map of 64 × 48 pixels of 20 nm; noise 0.01 decades and 0.08 nm. */
function spotsOf({ log10, riseM = () => 0, lost = () => false, onPlane = () => false }: Picture): SpotsInput {
  const random = seededRandom('spots');
  const count = columns * rows;
  const at = (f: (c: number, r: number) => boolean): Uint8Array => Uint8Array.from({ length: count }, (_, i) => (f(i % columns, Math.floor(i / columns)) ? 1 : 0));
  const log = Float32Array.from({ length: count }, (_, i) => Math.min(saturationLog, Math.max(floorLog, log10(i % columns, Math.floor(i / columns)) + 0.01 * random.normal())));
  return {
    columns, rows, pixelAreaM2: 4e-16, log10: log, saturated: log.map((value) => (value >= saturationLog ? 1 : 0)) as unknown as Uint8Array,
    floor: at((c, r) => log[r * columns + c]! <= floorLog), raised: new Uint8Array(count), noiseM: 0.08e-9, lost: at(lost), onPlane: at(onPlane),
    rise: Float32Array.from({ length: count }, (_, i) => riseM(i % columns, Math.floor(i / columns)) + 0.08e-9 * random.normal()),
    shortDecades: 2 * layerDecades, layerDecades, shortMaxM2: 0.02e-12, terraceMinM2: 0.05e-12, minPixels: 4, layerM: 0.333e-9, pitM: 2.6e-9,
  };
}

const total = (mask: Uint8Array): number => mask.reduce((sum, value) => sum + value, 0);
const inside = (c: number, r: number, x: number, y: number, half: number): boolean => Math.abs(c - x) <= half && Math.abs(r - y) <= half;

test('short: a spot that saturates in ground two layers below it, with a pit or without', () => {
  for (const pitM of [0, 2e-9]) {
    const found = findShorts(spotsOf({ log10: (c, r) => (inside(c, r, 30, 20, 1) ? -6 : -10.6), riseM: (c, r) => (inside(c, r, 30, 20, 1) ? -pitM : 0) }));
    assert.equal(total(found), 9);
  }
});

test('short: in ground half a layer below saturation the height must tell it from a thinner terrace', () => {
  const spot = (pitM: number): number => total(findShorts(spotsOf({ log10: (c, r) => (inside(c, r, 30, 20, 1) ? -7.4 : -8.6), riseM: (c, r) => (inside(c, r, 30, 20, 1) ? -pitM : 0) })));
  assert.equal(spot(0), 0);
  assert.equal(spot(0.333e-9), 0, 'one layer thinner');
  assert.equal(spot(1.5e-9), 9);
});

test('no short: the corner of a terrace two layers thinner, and ground that brightens gradually', () => {
  // A terrace that narrows to a wedge: only its tip is narrower than the largest short.
  assert.equal(total(findShorts(spotsOf({ log10: (c, r) => (c - Math.abs(r - 24) > 12 ? -8.6 : -11.1) }))), 0);
  // Three decades over ten pixels, down again over ten.
  assert.equal(total(findShorts(spotsOf({ log10: (c) => -11.8 + Math.max(0, 3 - 0.3 * Math.abs(c - 32)) }))), 0);
});

test('open: a dead spot in bright ground; not the edge of a terrace at the floor, nor a line that lost contact', () => {
  const opens = (picture: Picture): number => total(findOpens(spotsOf(picture)).opens);
  assert.equal(opens({ log10: (c, r) => (inside(c, r, 30, 20, 2) ? -14 : -10) }), 25);
  // A terrace at the floor from column 40 on, whose plane is known but along its border.
  assert.equal(opens({ log10: (c) => (c >= 40 ? -14 : -10), onPlane: (c) => c < 40 || c > 41 }), 0);
  // On ground that noise lifts over the floor at every other pixel the plane tells what is terrace; where it is not known, the dark border does.
  const speckled: Picture = { log10: (c, r) => (inside(c, r, 30, 20, 2) || (c + r) % 2 === 0 ? -14 : -12), onPlane: (c, r) => !inside(c, r, 30, 20, 2) };
  assert.equal(opens(speckled), 0);
  assert.equal(opens({ log10: (_, r) => (r === 20 ? -14 : -10) }), columns);
  assert.equal(opens({ log10: (_, r) => (r === 20 ? -14 : -10), lost: (_, r) => r === 20 }), 0);
});
