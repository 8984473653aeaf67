import assert from 'node:assert/strict';
import { test } from 'node:test';
import { equalCurrentCurve, equalSlopeCurve, massesOf, publishedRange } from '../../src/barrier/degeneracy.ts';
import { chooseModel } from '../../src/barrier/model/choose-model.ts';
import { assertClose } from '../fixtures/assert-close.ts';

const stated = { heightEv: 2.5, massRatio: 0.5 };
const thicknessM = 3.663e-9;

test('on the curve of equal slope √m·φ^1.5·d is the same wherever both biases are above the height', () => {
  const model = chooseModel('fowler-nordheim');
  const lnRatio = model.lnDensity({ ...stated, thicknessM }, 5.9) - model.lnDensity({ ...stated, thicknessM }, 5);
  for (const massRatio of massesOf(0.5)) {
    const { points } = equalSlopeCurve(model, stated, massRatio, 5.9, 5, -lnRatio, 0.05);
    assert.deepEqual([points[0]!.heightEv, points[points.length - 1]!.heightEv], [1.5, 3.1]);
    for (const point of points) {
      assertClose(Math.sqrt(massRatio) * point.heightEv ** 1.5 * point.thicknessM, Math.sqrt(0.5) * 2.5 ** 1.5 * thicknessM, 1e-9);
      assert.ok(point.low95M! < point.thicknessM && point.thicknessM < point.high95M!);
    }
  }
});

test('on the curve of equal current every pair carries the density, and the band is the area’s', () => {
  const model = chooseModel('wkb');
  const density = model.density({ ...stated, thicknessM }, 5.9);
  const { points, by } = equalCurrentCurve(model, stated, 0.26, 5.9, density, 0.587);
  assert.equal(by, 'current');
  for (const { heightEv, thicknessM: own, low95M, high95M } of points) {
    const at = (metres: number): number => model.lnDensity({ heightEv, massRatio: 0.26, thicknessM: metres }, 5.9);
    assertClose(at(own), Math.log(density), 1e-9);
    // A larger contact means less density and more thickness.
    assertClose(at(high95M!), Math.log(density) - 1.96 * 0.587, 1e-3);
    assertClose(at(low95M!), Math.log(density) + 1.96 * 0.587, 1e-3);
  }
  assert.ok(points[0]!.thicknessM > 1.9 * points[points.length - 1]!.thicknessM, 'what a current leaves open is a factor, not a few per cent');
});

test('the stated pair lies on the curve of its own mass; a stated height outside the published range widens it', () => {
  const model = chooseModel('wkb');
  const wide = { heightEv: 3.5, massRatio: 0.4 };
  const density = model.density({ ...wide, thicknessM }, 5.9);
  const { points } = equalCurrentCurve(model, wide, 0.4, 5.9, density, 0.5);
  assertClose(points[points.length - 1]!.thicknessM, thicknessM, 1e-9);
  assert.equal(points[0]!.heightEv, publishedRange.heightEv.from);
  assert.deepEqual(massesOf(0.4), [0.26, 0.4, 0.5]);
});

test('heights at which a model does not hold have no point', () => {
  const { points } = equalCurrentCurve(chooseModel('simmons'), stated, 0.5, 2, 1, 0.5);
  assert.ok(points.length > 5 && points.every(({ heightEv }) => heightEv > 2));
});
