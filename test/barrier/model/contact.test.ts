import assert from 'node:assert/strict';
import { test } from 'node:test';
import { currentOfContact, densityOfContact } from '../../../src/barrier/model/contact-density.ts';
import { dmtRadiusM, hertzRadiusM, jkrRadiusM, pullOffJkrN, taborParameter } from '../../../src/barrier/model/contact.ts';
import { bandwidthForSettlingHz, settledShare } from '../../../src/barrier/model/settling.ts';
import { seededRandom } from '../../../src/stats/random.ts';
import { assertClose } from '../../fixtures/assert-close.ts';

test('without adhesion DMT and JKR are Hertz; with it they are larger, JKR most, and grow with force', () => {
  for (const forceN of [1e-9, 20e-9, 100e-9]) {
    const hertz = hertzRadiusM(forceN, 25e-9, 30e9);
    assertClose(dmtRadiusM(forceN, 25e-9, 30e9, 0), hertz, 1e-12);
    assertClose(jkrRadiusM(forceN, 25e-9, 30e9, 0), hertz, 1e-12);
    const dmt = dmtRadiusM(forceN, 25e-9, 30e9, 0.05);
    const jkr = jkrRadiusM(forceN, 25e-9, 30e9, 0.05);
    assert.ok(hertz < dmt && dmt < jkr);
    assert.ok(jkrRadiusM(forceN * 1.1, 25e-9, 30e9, 0.05) > jkr);
  }
});

test('a JKR contact is still there just before pull-off and gone just after; NaN stays NaN', () => {
  const pull = pullOffJkrN(30e-9, 0.08);
  assert.ok(jkrRadiusM(-0.999 * pull, 30e-9, 50e9, 0.08) > 0);
  assert.ok(Number.isNaN(jkrRadiusM(-1.001 * pull, 30e-9, 50e9, 0.08)));
  assert.ok(Number.isNaN(dmtRadiusM(Number.NaN, 30e-9, 50e9, 0.08)));
});

test('Tabor’s parameter: small for a sharp stiff tip, large for a blunt soft body', () => {
  assert.ok(taborParameter(25e-9, 100e9, 0.05) < 0.2);
  assert.ok(taborParameter(1e-3, 1e6, 0.05) > 5);
  assertClose(taborParameter(8e-9, 1e9, 0.1) / taborParameter(1e-9, 1e9, 0.1), 2, 1e-12);
});

test('the spread of the area is the spread of the density: median, range and mean of drawn contacts', () => {
  const random = seededRandom('contacts');
  const sd = Math.log(Math.sqrt(10)) / 1.959963984540054;
  const drawn = Array.from({ length: 40000 }, () => 1e-9 / (17e-18 * Math.exp(sd * random.normal()))).sort((a, b) => a - b);
  const density = densityOfContact(1e-9, 17e-18, Math.sqrt(10));
  assertClose(drawn[20000]!, density.median, 0.02);
  assertClose(drawn[1000]!, density.low95, 0.04);
  assertClose(drawn[39000]!, density.high95, 0.04);
  assertClose(drawn.reduce((sum, value) => sum + value, 0) / 40000, density.mean, 0.02);
  assertClose(currentOfContact(density.median, 17e-18, 2).median, 1e-9, 1e-12);
});

test('a step is the better settled the slower the scan, and the bandwidth for a share leaves that share', () => {
  assert.ok(settledShare(500, 1, 512) > settledShare(500, 2, 512));
  for (const remaining of [0.1, 0.01, 1e-4]) assertClose(1 - settledShare(bandwidthForSettlingHz(1.5, 384, remaining), 1.5, 384), remaining, 1e-9);
});
