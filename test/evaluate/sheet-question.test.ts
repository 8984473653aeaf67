import assert from 'node:assert/strict';
import { test } from 'node:test';
import { wkbModel } from '../../src/barrier/model/wkb.ts';
import { evaluate } from '../../src/evaluate/evaluate.ts';
import { sheetInput } from '../../src/evaluate/sheet-question.ts';
import { assertClose } from '../fixtures/assert-close.ts';
import { createRecipe } from '../fixtures/create-sample.ts';
import { createScene, layerNm, saturationA } from '../fixtures/create-scene.ts';

const size = 128;
const scanV = 5.9;
const things = [{ kind: 'bubble', c: 100, r: 28, radiusPx: 10, peakNm: 26 }, { kind: 'pinhole', c: 60, r: 60, radiusPx: 2 }] as const;
const { sample } = createScene({ seed: 'short', size, things });
const density = (biasV: number) => wkbModel.density({ heightEv: 2.5, massRatio: 0.5, thicknessM: 11 * layerNm * 1e-9 }, biasV);

for (const [biasV, offsetV] of [[scanV, 0], [4, 0], [3.4, 0], [4, 0.6]] as const) {
  test(`a short is carried to ${biasV} V, offset ${offsetV} V, as an ohmic current [F]`, () => {
    const recipe = createRecipe({ stack: { biasV, offsetV }, barrier: { referenceLayers: 11 } });
    const { ground, flaws, barrier, sheet, warnings } = evaluate(sample, recipe);
    const { shorts } = sheetInput(sample, ground, flaws, barrier!, recipe);
    const across = biasV - offsetV;
    const at = 60 * size + 60;
    assertClose(10 ** ground.current!.log10.data[at]!, saturationA, 1e-3, 'the probe saturated');
    const seen = 10 ** ground.current!.log10.data[at]! / barrier!.reference.median;
    const expected = ((seen * across) / scanV) * (density(scanV) / density(across));
    assert.equal(shorts!.mask.data[at], 1);
    assertClose(10 ** shorts!.log10Relative.data[at]!, expected, 1e-5);
    assertClose(sheet!.relativeDensity.data[at], expected, 1e-5);
    const said = warnings.find(({ code }) => code === 'shorts-ohmic')?.message;
    // At the probe's own bias nothing is carried over.
    if (biasV === scanV) return assert.equal(said, undefined);
    assert.ok(said);
    for (const part of ['ohmic', `${biasV} V`, '5.9 V', 'lower bound']) assert.ok(said.includes(part), said);
  });
}

test('a dozen saturated pixels are nearly all of the current at a device’s bias, not under a probe', () => {
  const share = (biasV: number) => evaluate(sample, createRecipe({ stack: { biasV }, barrier: { referenceLayers: 11 } })).sheet!.totals!.shortShareOfCurrent!;
  assert.ok(share(scanV) < 0.05, `${share(scanV)} at the scan's bias`);
  assert.ok(share(3.4) > 0.9, `${share(3.4)} at the device's`);
});

test('without a density in the device the ratio stays the scan’s', () => {
  const recipe = createRecipe({ stack: { biasV: 0 } });
  const { ground, flaws, barrier, warnings } = evaluate(sample, recipe);
  const { shorts, device } = sheetInput(sample, ground, flaws, barrier!, recipe);
  assert.deepEqual([device, shorts!.ohmic], [undefined, undefined]);
  assertClose(10 ** shorts!.log10Relative.data[60 * size + 60]!, saturationA / barrier!.reference.median, 1e-3);
  assert.ok(!warnings.some(({ code }) => code === 'shorts-ohmic'));
});
