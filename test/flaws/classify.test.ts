/** Shapes of raised regions drawn on a flat ground with noise, measured and classed. */
import assert from 'node:assert/strict';
import { test } from 'node:test';
import { classifyRaised } from '../../src/flaws/classify.ts';
import type { Region } from '../../src/flaws/measure.ts';
import { measureRegions } from '../../src/flaws/measure.ts';
import { squaredDistance } from '../../src/grid/distance.ts';
import { seededRandom } from '../../src/stats/random.ts';
import { assertClose } from '../fixtures/assert-close.ts';

const side = 64;
const pitchM = 20e-9;

/** Measures what rises: `riseNm` at columns and rows from the middle, 0 and below being ground. */
function measured(riseNm: (x: number, y: number) => number, noiseNm = 0.08, seed = 'shape'): Region {
  const random = seededRandom(seed);
  const mask = new Uint8Array(side * side);
  const rise = new Float32Array(side * side);
  for (let i = 0; i < mask.length; i++) {
    const nm = riseNm((i % side) - 31.5, Math.floor(i / side) - 31.5);
    mask[i] = nm > 0 ? 1 : 0;
    rise[i] = (nm + noiseNm * random.normal()) * 1e-9;
  }
  const all = { columns: side, rows: side, pitchXM: pitchM, pitchYM: pitchM, labels: Uint32Array.from(mask), count: 1 };
  const floor = mask.slice();
  const log10 = Float32Array.from(mask, (mark) => (mark === 1 ? -13 : -9));
  const drop = Float32Array.from(mask, (mark) => 4 * mark);
  return measureRegions({ ...all, rise, floor, log10, drop, distance2: squaredDistance(mask, side, side, { pitchX: pitchM, pitchY: pitchM }) })[0]!;
}

const at = (radius: number, shape: (rho: number) => number) => (x: number, y: number): number => {
  const rho = Math.hypot(x, y) / radius;
  return rho < 1 ? shape(rho) : 0;
};
const dome = (peakNm: number, radius: number) => at(radius, (rho) => peakNm * (1 - rho * rho));
const cone = (peakNm: number, radius: number) => at(radius, (rho) => peakNm * (1 - rho));

test('fullness and shares are those of the ideal shapes [F]', () => {
  const paraboloid = measured(dome(20, 24), 0);
  assertClose(paraboloid.fullness, 0.5, 0.02);
  assert.ok(paraboloid.domeShare > 0.995);
  // Mean 1/3 of the peak, 95 % quantile 1 − √0.05 = 0.776 of it; a paraboloid explains 24/25 of a cone's variance.
  const pointed = measured(cone(20, 24), 0);
  assertClose(pointed.fullness, 0.95 / 3 / (1 - Math.sqrt(0.05)), 0.02);
  assertClose(pointed.domeShare, 0.96, 0.01);
  assert.ok(pointed.coneShare > 0.995);
});

test('domes from a dozen pixels to large ones are bubbles, with noise too', () => {
  for (const [peakNm, radius] of [[4, 2.1], [6, 3], [16, 7], [26, 10], [60, 22]] as const) {
    for (const seed of ['a', 'b', 'c', 'd', 'e']) {
      const region = measured(dome(peakNm, radius), 0.15, seed);
      assert.ok(region.pixels >= 12);
      const { cause, reason } = classifyRaised(region);
      assert.equal(cause, 'bubble', `${peakNm} nm, ${radius} px, ${seed}: ${reason}`);
    }
  }
});

test('a cone is a pointed lump, not a dome', () => {
  for (const radius of [7, 9, 14, 22]) {
    const { cause, reason } = classifyRaised(measured(cone(20, radius)));
    assert.equal(cause, 'residue', `${radius} px`);
    assert.match(reason, /^pointed lump/);
  }
});

test('rubble as high as a bubble is no dome, however peaked', () => {
  for (const seed of ['a', 'b', 'c']) {
    const random = seededRandom(seed);
    const { cause, reason } = classifyRaised(measured(at(9, () => 4 + 26 * random.uniform() ** 2)));
    assert.equal(cause, 'residue');
    assert.match(reason, /^uneven/);
  }
});

test('a plateau with a rounded edge is residue', () => {
  const { cause } = classifyRaised(measured(at(10, (rho) => 3 * Math.min(1, (1 - rho) * 5))));
  assert.equal(cause, 'residue');
});

test('a row of touching bubbles may look like a ridge, but says so at low confidence; a long ridge does not', () => {
  const row = measured((x, y) => Math.max(0, ...[-17, 0, 17].map((middle) => 18 * (1 - ((x - middle) ** 2 + y * y) / 81))));
  const found = classifyRaised(row);
  assert.ok(found.cause === 'bubble' || found.confidence <= 0.55);
  assert.match(found.reason, /could be touching bubbles|bubble$/);
  const ridge = classifyRaised(measured((x, y) => (Math.abs(x) < 30 && Math.abs(y) < 3 ? 8 * Math.exp(-(y * y) / 6) : 0)));
  assert.deepEqual([ridge.cause, /touching/.test(ridge.reason)], ['wrinkle', false]);
  assert.ok(ridge.confidence > 0.9);
});

test('how a region was parted decides: a crest is a wrinkle whatever its outline, a circle with a paraboloid is a bubble', () => {
  const region = measured(dome(20, 9));
  const crest = classifyRaised({ ...region, kind: 'ridge' });
  assert.deepEqual([crest.cause, /crest/.test(crest.reason)], ['wrinkle', true]);
  assert.equal(classifyRaised({ ...region, kind: 'dome' }).cause, 'bubble');
  // Where somebody looked for a crest and found none, an outline alone makes no wrinkle.
  const long = measured((x, y) => (Math.abs(x) < 30 && Math.abs(y) < 3 ? 8 * Math.exp(-(y * y) / 6) : 0));
  assert.equal(classifyRaised(long).cause, 'wrinkle');
  assert.notEqual(classifyRaised({ ...long, kind: 'blob' }).cause, 'wrinkle');
});

test('a current that is lowered but not lost makes a film, whatever the shape; what blocks makes none', () => {
  const region = measured(dome(2.5, 9));
  const film = classifyRaised({ ...region, floorShare: 0, dropDecades: 1.4, log10Current: -10.4 });
  assert.equal(film.cause, 'residue');
  assert.match(film.reason, /^patch, 2\.[4-8] nm high, current lower by 1\.4 decades but not lost: residue, a film$/);
  assert.equal(classifyRaised({ ...region, floorShare: 1, dropDecades: 4 }).cause, 'bubble');
  // Nothing tunnels through tens of nanometres: what is read there is no film's current.
  assert.equal(classifyRaised({ ...measured(dome(40, 12)), floorShare: 0, dropDecades: 1.4 }).cause, 'bubble');
});

test('what is too close to call says so, and between what', () => {
  let unsure = 0;
  for (let k = 0; k <= 40; k++) {
    // From a paraboloid to a flat top.
    const power = 2 + k / 5;
    const { cause, confidence, reason } = classifyRaised(measured(at(10, (rho) => 12 * (1 - rho ** power))));
    assert.ok(confidence >= 0.5 && confidence <= 1);
    if (k === 0) assert.equal(cause, 'bubble');
    if (k === 40) assert.equal(cause, 'residue');
    assert.ok(/could be/.test(reason) || confidence >= 0.6, reason);
    if (!/could be/.test(reason)) continue;
    unsure++;
    assert.match(reason, cause === 'bubble' ? /could be residue$/ : /could be a bubble$/);
  }
  assert.ok(unsure >= 1, 'nowhere between the two is it in doubt');
});

test('without a height inside nothing is concluded: confidence 0.5, no made-up numbers in the reason', () => {
  const region = { ...measured(dome(10, 6)), fullness: Number.NaN, peakM: Number.NaN, meanM: Number.NaN };
  const { confidence, reason } = classifyRaised(region);
  assert.equal(confidence, 0.5);
  assert.doesNotMatch(reason, /NaN|many/);
});
