import assert from 'node:assert/strict';
import { test } from 'node:test';
import { straightStretch } from '../../src/iv/straight-stretch.ts';
import { weightedLine } from '../../src/iv/weighted-line.ts';
import { lineFit } from '../../src/stats/line-fit.ts';
import { seededRandom } from '../../src/stats/random.ts';
import { assertClose } from '../fixtures/assert-close.ts';

const x = Float64Array.from({ length: 120 }, (_, k) => 0.16 + k * 0.0006);
const index = Int32Array.from(x.keys());
const line = (noise: (k: number) => number) => x.map((value, k) => -13 - 76 * value + noise(k));

test('proportional noise alone: the ordinary least-squares line and its errors', () => {
  const random = seededRandom('even');
  const y = line(() => 0.03 * random.normal());
  const fit = weightedLine(x, y, index, 0);
  const plain = lineFit(x, y);
  assertClose(fit.slope, plain.slope, 1e-9);
  assertClose(fit.intercept, plain.intercept, 1e-9);
  assertClose(fit.slopeSe, plain.slopeSe, 1e-3);
  assertClose(fit.interceptSe, plain.interceptSe, 1e-3);
  assertClose(fit.share, plain.residualSd, 1e-3);
});

/** Root mean square of (slope − true)/error over seeded lines. */
function pullOf(seed: string, fit: (y: Float64Array) => { slope: number; slopeSe: number }, noise: (random: ReturnType<typeof seededRandom>) => (k: number) => number): number {
  let squares = 0;
  for (let k = 0; k < 200; k++) {
    const { slope, slopeSe } = fit(line(noise(seededRandom(`${seed} ${k}`))));
    squares += ((slope + 76) / slopeSe) ** 2;
  }
  return Math.sqrt(squares / 200);
}

test('constant and proportional noise together: deviations are as large as the errors say', () => {
  const constantA = 2e-14;
  const currentAt = (k: number) => Math.exp(-13 - 76 * x[k]! - 2 * Math.log(x[k]!));
  const rms = pullOf('both', (y) => weightedLine(x, y, index, constantA), (random) => (k) => Math.log((1 + 0.03 * random.normal()) + (constantA * random.normal()) / currentAt(k)));
  assert.ok(rms > 0.88 && rms < 1.12, String(rms));
});

test('ln(I + noise) lies low on average; the line does not', () => {
  // A weak current throughout, between 6 and 13 standard deviations of the noise.
  const weak = Float64Array.from({ length: 60 }, (_, k) => 0.2 + k * 0.00015);
  const currentAt = (value: number) => Math.exp(-13 - 76 * value - 2 * Math.log(value));
  const constantA = currentAt(weak[59]!) / 6;
  let mean = 0;
  for (let k = 0; k < 150; k++) {
    const random = seededRandom(`low ${k}`);
    const y = weak.map((value) => -13 - 76 * value + Math.log(1 + (constantA * random.normal()) / currentAt(value)));
    const fit = weightedLine(weak, y, Int32Array.from(weak.keys()), constantA);
    mean += (fit.intercept + fit.slope * 0.2044 + 13 + 76 * 0.2044) / 150;
  }
  // The error of this mean is 0.0012; without the correction it is −0.0071.
  assert.ok(Math.abs(mean) < 0.0036, String(mean));
});

test('slow noise: errors as of white noise would be about three times too small', () => {
  const drift = (random: ReturnType<typeof seededRandom>) => {
    let level = 0;
    return () => (level = 0.8 * level + 0.02 * random.normal());
  };
  const rms = pullOf('slow', (y) => weightedLine(x, y, index, 0), drift);
  assert.ok(rms > 0.8 && rms < 1.35, String(rms));
  const white = pullOf('slow', (y) => lineFit(x, y), drift);
  assert.ok(white > 2.3, String(white));
});

test('an offset known with an error: the line moves by no more than its errors say', () => {
  const offsetSe = 5e-14;
  const shared = [x.map(() => offsetSe)];
  const currentAt = (k: number) => Math.exp(-13 - 76 * x[k]! - 2 * Math.log(x[k]!));
  const noise = (random: ReturnType<typeof seededRandom>) => {
    const off = offsetSe * random.normal();
    return (k: number) => Math.log(1 + 0.005 * random.normal() + off / currentAt(k));
  };
  const rms = pullOf('offset', (y) => weightedLine(x, y, index, 0, shared), noise);
  assert.ok(rms > 0.85 && rms < 1.2, String(rms));
  const blind = pullOf('offset', (y) => weightedLine(x, y, index, 0), noise);
  assert.ok(blind > 1.4, String(blind));
});

test('the straight stretch ends where a bend begins, at either end, and takes all of a line', () => {
  const random = seededRandom('stretch');
  const variance = x.map(() => 0.02 ** 2);
  const white = line(() => 0.02 * random.normal());
  assert.deepEqual(straightStretch(x, white, variance), { first: 0, last: 119, bend: 0 });
  const flatBelow = white.map((value, k) => value + Math.max(0, k - 70) ** 2 * 0.0015);
  const below = straightStretch(x, flatBelow, variance)!;
  assert.ok(below.first === 0 && below.last > 55 && below.last < 85, JSON.stringify(below));
  const flatAbove = white.map((value, k) => value - Math.max(0, 40 - k) ** 2 * 0.004);
  const above = straightStretch(x, flatAbove, variance)!;
  assert.ok(above.first > 15 && above.first < 50 && above.last === 119, JSON.stringify(above));
  const bent = line((k) => 0.03 * ((k - 60) / 60) ** 2);
  assert.ok(straightStretch(x, bent, x.map(() => 1e-24))!.last < 90, 'a slope that changes by 4 % is no line when there is no noise');
  const harmless = straightStretch(x, line((k) => 0.01 * ((k - 60) / 60) ** 2), x.map(() => 1e-24))!;
  assert.equal(harmless.last, 119);
  // Twice 0.01 over 60 points of 0.0006 each, from −1 to 1, over the slope.
  assertClose(harmless.bend, (4 * 0.01) / 0.036 / 76, 0.03);
  assert.equal(straightStretch(x.subarray(0, 2), white.subarray(0, 2), variance.subarray(0, 2)), undefined);
  assert.deepEqual(straightStretch(x.subarray(0, 4), white.subarray(0, 4), variance.subarray(0, 4)), { first: 0, last: 3, bend: 0 });
  assert.equal(straightStretch(x.map(() => 0.2), white, variance), undefined);
});
