import assert from 'node:assert/strict';
import { test } from 'node:test';
import { chooseModel } from '../../../src/barrier/model/choose-model.ts';
import { fowlerNordheimB } from '../../../src/barrier/model/constants.ts';
import { imageS, imageT, imageTSlope, imageV } from '../../../src/barrier/model/image-charge.ts';
import type { TunnelModel } from '../../../src/barrier/model/tunnel-model.ts';
import { assertClose } from '../../fixtures/assert-close.ts';

const models: readonly (readonly [string, TunnelModel])[] = [
  ['wkb', chooseModel('wkb')], ['fowler-nordheim', chooseModel('fowler-nordheim')], ['no 1/m', chooseModel('fowler-nordheim', { massPrefactor: 'none' })],
  ['image charge', chooseModel('fowler-nordheim', { imagePermittivity: 3.4 })], ['simmons', chooseModel('simmons')],
];

/** Central difference, Richardson's two steps. */
function slopeOf(f: (x: number) => number, x: number): number {
  const by = (h: number): number => (f(x + h) - f(x - h)) / (2 * h);
  return (4 * by(5e-5 * x) - by(1e-4 * x)) / 3;
}

for (const [name, model] of models) {
  test(`${name}: derivatives by bias and thickness are those of the density, below and above the height`, () => {
    let checked = 0;
    for (const heightEv of [1.5, 2.5, 3.1]) for (const massRatio of [0.26, 0.5, 1]) for (const nm of [1, 2, 4, 8]) for (const biasV of [0.01, 0.5, 1.4, 2.5, 2.6, 4, 6, -4]) {
      const at = (thicknessM: number, v: number): number => model.lnDensity({ heightEv, massRatio, thicknessM }, v);
      const { lnPerV, lnPerM } = model.slopes({ heightEv, massRatio, thicknessM: nm * 1e-9 }, biasV);
      if (Number.isNaN(at(nm * 1e-9, biasV))) {
        assert.ok(Number.isNaN(lnPerV) && Number.isNaN(lnPerM));
        continue;
      }
      checked++;
      const what = `φ ${heightEv}, m ${massRatio}, d ${nm}, V ${biasV}`;
      assertClose(lnPerV, slopeOf((v) => at(nm * 1e-9, v), Math.abs(biasV)), 1e-7, what);
      assertClose(lnPerM, slopeOf((d) => at(d, biasV), nm * 1e-9), 1e-7, what);
    }
    assert.ok(checked > 90, `${checked}`);
  });

  test(`${name}: no derivative at zero bias and for what is no barrier`, () => {
    for (const [thicknessM, biasV] of [[4e-9, 0], [0, 1], [Number.NaN, 1], [4e-9, Number.NaN]] as const) {
      const { lnPerV, lnPerM } = model.slopes({ heightEv: 2.5, massRatio: 0.5, thicknessM }, biasV);
      assert.ok(Number.isNaN(lnPerV) && Number.isNaN(lnPerM));
    }
  });
}

test('closed form: Fowler–Nordheim’s ln J falls by (2 + b/F)/d and rises by (2 + b/F)/V', () => {
  const bOverF = (fowlerNordheimB * Math.sqrt(0.5) * 2.5 ** 1.5 * 4) / 5;
  const { lnPerV, lnPerM } = chooseModel('fowler-nordheim').slopes({ heightEv: 2.5, massRatio: 0.5, thicknessM: 4e-9 }, 5);
  assertClose(lnPerV, (2 + bOverF) / 5, 1e-13);
  assertClose(lnPerM, -(2 + bOverF) / 4e-9, 1e-13);
});

test('closed form: every barrier is ohmic at small bias, d ln J/dV = 1/V', () => {
  for (const name of ['wkb', 'simmons'] as const) {
    assertClose(chooseModel(name).slopes({ heightEv: 2.5, massRatio: 0.5, thicknessM: 3e-9 }, 1e-5).lnPerV, 1e5, 1e-6, name);
  }
});

test('closed form: WKB depends on m·d² alone, so d ln J/d ln d is twice d ln J/d ln m', () => {
  const wkb = chooseModel('wkb');
  for (const biasV of [1, 4]) {
    const byMass = slopeOf((massRatio) => wkb.lnDensity({ heightEv: 2.5, massRatio, thicknessM: 3e-9 }, biasV), 0.5) * 0.5;
    assertClose(wkb.slopes({ heightEv: 2.5, massRatio: 0.5, thicknessM: 3e-9 }, biasV).lnPerM * 3e-9, 2 * byMass, 1e-8);
  }
});

test('s(f) = v − f v′ and f t′ by central differences', () => {
  for (const f of [0.01, 0.1, 0.5, 0.9]) {
    assertClose(imageS(f), imageV(f) - f * slopeOf(imageV, f), 1e-8);
    assertClose(imageTSlope(f), f * slopeOf(imageT, f), 1e-6, `${f}`);
  }
  assert.deepEqual([imageS(0), imageTSlope(0)], [1, 0]);
  assert.ok(Number.isNaN(imageTSlope(1.1)));
});
