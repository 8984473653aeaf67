/**
 * Tunnelling and contact against values from outside the program. [P] published, [F] computed
 * independently from the named formula with CODATA constants.
 */
import assert from 'node:assert/strict';
import { test } from 'node:test';
import { barrierWarnings } from '../../src/barrier/model/barrier-warnings.ts';
import * as constants from '../../src/barrier/model/constants.ts';
import { describeFromCurrent } from '../../src/barrier/model/describe.ts';
import { hertzAreaM2, hertzRadiusM, pullOffDmtN, pullOffJkrN } from '../../src/barrier/model/contact.ts';
import { wkbExponent } from '../../src/barrier/model/field.ts';
import { fowlerNordheimModel } from '../../src/barrier/model/fowler-nordheim.ts';
import { imageField, imageT, imageV } from '../../src/barrier/model/image-charge.ts';
import { decadesPerLayer, thicknessFromDensity } from '../../src/barrier/model/inverse.ts';
import { johnsonNoiseA, onePoleNoiseBandwidthHz } from '../../src/barrier/model/johnson-noise.ts';
import { simmonsModel } from '../../src/barrier/model/simmons.ts';
import { temperatureFactor } from '../../src/barrier/model/temperature-factor.ts';
import { wkbModel } from '../../src/barrier/model/wkb.ts';
import { steepnessFromRatio, thicknessFromRatio } from '../../src/barrier/two-bias.ts';
import { lineFit } from '../../src/stats/line-fit.ts';
import { assertClose } from '../fixtures/assert-close.ts';

const nm = (heightEv: number, massRatio: number, thicknessNm: number) => ({ heightEv, massRatio, thicknessM: thicknessNm * 1e-9 });
const fn = fowlerNordheimModel();
const perCm2 = 1e-4;

test('[P] CODATA: the constants of Fowler–Nordheim, image charge and barrier wave number', () => {
  assertClose(constants.fowlerNordheimA, 1.541434e-6, 5e-7);
  assertClose(constants.fowlerNordheimB, 6.83089, 5e-7);
  assertClose(constants.imageChargeEv2NmPerV, 1.439964, 5e-7);
  assertClose(constants.waveNumberPerRootEv, 5.123167, 5e-7);
  assertClose(constants.simmonsA * 1e20 * perCm2, 6.165735e10, 5e-7);
});

test('[F] Fowler–Nordheim density (Lenzlinger & Snow 1969)', () => {
  assertClose(fn.density(nm(4.5, 1, 1), 5) * 1e-18, 1.857036e-11, 1e-4);
  assertClose(wkbExponent(nm(3.07, 0.26, 4), 4), 18.73577, 1e-4);
  assertClose(fn.density(nm(3.07, 0.26, 4), 4) * perCm2, 1.4092, 1e-4);
  assertClose(fn.density(nm(2.5, 0.5, 4), 4) * perCm2, 0.629602, 1e-4);
  assertClose(fn.density(nm(2.5, 0.5, 4), 4.8) * perCm2, 21.8484, 1e-4);
});

test('[F] image charge (Forbes & Deane 2007): v, t and density', () => {
  assertClose(imageV(0.1), 0.859439, 1e-5);
  assertClose(imageV(0.5), 0.44095, 1e-5);
  assertClose(imageV(0.9), 0.084115, 1e-5);
  assertClose(imageT(0.5), 1.070682, 1e-5);
  assertClose(fowlerNordheimModel({ imagePermittivity: 1 }).density(nm(4.5, 1, 1), 5) * 1e-18, 3.9176e-9, 1e-3);
});

test('[F] Simmons 1963, direct tunnelling', () => {
  assertClose(simmonsModel.density(nm(3, 1, 1), 0.5) * perCm2, 51.747, 1e-3);
  assertClose(simmonsModel.density(nm(3.07, 0.26, 3), 2) * perCm2, 2.27999e-2, 1e-3);
});

test('[F] WKB density over the zero-temperature supply (Tsu & Esaki 1973, T = 0), below, at and above the barrier', () => {
  const barrier = nm(2.5, 0.5, 4);
  assertClose(wkbModel.density(barrier, 1) * perCm2, 2.88549e-10, 1e-4);
  assertClose(wkbModel.density(barrier, 2.5) * perCm2, 3.72893e-6, 1e-4);
  assertClose(wkbModel.density(barrier, 4) * perCm2, 0.599775, 1e-4);
  assertClose(wkbModel.density(barrier, 5) * perCm2, 42.2057, 1e-4);
});

test('[F] two biases: ln(J(5 V)/J(4 V)) carries the thickness and no tip area', () => {
  for (const [thicknessNm, expected] of [[4, 4.26487], [4.333, 4.58277]] as const) {
    const barrier = nm(2.5, 0.5, thicknessNm);
    assertClose(fn.lnDensity(barrier, 5) - fn.lnDensity(barrier, 4), expected, 1e-4);
  }
});

test('[F] WKB exponent at the Fermi level', () => {
  const barrier = nm(2.7, 0.5, 3);
  assertClose(wkbExponent(barrier, 0), 35.7155, 1e-5);
  assertClose(wkbExponent(barrier, 1e-9), 35.7155, 1e-5);
  assertClose(wkbExponent(barrier, 1), 32.1693, 1e-5);
  assertClose(wkbExponent(barrier, 2.7), 23.8103, 1e-5);
});

test('[F] one layer of 0.333 nm: transmission at low bias, density at 4 V', () => {
  const perLayer = (heightEv: number, massRatio: number) =>
    Math.exp(wkbExponent(nm(heightEv, massRatio, 3.333), 1e-6) - wkbExponent(nm(heightEv, massRatio, 3), 1e-6));
  assertClose(perLayer(2.5, 0.5), 45.366, 1e-4);
  assertClose(perLayer(3.07, 0.26), 21.081, 1e-4);
  assertClose(10 ** decadesPerLayer(fn, nm(2.5, 0.5, 9 * 0.333), 4, 0.333e-9), 6.0509, 1e-3);
});

test('[F] Fowler–Nordheim plot of exact data: slope, intercept, height, and a breakdown note', () => {
  const barrier = nm(2.5, 0.5, 4);
  const areaM2 = 20e-18;
  const biases = Array.from({ length: 21 }, (_, k) => 4 + 0.1 * k);
  const fit = lineFit(biases.map((v) => 1 / v), biases.map((v) => Math.log((fn.density(barrier, v) * areaM2) / v ** 2)));
  assertClose(fit.slope, -76.37167, 1e-5);
  assertClose(fit.intercept, -13.3828, 1e-5);
  const height = (thicknessNm: number) => (-fit.slope / (constants.fowlerNordheimB * Math.sqrt(0.5) * thicknessNm)) ** (2 / 3);
  assertClose(height(4), 2.5, 1e-5);
  assertClose(height(4.333), 2.3702, 1e-4);
  assert.ok(barrierWarnings(fn, barrier, 6).some((entry) => entry.code === 'barrier-breakdown'), 'a breakdown note at 1.5 V/nm (Hattori et al. 2015 [P])');
  assert.ok(!barrierWarnings(fn, barrier, 4).some((entry) => entry.code === 'barrier-breakdown'), 'none at 1.0 V/nm');
});

test('[F] the field that carries 1 pA and 10 nA through 16.92 nm²', () => {
  for (const [currentA, field] of [[1e-12, 1.11806], [1e-8, 2.09334]] as const) {
    const thicknessM = thicknessFromDensity(fn, { heightEv: 2.5, massRatio: 0.5 }, 5, currentA / 16.92e-18);
    assertClose(5 / (thicknessM * 1e9), field, 1e-4);
  }
});

test('[F] derivatives of the WKB density, by Simpson’s rule and five-point differences in another program', () => {
  const barrier = nm(2.5, 0.5, 4);
  for (const [biasV, perV, perNm] of [[1, 5.106590511866423, -10.73721940775855], [4, 5.261935491725674, -5.261935596363898]] as const) {
    const { lnPerV, lnPerM } = wkbModel.slopes(barrier, biasV);
    assertClose(lnPerV, perV, 1e-7);
    assertClose(lnPerM * 1e-9, perNm, 1e-7);
  }
});

test('[F] the ratio at 5 and 4 V gives √m·φ^1.5·d = 11.18034 eV^1.5 nm, and with φ and m the thickness', () => {
  for (const [thicknessNm, lnRatio] of [[4, 4.26487], [4.333, 4.58277]] as const) {
    assertClose(steepnessFromRatio(lnRatio, 4, 5).steepnessEv15Nm, Math.sqrt(0.5) * 2.5 ** 1.5 * thicknessNm, 1e-5);
    assertClose(thicknessFromRatio(fn, { heightEv: 2.5, massRatio: 0.5 }, 4, 5, lnRatio), thicknessNm * 1e-9, 1e-5);
  }
});

test('[P] v(f) ≈ 1 − f + (f/6) ln f to 0.0025 (Forbes, Appl. Phys. Lett. 89, 113122, 2006)', () => {
  for (let k = 1; k < 100; k++) assert.ok(Math.abs(imageV(k / 100) - (1 - k / 100 + (k / 600) * Math.log(k / 100))) < 0.0025);
});

test('[M] Schottky’s lowering √(e³F/4πε) is 0.65 eV at 1 V/nm in hBN (3.4 [P, Pierret et al. 2022]), so f = 0.0678 at 2.5 eV', () => {
  assertClose(imageField(1, 2.5, 3.4), 0.067763, 1e-5);
  assertClose(2.5 * Math.sqrt(imageField(1, 2.5, 3.4)), 0.650783, 1e-5);
});

test('[F] Simmons at small bias: J/V = (e²/2πhs²)(a√φ/2 − 1)exp(−a√φ), 95.2048 A/cm²/V at 3 eV, 1 nm, m 1', () => {
  assertClose((simmonsModel.density(nm(3, 1, 1), 1e-4) / 1e-4) * perCm2, 95.2048, 1e-5);
});

test('[F] without 1/m the plot keeps its slope and loses ln m in its intercept', () => {
  const other = fowlerNordheimModel({ massPrefactor: 'none' });
  for (const biasV of [4, 5, 6]) assertClose(other.lnDensity(nm(2.5, 0.5, 4), biasV) - fn.lnDensity(nm(2.5, 0.5, 4), biasV), Math.log(0.5), 1e-12);
});

test('[F] 1 nA/µm² through 17 nm² is 17 fA', () => {
  assertClose(describeFromCurrent({ currentA: 17e-15, tipAreaNm2: 17, biasV: 4 }).densityNaPerUm2, 1, 1e-9);
});

test('[F] Hertz, DMT, JKR and the density under a tip', () => {
  assertClose(hertzRadiusM(20e-9, 25e-9, 30e9), 2.32079e-9, 1e-4);
  assertClose(hertzAreaM2(20e-9, 25e-9, 30e9), 16.9209e-18, 1e-4);
  assertClose(pullOffDmtN(25e-9, 0.1), 15.708e-9, 1e-4);
  assertClose(pullOffJkrN(25e-9, 0.1), 11.781e-9, 1e-4);
  // A/m² equals µA/µm² times 1e6.
  assertClose((1e-9 / hertzAreaM2(20e-9, 25e-9, 30e9)) * 1e-6, 59.0985, 1e-4);
});

test('[F] Johnson noise of 1 GΩ at 295 K over 1 kHz, and of one pole at 1 kHz', () => {
  assertClose(johnsonNoiseA(1e9, 295, 1000), 0.12764e-12, 1e-3);
  assertClose(johnsonNoiseA(1e9, 295, onePoleNoiseBandwidthHz(1000)), 0.15998e-12, 1e-3);
});

test('[F] temperature factor x/sin x at 300 K, 1 V/nm, 2.5 eV, m 0.5', () => {
  assertClose(temperatureFactor(300, 1, 2.5, 0.5), 1.16, 1e-3);
});
