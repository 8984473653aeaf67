import assert from 'node:assert/strict';
import { test } from 'node:test';
import { findLag, keptOf } from '../../src/ground/lag.ts';
import { undoLag } from '../../src/ground/undo-lag.ts';
import { seededRandom } from '../../src/stats/random.ts';
import { smeared } from '../fixtures/amplify.ts';
import { createRecipe, createSample } from '../fixtures/create-sample.ts';
import { createScene, noiseA, saturationA, threeTerraces, typicalThings } from '../fixtures/create-scene.ts';
import { evaluate } from '../../src/evaluate/evaluate.ts';
import { levelGround } from '../../src/ground/level-ground.ts';

const size = 128;
const scene = (seed: string) => createScene({ seed, size, layersAt: threeTerraces(size), things: typicalThings(size) });
/** The scene's current before the amplifier: pinholes carry twice what it can show. */
const before = (seed: string): Float32Array => scene(seed).currentA.map((value) => (value >= Math.fround(saturationA) ? 2 * saturationA : value < 6 * noiseA ? 0 : value));
const zero = { offset: 0, noise: noiseA };
const limit = saturationA * (1 - 1e-4);

for (const direction of [1, -1] as const) {
  test(`time constants from half a pixel to five are found within their error, lines scanned ${direction === 1 ? 'to the right' : 'to the left'}`, () => {
    for (const px of [0.5, 1, 1.7, 3, 5]) {
      for (const seed of ['a', 'b']) {
        const current = smeared(before(seed), size, px, { direction, noiseA, limitA: saturationA });
        const lag = findLag(current, size, size, zero, limit);
        assert.ok(lag, `${px} pixels, seed ${seed}: nothing found`);
        assert.equal(lag.direction, direction);
        assert.ok(Math.abs(lag.px - px) < 4 * lag.sePx + 0.001 * px, `${lag.px} ± ${lag.sePx} for ${px}`);
        assert.ok(lag.sePx < 0.05 * px, `error ${lag.sePx} of ${px}`);
      }
    }
  });
}

test('a map without lag shows none: with sharp edges, with edges blunt to both sides, with nothing on it', () => {
  for (const seed of ['a', 'b', 'c']) {
    const sharp = scene(seed).currentA;
    assert.equal(findLag(sharp, size, size, zero, limit), undefined);
    // One pole each way: a blunt tip, not an amplifier.
    const blunt = smeared(smeared(before(seed), size, 1.5), size, 1.5, { direction: -1, noiseA, limitA: saturationA });
    assert.equal(findLag(blunt, size, size, zero, limit), undefined);
  }
  assert.equal(findLag(createScene({ seed: 'even', size }).currentA, size, size, zero, limit), undefined);
  assert.equal(findLag(new Float32Array(size * size).fill(Number.NaN), size, size, zero, limit), undefined);
});

test('undoing the lag restores the current within noise and error, an offset untouched', () => {
  const true_ = before('undo');
  for (const px of [0.7, 1.5, 3]) {
    const offset = 2e-13;
    const read = smeared(true_.map((value) => value + offset), size, px, { noiseA });
    const kept = keptOf(px);
    const gain = Math.hypot(1, kept) / (1 - kept);
    const { values } = undoLag(read, size, { px, direction: 1, keptScatter: 0 }, { noise: noiseA, offset, limit: Number.POSITIVE_INFINITY });
    let worst = 0;
    for (let i = 0; i < values.length; i++) {
      // Float32 keeps seven digits, which the difference enlarges; changes within 3.5 σ√2 of the noise are left in.
      const rounding = 1e-6 * gain * Math.max(read[i]!, i % size === 0 ? 0 : read[i - 1]!);
      const left = (kept / (1 - kept)) * 3.5 * Math.SQRT2 * noiseA;
      worst = Math.max(worst, (Math.abs(values[i]! - true_[i]! - offset) - rounding - left) / (gain * noiseA));
    }
    assert.ok(worst < 5.5, `${px} pixels: ${worst} standard deviations`);
  }
});

test('noise is not enlarged where nothing changes', () => {
  const random = seededRandom('flat');
  const flat = Float32Array.from({ length: size * size }, () => noiseA * random.normal());
  const { values } = undoLag(flat, size, { px: 3, direction: 1, keptScatter: 0 }, { noise: noiseA, offset: 0, limit: 1 });
  const rms = (data: Float32Array): number => Math.sqrt(data.reduce((sum, value) => sum + value * value, 0) / data.length);
  assert.ok(rms(values) < 1.25 * rms(flat), `${rms(values)} from ${rms(flat)}`);
});

test('behind the limit a pixel takes the next one’s current, a missing pixel is no past', () => {
  const kept = keptOf(2);
  // Two pixels at the limit, then nothing: 1.2 is what the amplifier would have shown there.
  const line = Float32Array.of(0, 0, 0.9, 1, 1.2 * kept, 1.2 * kept ** 2, 1.2 * kept ** 3, Number.NaN, 0.5, 0.5);
  const { values } = undoLag(line, line.length, { px: 2, direction: 1, keptScatter: 0 }, { noise: 1e-6, offset: 0, limit: 1 });
  assert.equal(values[3], 1);
  for (const i of [4, 5, 6]) assert.ok(Math.abs(values[i]!) < 1e-6, `${values[i]} at ${i}`);
  assert.ok(Number.isNaN(values[7]!));
  assert.deepEqual([values[8], values[9]], [0.5, 0.5]);
  // Past the limit by a fall that is too slow to come to nothing: bounded, not below what the bound allows.
  assert.equal(values[2], 1, 'a rise to 0.9 in one pixel was a current beyond the limit');
});

for (const seed of ['p', 'q']) {
  test(`chain: a lagging scan is appraised like the one without lag, seed ${seed}`, () => {
    const { heightM, currentA } = scene(seed);
    const plain = evaluate(createSample({ columns: size, rows: size, heightM, currentA, biasV: 5.9 }), createRecipe({}));
    const current = smeared(before(seed), size, 2, { noiseA, limitA: saturationA });
    const sample = createSample({ columns: size, rows: size, heightM, currentA: current, biasV: 5.9 });
    const undone = evaluate(sample, createRecipe({}));
    assert.ok(Math.abs(undone.ground.current!.lagPx - 2) < 0.02);
    assert.ok(undone.warnings.some(({ code }) => code === 'current-lag'));
    const left = evaluate(sample, createRecipe({ ground: { lag: false } }));
    assert.equal(left.ground.current!.lagPx, 0);
    const differing = (a: typeof plain, b: typeof plain): number => a.ledger.codes.data.reduce((sum: number, code, i) => sum + (code === b.ledger.codes.data[i] ? 0 : 1), 0);
    assert.ok(differing(undone, plain) < 0.3 * differing(left, plain), `${differing(undone, plain)} pixels differ, without undoing ${differing(left, plain)}`);
    assert.ok(differing(undone, plain) < 0.006 * size * size, `${differing(undone, plain)} pixels differ`);
  });
}

test('ground.lagPx wins over what the map shows, 0 undoes nothing', () => {
  const { heightM } = scene('given');
  const current = smeared(before('given'), size, 2, { noiseA, limitA: saturationA });
  const sample = createSample({ columns: size, rows: size, heightM, currentA: current, biasV: 5.9 });
  for (const lagPx of [0, 1.25]) {
    const recipe = createRecipe({ ground: { lagPx } });
    const ground = levelGround(sample, recipe.ground, recipe.scan, 0.333e-9);
    assert.equal(ground.current!.lagPx, lagPx);
    assert.equal(ground.current!.lagSePx, undefined);
    assert.equal(ground.warnings.some(({ code }) => code === 'current-lag'), lagPx > 0);
  }
});
