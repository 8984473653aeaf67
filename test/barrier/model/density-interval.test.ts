import assert from 'node:assert/strict';
import { test } from 'node:test';
import { chooseModel } from '../../../src/barrier/model/choose-model.ts';
import { defaultSpread, densityInterval } from '../../../src/barrier/model/density-interval.ts';
import type { DensityInterval } from '../../../src/barrier/model/density-interval.ts';
import { seededRandom } from '../../../src/stats/random.ts';
import { assertClose } from '../../fixtures/assert-close.ts';

const material = { heightEv: 2.5, massRatio: 0.5 };
const fn = chooseModel('fowler-nordheim');
const wkb = chooseModel('wkb');
const probe = { currentA: 1e-12, biasV: 5, areaM2: 17e-18 };

/** ln of median and ends within 5 % of the interval's width of a Monte Carlo's percentiles. */
function assertPercentiles(got: DensityInterval, [median, low, high]: readonly [number, number, number]): void {
  const allowed = 0.05 * (high - low);
  for (const [name, value, expected] of [['median', got.medianAPerM2, median], ['low', got.low95APerM2, low], ['high', got.high95APerM2, high]] as const) {
    assertClose(Math.log(value), expected, 0, name, allowed);
  }
}

// [F] Percentiles 50, 2.5, 97.5 of ln J at 4 V from 2 million draws with NumPy of height 2.5 ± 0.1 eV,
// ln mass ± 0.1 and ln area ± ln√10/1.96 through Fowler–Nordheim's formula; with known thickness
// the draws are weighted by the chance of an area that gives the measured current.
test('[F] thickness from the current: the Monte Carlo’s interval', () => {
  const got = densityInterval({ model: fn, material, deviceBiasV: 4, probe });
  assertPercentiles(got, [6.26665, 4.85724, 7.67342]);
  assertClose(got.thicknessM, 4.49e-9, 0.01);
  assertClose(got.thicknessSdM, 0.365e-9, 0.02);
  // J depends on m·d² alone, so a wrong mass is made good by the thickness it leads to.
  assertClose(got.parts.mass, 0, 0, 'mass', 1e-9);
});

test('[F] known thickness and current: the weighted Monte Carlo’s interval', () => {
  const at = (thicknessNm: number) => densityInterval({ model: fn, material, deviceBiasV: 4, probe, thicknessM: thicknessNm * 1e-9 });
  assertPercentiles(at(4.333), [6.38293, 5.06617, 7.6922]);
  assertPercentiles(at(4), [6.65344, 5.33461, 7.9637]);
  assertPercentiles(at(4.666), [6.14445, 4.82742, 7.45341]);
  assertClose(at(4).material.heightEv, 2.5938, 2e-3);
  assertClose(at(4).material.massRatio, 0.54676, 1e-2);
});

test('[F] known thickness alone: height and mass', () => {
  // The Monte Carlo's own distribution is skewed by 4 % of its width.
  assertPercentiles(densityInterval({ model: fn, material, deviceBiasV: 4, thicknessM: 4e-9 }), [8.75652, 5.46009, 11.69947]);
});

test('at the probe’s own bias only the area is left', () => {
  const got = densityInterval({ model: wkb, material, deviceBiasV: 5, probe });
  assertClose(got.medianAPerM2, 1e-12 / 17e-18, 1e-12);
  assertClose(got.high95APerM2 / got.medianAPerM2, Math.sqrt(10), 1e-9);
  assertClose(got.medianAPerM2 / got.low95APerM2, Math.sqrt(10), 1e-9);
});

test('a known thickness narrows the interval; an exact area pins the probe’s density', () => {
  const free = densityInterval({ model: wkb, material, deviceBiasV: 4, probe });
  const counted = densityInterval({ model: wkb, material, deviceBiasV: 4, probe, thicknessM: free.thicknessM });
  const uncalibrated = densityInterval({ model: wkb, material, deviceBiasV: 4, thicknessM: free.thicknessM });
  assert.ok(counted.sdLn < free.sdLn && counted.sdLn < uncalibrated.sdLn);
  assertClose(counted.medianAPerM2, free.medianAPerM2, 1e-6);
  assertClose(counted.surprise, 0, 0, 'surprise', 1e-6);
  const exact = densityInterval({ model: wkb, material, deviceBiasV: 5, probe, thicknessM: 4.2e-9, spread: { ...defaultSpread, areaFactor95: 1 } });
  assertClose(exact.medianAPerM2, 1e-12 / 17e-18, 1e-6);
  assertClose(exact.sdLn, 0, 0, 'sd', 1e-6);
});

test('a layer count that contradicts the current is a surprise', () => {
  const got = densityInterval({ model: wkb, material, deviceBiasV: 4, probe, thicknessM: 2.5e-9 });
  assert.ok(got.surprise! < -2, `${got.surprise}`);
});

test('NaN where nothing fits, an error where nothing is asked', () => {
  assert.ok(Number.isNaN(densityInterval({ model: chooseModel('simmons'), material, deviceBiasV: 4, probe }).medianAPerM2));
  assert.throws(() => densityInterval({ model: wkb, material, deviceBiasV: 4 }), RangeError);
});

test('a thickness with an error: the interval is that of a Monte Carlo over height, mass, area and thickness given the current', () => {
  const thicknessSdM = 0.3e-9;
  const thicknessM = 4.3e-9;
  const got = densityInterval({ model: wkb, material, deviceBiasV: 4, probe, thicknessM, thicknessSdM });
  const random = seededRandom('thickness');
  const seen = Math.log(probe.currentA / probe.areaM2);
  const areaSd = Math.log(defaultSpread.areaFactor95) / 1.959963984540054;
  const drawn: { ln: number; weight: number }[] = [];
  for (let k = 0; k < 20000; k++) {
    const own = { heightEv: material.heightEv + defaultSpread.heightSdEv * random.normal(), massRatio: material.massRatio * Math.exp(defaultSpread.massSdRatio * random.normal()) };
    const thick = thicknessM * Math.exp((thicknessSdM / thicknessM) * random.normal());
    const off = (seen - fn.lnDensity({ ...own, thicknessM: thick }, probe.biasV)) / areaSd;
    drawn.push({ ln: fn.lnDensity({ ...own, thicknessM: thick }, 4), weight: Math.exp(-0.5 * off * off) });
  }
  // Fowler–Nordheim is quick to draw from; its own interval is what is compared.
  const closed = densityInterval({ model: fn, material, deviceBiasV: 4, probe, thicknessM, thicknessSdM });
  drawn.sort((a, b) => a.ln - b.ln);
  const total = drawn.reduce((sum, { weight }) => sum + weight, 0);
  const at = (share: number): number => {
    let sum = 0;
    return drawn.find(({ weight }) => (sum += weight) >= share * total)!.ln;
  };
  const width = at(0.975) - at(0.025);
  assert.ok(Math.abs(Math.log(closed.medianAPerM2) - at(0.5)) < 0.05 * width);
  assert.ok(Math.abs(Math.log(closed.low95APerM2) - at(0.025)) < 0.05 * width);
  assert.ok(Math.abs(Math.log(closed.high95APerM2) - at(0.975)) < 0.05 * width);
  // Between an exact thickness and none at all.
  const exact = densityInterval({ model: wkb, material, deviceBiasV: 4, probe, thicknessM });
  assert.ok(got.sdLn > exact.sdLn && got.sdLn < densityInterval({ model: wkb, material, deviceBiasV: 4, probe }).sdLn * 1.05);
  const hardly = densityInterval({ model: wkb, material, deviceBiasV: 4, probe, thicknessM, thicknessSdM: 1e-15 });
  assertClose(hardly.sdLn, exact.sdLn, 1e-3);
});
