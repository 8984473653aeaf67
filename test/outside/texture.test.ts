/** Texture and the share of it that levelling takes, against values from outside the program: [P] published, [F] computed from the named formula. */
import assert from 'node:assert/strict';
import { test } from 'node:test';
import { measureRegions } from '../../src/flaws/measure.ts';
import { squaredDistance } from '../../src/grid/distance.ts';
import { surfaceTexture } from '../../src/ground/texture.ts';
import { productShares, varianceRemoved, varianceRemovedByMedian } from '../../src/stats/levelled-variance.ts';
import { seededRandom } from '../../src/stats/random.ts';
import { assertClose } from '../fixtures/assert-close.ts';
import { createRoughSurface } from '../fixtures/create-rough-surface.ts';

/** A height in nm over (x, y) in nm, sampled at pixel centres. */
function sampled(columns: number, rows: number, pitchXNm: number, pitchYNm: number, z: (x: number, y: number) => number) {
  const grid = { columns, rows, pitchXM: pitchXNm * 1e-9, pitchYM: pitchYNm * 1e-9 };
  const height = new Float32Array(columns * rows);
  for (let i = 0; i < height.length; i++) height[i] = 1e-9 * z((i % columns + 0.5) * pitchXNm, (Math.floor(i / columns) + 0.5) * pitchYNm);
  return { grid, height };
}

for (const [pitchX, pitchY] of [[2, 2], [2, 3.2]] as const) {
  const inside = (x: number, y: number): number => 1 - ((x - 520) ** 2 + (y - 520) ** 2) / 500 ** 2;
  const columns = Math.round(1040 / pitchX);
  const rows = Math.round(1040 / pitchY);
  const { grid, height } = sampled(columns, rows, pitchX, pitchY, (x, y) => 55 * inside(x, y));
  const mask = Uint8Array.from(height, (z) => (z >= 0 ? 1 : 0));

  test(`[F] paraboloid of radius 500 nm, 55 nm high, inside its base: Sq h/√12, Sa h/4, Ssk 0, Sku 1.8; pitch ${pitchX} × ${pitchY} nm`, () => {
    const found = surfaceTexture(height, grid, mask);
    assertClose(found.sqM * 1e9, 55 / Math.sqrt(12), 1e-3, 'Sq');
    assertClose(found.saM * 1e9, 55 / 4, 1e-3, 'Sa');
    assertClose(found.ssk, 0, 0, 'Ssk', 3e-3);
    assertClose(found.sku, 1.8, 2e-3, 'Sku');
    assertClose(found.szM * 1e9, 55, 2e-3, 'Sz');
    // Mean square slope of h(1 − r²/R²) over its base: 2h²/R².
    assertClose(found.sdq, (Math.SQRT2 * 55) / 500, 0.01, 'Sdq');
  });

  test(`[F] its volume is 2.15984e7 nm³; pitch ${pitchX} × ${pitchY} nm`, () => {
    const [region] = measureRegions({
      columns, rows, pitchXM: grid.pitchXM, pitchYM: grid.pitchYM, labels: Uint32Array.from(mask), count: 1, rise: height,
      distance2: squaredDistance(mask, columns, rows, { pitchX: grid.pitchXM, pitchY: grid.pitchYM }),
    });
    assertClose(region!.volumeM3 * 1e27, 2.15984e7, 1e-3);
  });
}

test('[F] sine of amplitude 1, period 100 pixels: Sq, Sa, Ssk, Sku, Sdq', () => {
  const { grid, height } = sampled(10001, 4, 1, 1, (x) => Math.sin((2 * Math.PI * x) / 100));
  // A hundred whole periods, so that the two columns without a slope do not count.
  const found = surfaceTexture(height, grid, Uint8Array.from(height, (_, i) => (i % 10001 < 10000 ? 1 : 0)));
  assertClose(found.sqM * 1e9, 0.707107, 1e-3, 'Sq');
  assertClose(found.saM * 1e9, 0.63662, 1e-3, 'Sa');
  assertClose(found.ssk, 0, 0, 'Ssk', 1e-3);
  assertClose(found.sku, 1.5, 1e-3, 'Sku');
  assertClose(found.sdq, 0.0444288, 1e-3, 'Sdq');
});

test('[P] a plane of 45° has Sdq 1 and Sdr √2 − 1 (0.414214), along either axis and at unequal pitches', () => {
  for (const slope of [(x: number) => x, (_: number, y: number) => -y, (x: number, y: number) => (x + y) / Math.SQRT2]) {
    const { grid, height } = sampled(24, 16, 4, 8, slope);
    const { sdq, sdr, gradientPixels } = surfaceTexture(height, grid, new Uint8Array(height.length).fill(1));
    assert.equal(gradientPixels, 22 * 14);
    assertClose(sdq, 1, 1e-6);
    assertClose(sdr, Math.SQRT2 - 1, 1e-6);
  }
});

test('[F] a line of Gaussian correlation, T/L 0.02, loses 3.5049 % of its variance with its mean and 6.9298 % with a straight line (effect: Nečas, Klapetek & Valtr 2020)', () => {
  assertClose(varianceRemoved(0.02, 0), 0.035049, 1e-5);
  assertClose(varianceRemoved(0.02, 1), 0.069298, 1e-5);
});

test('[F] in closed form: t√π erf(1/t) − t²(1 − e^(−1/t²)) for the mean of a Gaussian line, 2t − 2t²(1 − e^(−1/t)) of an exponential one', () => {
  // erf(1/t) is 1 to better than 1e-15 for t ≤ 0.17.
  for (const t of [0.002, 0.02, 0.15]) assertClose(varianceRemoved(t, 0), t * Math.sqrt(Math.PI) - t * t * (1 - Math.exp(-1 / (t * t))), 1e-9);
  for (const t of [0.002, 0.02, 0.5, 5]) assertClose(varianceRemoved(t, 0, 'exponential'), 2 * t - 2 * t * t * (1 - Math.exp(-1 / t)), 1e-8);
});

/** Least-squares fit of orthonormal vectors: the mean square that goes with each of them. */
function squaresTaken(z: Float64Array, functions: readonly Float64Array[]): number {
  return functions.reduce((sum, e) => sum + e.reduce((dot, value, i) => dot + value * z[i]!, 0) ** 2, 0) / z.length;
}

/** Gram–Schmidt on sampled functions, so that nothing of the formula under test is used. */
function orthonormal(functions: readonly Float64Array[]): Float64Array[] {
  const out: Float64Array[] = [];
  for (const f of functions) {
    const rest = f.slice();
    for (const e of out) {
      const dot = e.reduce((sum, value, i) => sum + value * rest[i]!, 0);
      e.forEach((value, i) => { rest[i]! -= dot * value; });
    }
    const norm = Math.hypot(...rest);
    out.push(rest.map((value) => value / norm));
  }
  return out;
}

test('Monte Carlo: lines of 500 pixels, Gaussian correlation T/L 0.02, lose that share with polynomials of degree 0 and 1, and the computed one with their median, within 5 %', () => {
  const length = 500;
  const lengthPx = 10;
  const random = seededRandom('lines');
  const powers = orthonormal([0, 1].map((power) => Float64Array.from({ length }, (_, i) => (i / length) ** power)));
  const taken = [0, 0];
  let byMedian = 0;
  const lines = 6000;
  // White noise smoothed by exp(−2x²/T²) has the autocorrelation exp(−x²/T²).
  const half = 20;
  const kernel = Float64Array.from({ length: 2 * half + 1 }, (_, k) => Math.exp((-2 * (k - half) ** 2) / lengthPx ** 2));
  const norm = Math.sqrt(kernel.reduce((sum, value) => sum + value * value, 0));
  for (let line = 0; line < lines; line++) {
    const white = Float64Array.from({ length: length + 2 * half }, () => random.normal() / norm);
    const z = Float64Array.from({ length }, (_, i) => {
      let sum = 0;
      for (let k = 0; k < kernel.length; k++) sum += kernel[k]! * white[i + k]!;
      return sum;
    });
    const sorted = z.slice().sort();
    const median = (sorted[length / 2 - 1]! + sorted[length / 2]!) / 2;
    for (const value of z) byMedian += (value ** 2 - (value - median) ** 2) / length / lines;
    for (const degree of [0, 1]) taken[degree]! += squaresTaken(z, powers.slice(0, degree + 1)) / lines;
  }
  for (const degree of [0, 1]) assertClose(taken[degree], varianceRemoved(lengthPx / length, degree), 0.05, `degree ${degree}`);
  assertClose(byMedian, varianceRemovedByMedian(lengthPx / length, 'gaussian'), 0.05, 'median');
});

for (const shape of ['gaussian', 'exponential'] as const) {
  test(`Monte Carlo: a rectangle of ${shape} roughness loses the computed share with a form of order 2, within 5 %`, () => {
    const [columns, rows, lengthPx] = [48, 32, 6];
    const at = (power: number, size: number, index: number): number => ((2 * index) / (size - 1) - 1) ** power;
    const products = [[0, 0], [1, 0], [0, 1], [2, 0], [1, 1], [0, 2]] as const;
    const functions = orthonormal(products.map(([i, j]) => Float64Array.from({ length: columns * rows }, (_, k) => at(i, columns, k % columns) * at(j, rows, Math.floor(k / columns)))));
    const maps = 3000;
    let taken = 0;
    for (let map = 0; map < maps; map++) taken += squaresTaken(createRoughSurface(`form ${map}`, columns, rows, lengthPx, shape, 40), functions) / maps;
    const expected = productShares(lengthPx / columns, lengthPx / rows, 2, shape).reduce((sum, share) => sum + share, 0);
    assertClose(taken, expected, 0.05);
  });
}
