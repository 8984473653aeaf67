import assert from 'node:assert/strict';
import { test } from 'node:test';
import { fowlerNordheimModel } from '../../../src/barrier/model/fowler-nordheim.ts';
import { wkbModel } from '../../../src/barrier/model/wkb.ts';

// [F] ln J (A/m²) of the formula in wkb.ts by mpmath 30-digit tanh–sinh quadrature in depth, split at V−φ and V.
const integrated: readonly (readonly [heightEv: number, massRatio: number, thicknessNm: number, biasV: number, lnDensity: number])[] = [
  [2.5, 0.5, 4, 1, -12.755817335090992],
  [2.5, 0.5, 4, 2.4999, -3.2899482471004029],
  [2.5, 0.5, 4, 2.5, -3.2890495328491584],
  [2.5, 0.5, 4, 2.5001, -3.2881506851600259],
  [2.5, 0.5, 4, 2.6, -2.309607445849537],
  [2.5, 0.5, 4, 4, 8.6991389875764735],
  [2.5, 0.5, 4, 5, 12.952895551803306],
  [2.5, 0.5, 3, 0.001, -10.456413592260412],
  [3.07, 0.26, 0.5, 0.2, 27.023226420686477],
  [3.07, 0.26, 0.5, 8, 32.2600275591965],
  [1.5, 0.1, 1, 6, 32.265615906044233],
  [2.5, 0.5, 10, 12, 12.237015655344604],
  [9, 4, 15, 3, -815.75255551721384],
  [0.3, 0.05, 0.3, 1, 34.111253797985607],
];

test('agrees with 30-digit integration from thin to opaque barriers and on both sides of V = φ', () => {
  for (const [heightEv, massRatio, thicknessNm, biasV, expected] of integrated) {
    const ln = wkbModel.lnDensity({ heightEv, massRatio, thicknessM: thicknessNm * 1e-9 }, biasV);
    assert.ok(Math.abs(ln - expected) < 1e-12 * Math.max(1, Math.abs(expected)), `φ ${heightEv}, m ${massRatio}, d ${thicknessNm}, V ${biasV}: ${ln} against ${expected}`);
  }
});

test('is a few per cent below Fowler–Nordheim’s closed form above the barrier', () => {
  const barrier = { heightEv: 2.5, massRatio: 0.5, thicknessM: 4e-9 };
  const ratio = wkbModel.density(barrier, 4) / fowlerNordheimModel().density(barrier, 4);
  assert.ok(ratio > 0.9 && ratio < 1, `${ratio}`);
});

test('falls with thickness, height and mass, rises with bias, ignores its sign', () => {
  const at = (heightEv: number, massRatio: number, thicknessNm: number, biasV: number) => wkbModel.lnDensity({ heightEv, massRatio, thicknessM: thicknessNm * 1e-9 }, biasV);
  let previous = at(2.5, 0.5, 3.5, 0.05);
  for (let biasV = 0.1; biasV < 6; biasV += 0.05) {
    const here = at(2.5, 0.5, 3.5, biasV);
    assert.ok(here > previous, `bias ${biasV}`);
    assert.ok(at(2.5, 0.5, 3.6, biasV) < here && at(2.6, 0.5, 3.5, biasV) < here && at(2.5, 0.55, 3.5, biasV) < here);
    previous = here;
  }
  assert.equal(at(2.5, 0.5, 3.5, -2), at(2.5, 0.5, 3.5, 2));
});

test('zero bias carries nothing; what is no barrier is NaN', () => {
  const barrier = { heightEv: 2.5, massRatio: 0.5, thicknessM: 4e-9 };
  assert.equal(wkbModel.density(barrier, 0), 0);
  assert.equal(wkbModel.lnDensity(barrier, 0), Number.NEGATIVE_INFINITY);
  for (const broken of [{ ...barrier, thicknessM: 0 }, { ...barrier, heightEv: -1 }, { ...barrier, massRatio: Number.NaN }]) {
    assert.ok(Number.isNaN(wkbModel.density(broken, 1)));
  }
  assert.ok(Number.isNaN(wkbModel.density(barrier, Number.NaN)));
});
