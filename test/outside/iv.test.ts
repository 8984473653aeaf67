/**
 * I–V curves, contact and amplifier against values from outside the program. [P] published, [F] computed
 * independently from the named formula with CODATA constants, [M] from memory, [T] common practice.
 */
import assert from 'node:assert/strict';
import { test } from 'node:test';
import { densityOfContact, hertzAreaFactor95 } from '../../src/barrier/model/contact-density.ts';
import { contactAreaM2, dmtRadiusM, hertzRadiusM, jkrRadiusM, pullOffDmtN, pullOffJkrN, reducedModulusPa } from '../../src/barrier/model/contact.ts';
import { johnsonNoiseA, onePoleNoiseBandwidthHz } from '../../src/barrier/model/johnson-noise.ts';
import { bandwidthForSettlingHz, pixelTimeS, settledShare } from '../../src/barrier/model/settling.ts';
import { temperatureFactor } from '../../src/barrier/model/temperature-factor.ts';
import { analyseCurves } from '../../src/iv/analyse-curves.ts';
import { readCurves } from '../../src/iv/read-curves.ts';
import { seededRandom } from '../../src/stats/random.ts';
import { assertClose } from '../fixtures/assert-close.ts';
import { measureCurve } from '../iv/measure-curve.ts';
import { textBytes } from '../read/refused.ts';

/** Fowler–Nordheim written out anew from A and B as published, in V, nm and eV; A. */
const current = (biasV: number, heightEv: number, massRatio: number, thicknessNm: number, areaNm2: number): number => {
  const field = biasV / thicknessNm;
  return areaNm2 * (1.541434e-6 / (heightEv * massRatio)) * field ** 2 * Math.exp((-6.83089 * Math.sqrt(massRatio) * heightEv ** 1.5) / field);
};
const table = (heightEv: number, massRatio: number, thicknessNm: number, areaNm2: number, fromV = 4, toV = 6): string =>
  ['bias_V,current_nA', ...Array.from({ length: 21 }, (_, k) => fromV + ((toV - fromV) * k) / 20).map((bias) => `${bias},${current(bias, heightEv, massRatio, thicknessNm, areaNm2) * 1e9}`)].join('\n');
const analyse = (text: string, options: Parameters<typeof analyseCurves>[1]) => {
  const result = analyseCurves(readCurves({ name: 'exact.csv', bytes: textBytes(text) }).curves, options);
  return { ...result, curve: result.curves[0]! };
};

test('[F] exact data, φ 2.5 eV, m 0.5, 4 nm, 20 nm², 4–6 V: slope −76.37167 V, intercept −13.38280, φ 2.5000, all points used', () => {
  const { curve, warnings } = analyse(table(2.5, 0.5, 4, 20), { thicknessNm: 4, areaNm2: 20 });
  assertClose(curve.slopeV, -76.37167, 1e-5);
  assertClose(curve.intercept, -13.3828, 1e-5);
  assertClose(curve.barrierEv, 2.5, 1e-5);
  assertClose(curve.effectiveAreaNm2, 20, 1e-4);
  assert.deepEqual(curve.used, [4, 6]);
  assert.equal(curve.usedPoints, 21);
  assert.deepEqual(warnings.map((warning) => warning.code), ['iv-breakdown']);
  assert.match(warnings[0]!.message, /1\.00–1\.50 V\/nm .*breakdown of hBN .*1\.2 V\/nm \(Hattori et al\., ACS Nano 9, 916, 2015\)/);
});

test('[F] the same slope read with 4.333 nm gives φ 2.3702; read with 2.5 eV it gives 4 nm', () => {
  assertClose(analyse(table(2.5, 0.5, 4, 20), { thicknessNm: 4.333 }).curve.barrierEv, 2.3702, 1e-4);
  assertClose(analyse(table(2.5, 0.5, 4, 20), {}).curve.thicknessNm, 4, 1e-5);
});

test('[F] Lenzlinger & Snow 1969: the exponent of 3.07 eV, m 0.26 at 1 V/nm is 18.73577, so the slope at 10 nm is −187.3577 V', () => {
  const { curve } = analyse(table(3.07, 0.26, 10, 1e10, 8, 11), { thicknessNm: 10, massRatio: 0.26 });
  assertClose(curve.slopeV, -187.3577, 1e-5);
  assertClose(curve.barrierEv, 3.07, 1e-5);
});

test('[T] no breakdown note where the field stays below 1.2 V/nm', () => {
  assert.deepEqual(analyse(table(2.5, 0.5, 4, 1e6, 3.2, 4.4), { thicknessNm: 4 }).warnings, []);
});

test('[T] the plot is straight at high bias and steeper for thicker barriers', () => {
  const slopes = [3, 4, 5].map((thicknessNm) => analyse(table(2.5, 0.5, thicknessNm, 20, thicknessNm, 1.5 * thicknessNm), { thicknessNm }).curve.slopeV!);
  assert.ok(slopes[0]! > slopes[1]! && slopes[1]! > slopes[2]!);
  assertClose(slopes[2]! / slopes[0]!, 5 / 3, 1e-4);
});

test('[F] [T] a tunnelling I–V does not move with temperature: factor 1.160 at 300 K, 1 V/nm passes, a current that halves every 10 K does not', () => {
  const random = seededRandom('outside');
  const at = (temperatureK: number, factor: number) =>
    measureCurve(random, { barrier: { heightEv: 2.5, massRatio: 0.5, thicknessM: 4e-9 }, areaNm2: 1000, toV: 5, points: 101, noiseA: 1e-13, share: 0.01, temperatureK, factor });
  assertClose(temperatureFactor(300, 1, 2.5, 0.5), 1.16, 1e-3);
  assert.equal(analyseCurves([at(77, 1.01), at(300, 1.16)], { thicknessNm: 4 }).temperature?.verdict, 'tunnelling');
  assert.equal(analyseCurves([at(260, 1 / 16), at(280, 1 / 4), at(300, 1)], { thicknessNm: 4 }).temperature?.verdict, 'thermally-activated');
});

test('[F] contact of 20 nN, R 25 nm, E* 30 GPa: Hertz 2.32079 nm; DMT and JKR with 0.1 J/m²', () => {
  assertClose(hertzRadiusM(20e-9, 25e-9, 30e9), 2.32079e-9, 1e-4);
  assertClose(contactAreaM2(hertzRadiusM(20e-9, 25e-9, 30e9)), 16.9209e-18, 1e-4);
  // a³ = (3·25/(4·30))·(20 + 15.70796) nm³ = 0.625·35.70796 nm³.
  assertClose(dmtRadiusM(20e-9, 25e-9, 30e9, 0.1), 2.815454e-9, 1e-6);
  // a³ = 0.625·(20 + 23.56194 + √(2·23.56194·20 + 23.56194²)) = 0.625·82.26134 nm³.
  assertClose(jkrRadiusM(20e-9, 25e-9, 30e9, 0.1), 3.718421e-9, 1e-6);
});

test('[P] JKR 1971, DMT 1975: radius at no load and at pull-off, and the forces themselves', () => {
  assertClose(pullOffDmtN(25e-9, 0.1), 15.708e-9, 1e-4);
  assertClose(pullOffJkrN(25e-9, 0.1), 11.781e-9, 1e-4);
  // At no load a³ = 9πwR²/2E*; at pull-off a quarter of that (JKR eqs. 21 and 23, with K = 4E*/3).
  const unloaded = (9 * Math.PI * 0.1 * 25e-9 ** 2) / (2 * 30e9);
  assertClose(jkrRadiusM(0, 25e-9, 30e9, 0.1) ** 3, unloaded, 1e-9);
  assertClose(jkrRadiusM(-pullOffJkrN(25e-9, 0.1) * (1 - 1e-12), 25e-9, 30e9, 0.1) ** 3, unloaded / 4, 1e-4);
  assert.ok(Number.isNaN(jkrRadiusM(-12e-9, 25e-9, 30e9, 0.1)));
  assert.equal(dmtRadiusM(-pullOffDmtN(25e-9, 0.1), 25e-9, 30e9, 0.1), 0);
  assert.ok(Number.isNaN(dmtRadiusM(-16e-9, 25e-9, 30e9, 0.1)));
  // Two equal bodies without Poisson's effect halve the modulus.
  assertClose(reducedModulusPa(100e9, 0, 100e9, 0), 50e9, 1e-12);
});

test('[F] 1 nA over 16.9209 nm² is 59.0985 µA/µm²; a decade of area is a decade of density, mean/median 1.18830', () => {
  const density = densityOfContact(1e-9, 16.9209e-18, Math.sqrt(10));
  assertClose(density.median * 1e-6, 59.0985, 1e-4);
  assertClose(density.high95 / density.low95, 10, 1e-9);
  // exp(s²/2), s = ln(10)/(2·1.959964) = 0.587405.
  assertClose(density.mean / density.median, 1.18830, 1e-5);
  // Force to a factor 2, radius 1.5, modulus 1.5: exp(⅔·√(0.693147² + 2·0.405465²)).
  assertClose(hertzAreaFactor95(2, 1.5, 1.5), 1.821617, 1e-6);
});

test('[F] Johnson noise of 1 GΩ at 295 K, 1 kHz; and what one pole of 1 kHz reaches in a pixel of 512 at 1 line/s', () => {
  assertClose(johnsonNoiseA(1e9, 295, 1000), 0.12764e-12, 1e-3);
  assertClose(johnsonNoiseA(1e9, 295, onePoleNoiseBandwidthHz(1000)), 0.15998e-12, 1e-3);
  assertClose(pixelTimeS(1, 512), 0.9765625e-3, 1e-12);
  // 1 − exp(−2π·0.9765625); ln(100)/(2π·0.9765625 ms).
  assertClose(settledShare(1000, 1, 512), 0.9978363, 1e-6);
  assertClose(bandwidthForSettlingHz(1, 512), 750.5261, 1e-6);
  assertClose(settledShare(bandwidthForSettlingHz(2, 256, 0.05), 2, 256), 0.95, 1e-12);
});
