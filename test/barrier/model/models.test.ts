import assert from 'node:assert/strict';
import { test } from 'node:test';
import { barrierWarnings } from '../../../src/barrier/model/barrier-warnings.ts';
import { chooseModel, modelOfSection } from '../../../src/barrier/model/choose-model.ts';
import { completeElliptic } from '../../../src/barrier/model/elliptic.ts';
import { fieldVPerNm, regime, wkbExponent } from '../../../src/barrier/model/field.ts';
import { fowlerNordheimModel } from '../../../src/barrier/model/fowler-nordheim.ts';
import { imageT, imageV } from '../../../src/barrier/model/image-charge.ts';
import { simmonsModel } from '../../../src/barrier/model/simmons.ts';
import { temperatureFactor } from '../../../src/barrier/model/temperature-factor.ts';
import { Problem } from '../../../src/problems/problem.ts';
import { assertClose } from '../../fixtures/assert-close.ts';

const barrier = { heightEv: 2.5, massRatio: 0.5, thicknessM: 4e-9 };
const codes = (model: Parameters<typeof barrierWarnings>[0], shape: typeof barrier, biasV: number) => barrierWarnings(model, shape, biasV).map((entry) => entry.code);

test('regime and field', () => {
  assert.equal(regime(2.49, 2.5), 'direct');
  assert.equal(regime(-2.49, 2.5), 'direct');
  assert.equal(regime(2.5, 2.5), 'fowler-nordheim');
  assertClose(fieldVPerNm(-5, 4e-9), 1.25, 1e-12);
});

test('the WKB exponent is continuous through V = φ and equals κ·d·2 of a rectangle without bias', () => {
  assertClose(wkbExponent(barrier, 2.5 + 1e-9), wkbExponent(barrier, 2.5 - 1e-9), 1e-8);
  assertClose(wkbExponent(barrier, 0), 2 * 5.123167 * Math.sqrt(0.5 * 2.5) * 4, 1e-6);
  assert.ok(wkbExponent(barrier, 1, -0.5) > wkbExponent(barrier, 1, 0), 'deeper electrons meet more barrier');
});

test('Fowler–Nordheim: the 1/m prefactor is an option', () => {
  const ratio = fowlerNordheimModel().density(barrier, 4) / fowlerNordheimModel({ massPrefactor: 'none' }).density(barrier, 4);
  assertClose(ratio, 2, 1e-12);
});

test('[F] complete elliptic integrals against SciPy 1.17 ellipk, ellipe', () => {
  for (const [m, first, second] of [[0, 1.5707963267948966, 1.5707963267948966], [0.1, 1.6124413487202192, 1.5307576368977633], [0.5, 1.8540746773013719, 1.3506438810476755], [0.9, 2.5780921133481733, 1.1047747327040733], [0.999999, 8.294051463601061, 1.0000038970261722]] as const) {
    const got = completeElliptic(m);
    assertClose(got.first, first, 1e-13);
    assertClose(got.second, second, 1e-13);
  }
  assert.ok(Number.isNaN(completeElliptic(1).first));
});

test('[F] t(f) = v − (4/3) f v′ by 15-digit differentiation of v', () => {
  for (const [f, v, t] of [[0.01, 0.98168194029487421, 1.0036176605349685], [0.1, 0.85943890460034389, 1.0225175695043709], [0.5, 0.44094994174062108, 1.0706817034430345], [0.9, 0.084115067768341642, 1.1036084835840048]] as const) {
    assertClose(imageV(f), v, 1e-12);
    assertClose(imageT(f), t, 1e-12);
  }
  assert.equal(imageV(0), 1);
  assert.equal(imageT(0), 1);
  assertClose(imageV(1), 0, 0, 'v(1)', 1e-12);
  assertClose(imageT(1), Math.PI / (2 * Math.SQRT2), 1e-12);
  assert.ok(Number.isNaN(imageV(1.01)));
});

test('the image charge raises the density, less so in a dielectric, and ends where the barrier is gone', () => {
  const bare = fowlerNordheimModel().density(barrier, 4);
  const inHbn = fowlerNordheimModel({ imagePermittivity: 3.4 }).density(barrier, 4);
  const inVacuum = fowlerNordheimModel({ imagePermittivity: 1 }).density(barrier, 4);
  assert.ok(bare < inHbn && inHbn < inVacuum);
  assertClose(fowlerNordheimModel({ imagePermittivity: 1e9 }).density(barrier, 4), bare, 1e-3);
  const model = fowlerNordheimModel({ imagePermittivity: 1 });
  const gone = { ...barrier, thicknessM: model.thinnestM(barrier, 4) * 0.999 };
  assert.ok(Number.isNaN(model.density(gone, 4)));
  assert.ok(Number.isFinite(model.lnDensity({ ...barrier, thicknessM: model.thinnestM(barrier, 4) * 1.001 }, 4)));
  assert.ok(codes(model, gone, 4).includes('barrier-image-lost'));
});

test('Simmons: NaN from the barrier height on, with a remark; ohmic at small bias', () => {
  assert.ok(Number.isNaN(simmonsModel.density(barrier, 2.5)));
  assert.ok(Number.isFinite(simmonsModel.lnDensity(barrier, 2.49)));
  assertClose(simmonsModel.density(barrier, 1e-6) / simmonsModel.density(barrier, 1e-7), 10, 1e-6);
  assert.deepEqual(codes(simmonsModel, barrier, 4), ['barrier-simmons-range']);
  assert.deepEqual(codes(simmonsModel, barrier, 1), []);
  assert.ok(codes(simmonsModel, { ...barrier, thicknessM: 0.3e-9 }, 0.1).includes('barrier-simmons-thin'));
});

test('Simmons falls with thickness everywhere above the thickness it names, at any bias below the height', () => {
  for (const heightEv of [0.5, 2.5, 6]) {
    for (const share of [0.001, 0.3, 0.7, 0.95, 0.999]) {
      const material = { heightEv, massRatio: 0.3 };
      const thinnest = simmonsModel.thinnestM(material, share * heightEv);
      let previous = Number.POSITIVE_INFINITY;
      for (let k = 0; k < 200; k++) {
        const here = simmonsModel.lnDensity({ ...material, thicknessM: thinnest * 1.02 ** k }, share * heightEv);
        assert.ok(here < previous, `φ ${heightEv}, V ${share * heightEv}, step ${k}`);
        previous = here;
      }
    }
  }
});

test('[F] Simmons carries no 1/m: about 2.4 times below WKB at 1 V, m 0.5', () => {
  const ratio = chooseModel('wkb').density(barrier, 1) / simmonsModel.density(barrier, 1);
  assertClose(ratio, 2.4, 0.05);
});

test('remarks: breakdown, thickness, Fowler–Nordheim below the height', () => {
  const wkb = chooseModel('wkb');
  assert.deepEqual(codes(wkb, barrier, 4), []);
  assert.deepEqual(codes(wkb, barrier, 4.8), ['barrier-breakdown']);
  assert.deepEqual(codes(wkb, { ...barrier, thicknessM: 0.999e-9 }, 0.1), ['barrier-thickness-range']);
  assert.deepEqual(codes(wkb, { ...barrier, thicknessM: 10.01e-9 }, 1), ['barrier-thickness-range']);
  assert.deepEqual(codes(chooseModel('fowler-nordheim'), barrier, 2), ['barrier-fowler-range']);
});

test('a recipe’s section gives its model: prefactor and image charge for Fowler–Nordheim alone', () => {
  const section = { model: 'fowler-nordheim', prefactor: 'none', imagePermittivity: 3.4 } as const;
  const asked = fowlerNordheimModel({ massPrefactor: 'none', imagePermittivity: 3.4 });
  assert.equal(modelOfSection(section).lnDensity(barrier, 4), asked.lnDensity(barrier, 4));
  assert.equal(modelOfSection({ ...section, model: 'wkb' }).lnDensity(barrier, 4), chooseModel('wkb').lnDensity(barrier, 4));
});

test('an image charge is refused for models without one, and a permittivity below 1', () => {
  assert.throws(() => chooseModel('wkb', { imagePermittivity: 3.4 }), (error: unknown) => error instanceof Problem && /--model fowler-nordheim/.test(error.message));
  assert.throws(() => chooseModel('fowler-nordheim', { imagePermittivity: 0.5 }), /at least 1/);
});

test('the temperature factor is 1 at 0 K and has no meaning from x = π on', () => {
  assert.equal(temperatureFactor(0, 1, 2.5, 0.5), 1);
  assert.ok(Number.isNaN(temperatureFactor(1100, 1, 2.5, 0.5)));
});
