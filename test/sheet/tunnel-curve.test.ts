import assert from 'node:assert/strict';
import test from 'node:test';
import { Problem } from '../../src/problems/problem.ts';
import { TunnelCurve } from '../../src/sheet/tunnel-curve.ts';
import { tunnelDensity } from './device.ts';

function largestError(density: (v: number) => number, from: number): number {
  const curve = new TunnelCurve(density, 4);
  let largest = 0;
  for (let v = from; v <= 4; v += 0.00137) {
    curve.at(v);
    largest = Math.max(largest, Math.abs((curve.density * density(4)) / density(v) - 1));
  }
  return largest;
}

test('an ohmic element is met exactly, an exponential and a tunnelling one to a few 1e-6', () => {
  assert.ok(largestError((v) => 7 * v, 0.0001) < 1e-12);
  assert.ok(largestError((v) => Math.exp(v / 0.2), 2) < 3e-6);
  assert.ok(largestError(tunnelDensity(1), 2) < 1e-5);
});

test('the slope is the derivative, also beyond both ends', () => {
  const curve = new TunnelCurve(tunnelDensity(1), 4);
  for (const v of [-1, 0.001, 1.5003, 2.9991, 3.9995, 4.5]) {
    curve.at(v + 1e-7);
    const above = curve.density;
    curve.at(v - 1e-7);
    const below = curve.density;
    curve.at(v);
    assert.ok(Math.abs((above - below) / 2e-7 - curve.slope) <= 1e-6 * Math.max(curve.slope, 1e-6), `${v}`);
  }
});

test('beyond the device bias it goes on along its tangent, without overflow', () => {
  const curve = new TunnelCurve((v) => Math.exp(v / 0.01), 4);
  curve.at(1e6);
  assert.ok(Number.isFinite(curve.density) && curve.density > 1e6);
});

for (const [what, density] of [
  ['negative', (v: number) => v - 1], ['falling', (v: number) => 9 - v], ['endless', (v: number) => 1 / (v - 2) ** 2], ['nothing', () => 0],
] as const) {
  test(`a ${what} density is refused`, () => {
    assert.throws(() => new TunnelCurve(density, 4), (error) => error instanceof Problem && error.code === 'sheet-density');
  });
}
