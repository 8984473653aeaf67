import assert from 'node:assert/strict';
import { test } from 'node:test';
import { lineAutocorrelation } from '../../src/ground/line-autocorrelation.ts';
import { levelledShares, levellingBias } from '../../src/ground/levelling-bias.ts';
import type { LevellingBias } from '../../src/ground/levelling-bias.ts';
import { varianceRemovedByMedian } from '../../src/stats/levelled-variance.ts';
import type { CorrelationShape } from '../../src/stats/levelled-variance.ts';
import { seededRandom } from '../../src/stats/random.ts';
import { assertClose } from '../fixtures/assert-close.ts';
import { createRoughSurface } from '../fixtures/create-rough-surface.ts';

const size = 192;
const grid = { columns: size, rows: size, pitchXM: 20e-9, pitchYM: 20e-9 };
const all = new Uint8Array(size * size).fill(1);

/** Takes the median of every line, and then bow and tilt along it (the rest of an order-2 form) out; nm to metres. */
function levelled(z: Float64Array): Float32Array {
  const out = z.slice();
  const take = (e: Float64Array): void => {
    let dot = 0;
    let norm = 0;
    for (let i = 0; i < out.length; i++) {
      dot += e[i]! * out[i]!;
      norm += e[i]! * e[i]!;
    }
    for (let i = 0; i < out.length; i++) out[i]! -= (dot / norm) * e[i]!;
  };
  for (let r = 0; r < size; r++) {
    const line = out.subarray(r * size, (r + 1) * size);
    const sorted = line.slice().sort();
    const middle = (sorted[size / 2 - 1]! + sorted[size / 2]!) / 2;
    line.forEach((value, c) => { line[c] = value - middle; });
  }
  const at = (index: number): number => (2 * index) / (size - 1) - 1;
  const second = (Array.from({ length: size }, (_, c) => at(c) ** 2).reduce((a, b) => a + b, 0)) / size;
  take(Float64Array.from(out, (_, i) => at(i % size)));
  take(Float64Array.from(out, (_, i) => at(i % size) * at(Math.floor(i / size))));
  take(Float64Array.from(out, (_, i) => at(i % size) ** 2 - second));
  return Float32Array.from(out, (value) => value * 1e-9);
}

const meanSquare = (values: ArrayLike<number>): number => Array.from(values).reduce((sum, value) => sum + value * value, 0) / values.length;

function estimate(height: Float32Array, terraces?: Int8Array): LevellingBias {
  const found = levellingBias(height, grid, all, { order: 2, lines: true }, terraces);
  assert.ok(typeof found !== 'string', `no estimate: ${String(found)}`);
  return found;
}

for (const [shape, lengthPx] of [['gaussian', 4], ['gaussian', 10], ['exponential', 4], ['exponential', 6]] as const satisfies readonly (readonly [CorrelationShape, number])[]) {
  test(`${shape} roughness, T ${lengthPx} px, with pixel noise: T, roughness and what was taken are found; corrected Sq is closer than raw`, () => {
    const maps = 12;
    const sum = { raw: 0, corrected: 0, length: 0, roughness: 0, taken: 0, removed: 0, shape: 0 };
    for (let map = 0; map < maps; map++) {
      const random = seededRandom(`noise ${map}`);
      const rough = createRoughSurface(`bias ${map}`, size, size, lengthPx, shape, 300);
      const noisy = rough.map((value) => value + 0.4 * random.normal());
      const height = levelled(noisy);
      const found = estimate(height);
      const square = meanSquare(height) * 1e18;
      sum.raw += square / maps;
      sum.corrected += (square + found.removedM2 * 1e18) / maps;
      sum.length += found.correlationM / 20e-9 / maps;
      sum.roughness += (found.roughnessM * 1e9) / maps;
      sum.taken += (meanSquare(noisy) - square) / maps;
      sum.removed += (found.removedM2 * 1e18) / maps;
      if (found.shape === shape) sum.shape++;
    }
    assert.ok(sum.shape >= maps - 2, `shape told on ${sum.shape} of ${maps}`);
    assertClose(sum.length, lengthPx, 0.12, 'T');
    assertClose(sum.roughness, 1, 0.05, 'roughness');
    assertClose(sum.removed, sum.taken, 0.25, 'variance taken');
    const truth = 1.16;
    assert.ok(Math.abs(sum.corrected - truth) < 0.5 * Math.abs(sum.raw - truth), `Sq² ${sum.raw} corrected to ${sum.corrected}, true ${truth}`);
  });
}

test('line offsets and form share the work as the closed form says, whatever is switched off', () => {
  const lengths = { widthM: 10e-6, heightM: 10e-6, lineM: 10e-6, correlated: 1 };
  const both = levelledShares(0.2e-6, { order: 2, lines: true, ...lengths }, 'gaussian');
  const form = levelledShares(0.2e-6, { order: 2, lines: false, ...lengths }, 'gaussian');
  // Medians take less than the 0.035049 of means.
  assertClose(both.lines, varianceRemovedByMedian(0.02, 'gaussian'), 1e-12);
  assert.equal(form.lines, 0);
  // Six products of about 0.035² each; three of them go with the lines already.
  assert.ok(form.form > 5 * 0.035 ** 2 && form.form < 6 * 0.0351 ** 2 && both.form < 0.5 * form.form);
  // With no form at all the offsets have no trend, which therefore stays.
  const bare = levelledShares(0.2e-6, { order: 0, lines: true, ...lengths }, 'gaussian');
  assert.ok(bare.form === 0 && bare.lines < both.lines && bare.lines > both.lines - 0.0013);
});

test('ground of which half is off the mask leaves lines half as long', () => {
  const height = levelled(createRoughSurface('half', size, size, 4, 'gaussian'));
  const whole = estimate(height);
  const half = levellingBias(height, grid, all.map((_, i) => (i % size < size / 2 ? 1 : 0)), { order: 2, lines: true });
  assert.ok(typeof half !== 'string');
  assertClose(half.lineShare / half.correlationM, (2 * whole.lineShare) / whole.correlationM, 0.1);
});

test('terraces are no roughness: with their numbers the estimate is that without them', () => {
  const rough = levelled(createRoughSurface('terraced', size, size, 5, 'gaussian'));
  const terraces = Int8Array.from(rough, (_, i) => (i % size < 70 ? -1 : i % size < 130 ? 0 : 2));
  const stepped = rough.map((value, i) => value + terraces[i]! * 3e-9);
  const plain = estimate(rough);
  const inside = estimate(stepped, terraces);
  assertClose(inside.correlationM, plain.correlationM, 0.05);
  assertClose(inside.roughnessM, plain.roughnessM, 0.05);
  assertClose(inside.sqInsideTerracesM, Math.sqrt(meanSquare(rough)), 0.05);
  assert.equal(plain.sqInsideTerracesM, undefined);
  assert.equal(levellingBias(stepped, grid, all, { order: 2, lines: true }), 'too-wide');
  // What belongs to no known terrace is left out.
  assert.equal(levellingBias(stepped, grid, all, { order: 2, lines: true }, new Int8Array(size * size).fill(-128)), 'little-ground');
});

test('no estimate from noise, from structure as wide as the map, from too little ground', () => {
  const random = seededRandom('white');
  assert.equal(levellingBias(Float32Array.from(all, () => random.normal()), grid, all, { order: 2, lines: true }), 'no-correlation');
  assert.equal(levellingBias(Float32Array.from(all, (_, i) => Math.sin((i % size) / 40)), grid, all, { order: 2, lines: true }), 'too-wide');
  assert.equal(levellingBias(Float32Array.from(all, () => 0), grid, all, { order: 2, lines: true }), 'no-correlation');
  assert.equal(levellingBias(new Float32Array(size * size), grid, all.map((_, i) => (i < 900 ? 1 : 0)), { order: 2, lines: true }), 'little-ground');
});

test('autocovariance by hand: pairs across a gap count, pairs with a missing end do not', () => {
  const height = Float32Array.of(1, -1, Number.NaN, 1, -1, 9, 3, -3);
  const found = lineAutocorrelation(height, { columns: 8, rows: 1 }, Uint8Array.of(1, 1, 1, 1, 1, 0, 1, 1));
  assert.deepEqual([...found.lags], [1, 2, 3, 4]);
  // Distance 1: 1·(−1) twice, 3·(−3); 2: (−1)·1, (−1)·3; 3: 1·1, (−1)·(−1), 1·3, (−1)·(−3); 4: 1·(−1), 1·(−3).
  assert.deepEqual([...found.pairs], [3, 2, 4, 2]);
  assertClose(found.covariance[0], -11 / 3, 1e-12);
  assertClose(found.covariance[1], (-1 * 1 + -1 * 3) / 2, 1e-12);
  assertClose(found.covariance[2], (1 * 1 + -1 * -1 + 1 * 3 + -1 * -3) / 4, 1e-12);
  assert.equal(found.pixels, 6);
  assertClose(found.variance, 22 / 6, 1e-12);
});

test('a mask without pairs at some distances gives numbers all the same', () => {
  // Correlated with the next pixel only, so that the fit looks at distances for which a comb of three columns in eight has no pairs.
  const random = seededRandom('comb');
  const white = Float64Array.from({ length: size * size + 1 }, () => random.normal());
  const height = Float32Array.from(all, (_, i) => 1e-10 * (white[i + 1]! + 0.8 * white[i]!));
  const mask = Uint8Array.from(all, (_, i) => (i % 8 < 3 ? 1 : 0));
  const found = levellingBias(height, grid, mask, { order: 2, lines: true });
  assert.ok(typeof found !== 'string', `no estimate: ${String(found)}`);
  for (const [name, value] of Object.entries(found)) if (typeof value === 'number') assert.ok(Number.isFinite(value), `${name} ${value}`);
});
