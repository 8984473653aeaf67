import assert from 'node:assert/strict';
import { test } from 'node:test';
import { chooseModel } from '../../src/barrier/model/choose-model.ts';
import { biasSolver, steepnessFromRatio, thicknessFromRatio } from '../../src/barrier/two-bias.ts';
import { seededRandom } from '../../src/stats/random.ts';
import { assertClose } from '../fixtures/assert-close.ts';

const material = { heightEv: 2.5, massRatio: 0.5 };
const cases = [
  ['wkb', {}, [4, 5]], ['wkb', {}, [0.5, 1]], ['wkb', {}, [5.9, 5.3, 4.7]], ['wkb', {}, [-5, -4]], ['fowler-nordheim', {}, [4, 5]],
  ['fowler-nordheim', { imagePermittivity: 3.4 }, [4, 5]], ['simmons', {}, [1, 2]],
] as const;

for (const [name, options, biasesV] of cases) {
  test(`${name} at ${biasesV.join(', ')} V: thickness from currents, whatever the area`, () => {
    const model = chooseModel(name, options);
    const solver = biasSolver(model, material, biasesV)!;
    const variances = biasesV.map((_, k) => 1e-4 * (k + 1));
    for (let nm = 0.6; nm < 15; nm += 0.37) for (const area of [-40, 0, 3]) {
      const ln = biasesV.map((biasV) => model.lnDensity({ ...material, thicknessM: nm * 1e-9 }, biasV) + area);
      assertClose(solver.thicknessM(ln, variances), nm * 1e-9, 1e-6);
      assertClose(thicknessFromRatio(model, material, biasesV[0], biasesV[1], ln[1]! - ln[0]!), nm * 1e-9, 1e-9);
    }
  });
}

test('the stated error is the scatter of solutions, and the third map lowers it', () => {
  const model = chooseModel('wkb');
  const truthM = 3.663e-9;
  const random = seededRandom('biases');
  let before = Number.POSITIVE_INFINITY;
  for (const biasesV of [[5.9, 5], [5.9, 5, 4.6]]) {
    const solver = biasSolver(model, material, biasesV)!;
    const sds = [0.002, 0.01, 0.02].slice(0, biasesV.length);
    const variances = sds.map((sd) => sd * sd);
    let [sum, squares] = [0, 0];
    const runs = 4000;
    for (let k = 0; k < runs; k++) {
      const area = random.normal();
      const off = solver.thicknessM(biasesV.map((biasV, j) => model.lnDensity({ ...material, thicknessM: truthM }, biasV) + area + sds[j]! * random.normal()), variances) - truthM;
      sum += off;
      squares += off * off;
    }
    const sd = Math.sqrt(squares / runs);
    // Four standard errors of a standard deviation from 4000 draws.
    assertClose(solver.errorM(truthM, variances), sd, 4 / Math.sqrt(2 * runs));
    assert.ok(Math.abs(sum / runs) < (4 * sd) / Math.sqrt(runs));
    assert.ok(sd < before);
    before = sd;
  }
});

test('no thickness: missing currents, ratios that nothing in the range gives, one bias, a model that does not hold', () => {
  const wkb = chooseModel('wkb');
  const solver = biasSolver(wkb, material, [4, 5])!;
  for (const ln of [[Number.NaN, -20], [-20, Number.NaN], [-20, -19.9], [-20, 40]]) assert.ok(Number.isNaN(solver.thicknessM(ln, [1e-4, 1e-4])), ln.join(' '));
  assert.equal(biasSolver(wkb, material, [4]), undefined);
  assert.equal(biasSolver(chooseModel('simmons'), material, [2, 4]), undefined);
  assert.ok(Number.isNaN(thicknessFromRatio(wkb, material, 4, 4, 0)));
  assert.ok(Number.isNaN(thicknessFromRatio(chooseModel('simmons'), material, 2, 4, 3)));
  assert.ok(Number.isNaN(steepnessFromRatio(0, 4, 4).steepnessEv15Nm));
});

test('the order of the biases does not matter', () => {
  const wkb = chooseModel('wkb');
  assertClose(thicknessFromRatio(wkb, material, 5, 4, -4.2), thicknessFromRatio(wkb, material, 4, 5, 4.2), 1e-12);
  assertClose(steepnessFromRatio(-4.2, 5, 4).steepnessEv15Nm, steepnessFromRatio(4.2, 4, 5).steepnessEv15Nm, 1e-12);
});
