import assert from 'node:assert/strict';
import { test } from 'node:test';
import { chooseModel } from '../../../src/barrier/model/choose-model.ts';
import { fowlerNordheimModel } from '../../../src/barrier/model/fowler-nordheim.ts';
import { biasFromDensity, decadesPerLayer, layersFromThickness, thicknessFromDensity, thicknessFromLnDensity } from '../../../src/barrier/model/inverse.ts';
import { densityTable } from '../../../src/barrier/model/table.ts';
import type { TunnelModel } from '../../../src/barrier/model/tunnel-model.ts';
import { assertClose } from '../../fixtures/assert-close.ts';

const material = { heightEv: 2.5, massRatio: 0.5 };
const cases: readonly (readonly [string, TunnelModel, number])[] = [
  ['wkb below the height', chooseModel('wkb'), 1],
  ['wkb above', chooseModel('wkb'), 5],
  ['wkb at negative bias', chooseModel('wkb'), -3],
  ['fowler-nordheim', chooseModel('fowler-nordheim'), 4],
  ['image charge in hBN', fowlerNordheimModel({ imagePermittivity: 3.4 }), 5],
  ['simmons', chooseModel('simmons'), 1.5],
];

test('thickness from density undoes density from thickness', () => {
  for (const [name, model, biasV] of cases) {
    for (const thicknessM of [0.5e-9, 1e-9, 3.33e-9, 9e-9, 19e-9]) {
      const ln = model.lnDensity({ ...material, thicknessM }, biasV);
      assertClose(thicknessFromLnDensity(model, material, biasV, ln), thicknessM, 1e-10, name);
    }
  }
});

test('outside the range of thickness, without density, or where the model does not hold: NaN', () => {
  const wkb = chooseModel('wkb');
  assert.ok(Number.isNaN(thicknessFromDensity(wkb, material, 4, 1e30)));
  assert.ok(Number.isNaN(thicknessFromDensity(wkb, material, 4, 1e-60)));
  assert.ok(Number.isNaN(thicknessFromDensity(wkb, material, 4, 0)));
  assert.ok(Number.isNaN(thicknessFromDensity(wkb, material, 4, -1)));
  assert.ok(Number.isNaN(thicknessFromDensity(wkb, material, 0, 1)));
  assert.ok(Number.isNaN(thicknessFromDensity(chooseModel('simmons'), material, 4, 1)));
  const at5Nm = wkb.density({ ...material, thicknessM: 5e-9 }, 4);
  assert.ok(Number.isNaN(thicknessFromDensity(wkb, material, 4, at5Nm, { minM: 1e-9, maxM: 4.9e-9 })));
});

test('bias from density, also next to where a model ends', () => {
  for (const [name, model, biasV] of cases) {
    const barrier = { ...material, thicknessM: 4e-9 };
    const found = biasFromDensity(model, barrier, model.density(barrier, biasV));
    assertClose(found, Math.abs(biasV), 1e-9, name);
  }
  assert.ok(Number.isNaN(biasFromDensity(chooseModel('simmons'), { ...material, thicknessM: 4e-9 }, 1e6)));
});

test('layers and decades per layer', () => {
  assert.equal(layersFromThickness(4e-9, 0.333e-9), 12);
  assert.ok(Number.isNaN(layersFromThickness(Number.NaN, 0.333e-9)));
  const wkb = chooseModel('wkb');
  const barrier = { ...material, thicknessM: 3.33e-9 };
  const expected = Math.log10(wkb.density(barrier, 4) / wkb.density({ ...material, thicknessM: 3.663e-9 }, 4));
  assertClose(decadesPerLayer(wkb, barrier, 4, 0.333e-9), expected, 1e-12);
});

test('the table agrees with the model to 1e-4 of the density both ways, and falls everywhere', () => {
  for (const [name, model, biasV] of cases) {
    const table = densityTable(model, material, biasV)!;
    let previous = Number.POSITIVE_INFINITY;
    let worst = 0;
    const steps = 20011;
    for (let k = 0; k <= steps; k++) {
      const thicknessM = table.range.minM * (table.range.maxM / table.range.minM) ** (k / steps) * (k === steps ? 1 - 1e-15 : 1);
      const truth = model.lnDensity({ ...material, thicknessM }, biasV) / Math.LN10;
      const forward = table.log10Density(thicknessM);
      assert.ok(forward < previous, `${name}: rises at ${thicknessM}`);
      previous = forward;
      worst = Math.max(worst, Math.abs(forward - truth));
      const slope = (model.lnDensity({ ...material, thicknessM: thicknessM * 1.0001 }, biasV) / Math.LN10 - truth) / (thicknessM * 1e-4);
      worst = Math.max(worst, Math.abs((table.thicknessM(truth) - thicknessM) * slope));
    }
    assert.ok(worst * Math.LN10 <= 1e-4, `${name}: ${worst * Math.LN10}`);
  }
});

test('over all that a recipe may ask the table is within 1e-4 of the density, and its slope within 2e-4', () => {
  const models = [chooseModel('wkb'), chooseModel('fowler-nordheim'), fowlerNordheimModel({ imagePermittivity: 3.4 }), chooseModel('simmons')];
  for (const model of models) for (const heightEv of [0.2, 1.5, 2.5, 3.1, 10]) for (const massRatio of [0.01, 0.26, 0.5, 5]) for (const biasV of [0.01, 1, 2.5, 5, 100]) {
    const table = densityTable(model, { heightEv, massRatio }, biasV);
    if (!table) continue;
    const what = `${model.name}, φ ${heightEv}, m ${massRatio}, V ${biasV}`;
    for (let k = 0; k <= 211; k++) {
      const thicknessM = table.range.minM * (table.range.maxM / table.range.minM) ** (k / 211) * (k === 211 ? 1 - 1e-15 : 1);
      const barrier = { heightEv, massRatio, thicknessM };
      const truth = model.lnDensity(barrier, biasV);
      const { lnPerM } = model.slopes(barrier, biasV);
      assert.ok(Math.abs(table.log10Density(thicknessM) * Math.LN10 - truth) <= 1e-4, what);
      assert.ok(Math.abs((table.thicknessM(truth / Math.LN10) - thicknessM) * lnPerM) <= 1e-4, what);
      assertClose(table.lnSlopePerM(thicknessM), lnPerM, 2e-4, what);
    }
  }
});

test('the table is NaN outside its range and absent where the model does not hold', () => {
  const table = densityTable(chooseModel('wkb'), material, 4)!;
  assert.ok(Number.isNaN(table.thicknessM(table.highLog10 + 0.01)));
  assert.ok(Number.isNaN(table.thicknessM(table.lowLog10 - 0.01)));
  assert.ok(Number.isNaN(table.thicknessM(Number.NaN)));
  assert.ok(Number.isNaN(table.log10Density(0.1e-9)));
  assertClose(table.thicknessM(table.highLog10), table.range.minM, 1e-9);
  assertClose(table.thicknessM(table.lowLog10), table.range.maxM, 1e-9);
  assert.equal(densityTable(chooseModel('simmons'), material, 4), undefined);
});
