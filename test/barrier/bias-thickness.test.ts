/** Maps at several biases, painted with the model: thickness without the contact's area and without an anchor. */
import assert from 'node:assert/strict';
import { test } from 'node:test';
import type { Barrier } from '../../src/barrier/barrier.ts';
import { fowlerNordheimModel } from '../../src/barrier/model/fowler-nordheim.ts';
import { wkbModel } from '../../src/barrier/model/wkb.ts';
import { evaluate } from '../../src/evaluate/evaluate.ts';
import { previewOf, thinnedGround } from '../../src/evaluate/preview.ts';
import { channelOf } from '../../src/read/sample.ts';
import { median } from '../../src/stats/median.ts';
import { assertClose } from '../fixtures/assert-close.ts';
import { createBiasMaps, slantedTerraces } from '../fixtures/create-bias-maps.ts';
import type { BiasMapsSpec } from '../fixtures/create-bias-maps.ts';
import { createRecipe } from '../fixtures/create-sample.ts';

const size = 160;
const layerM = 0.333e-9;
const material = { heightEv: 2.5, massRatio: 0.5 };
const make = (spec: Partial<BiasMapsSpec> = {}) => createBiasMaps({ seed: 'biases', size, biasesV: [5.9, 5], contactM2: 17e-18, layersAt: slantedTerraces, ...spec });
const codes = (barrier: Barrier): string[] => barrier.warnings.map(({ code }) => code);

/** Median distance from the painted layers over pixels with a thickness, in layers. */
function distance({ biases }: Barrier, layers: Uint8Array): number {
  const off = Array.from(biases!.thickness, (thickness, i) => Math.abs(thickness / layerM - layers[i]!)).filter((value) => !Number.isNaN(value));
  assert.ok(off.length > 0.5 * layers.length, `${off.length} pixels`);
  return median(off);
}

const kinds: readonly (readonly [string, Partial<BiasMapsSpec>])[] = [
  ['as stated', {}],
  ['contact ten times as large', { contactM2: 170e-18 }],
  ['contact a sixth, biases 0.6 V apart', { contactM2: 3e-18, biasesV: [5.9, 5.3] }],
  ['scans apart by parts of pixels', { contactM2: 60e-18, shiftsPx: [[0, 0], [3.4, -2.7]] }],
  ['three biases, a rough contact', { contactM2: 60e-18, biasesV: [5.9, 5.4, 5], contactDecades: 0.2, shiftsPx: [[0, 0], [-6, 4.5], [1.5, 1]] }],
];
for (const [name, spec] of kinds) {
  test(`within 0.1 layer (median) without area or anchor, terraces within their errors: ${name}`, () => {
    const { sample, layers, flawed } = make(spec);
    const { barrier, ground } = evaluate(sample, createRecipe({ stack: { biasV: 4 } }));
    assert.ok(distance(barrier!, layers) < 0.1);
    const taken = barrier!.anchors.find((anchor) => anchor.taken)!;
    assert.equal(taken.kind, 'biases');
    assert.equal(barrier!.reference.layers, 11);
    assert.ok(Math.abs(taken.thicknessM - 11 * layerM) < 2 * taken.sdM);
    let [right, judged] = [0, 0];
    barrier!.layers!.data.forEach((found, i) => {
      // Saturated ground has a bound, not a count.
      if (found === 0 || flawed[i] === 1 || ground.current!.saturated.data[i] === 1) return;
      judged++;
      if (found === layers[i]) right++;
    });
    assert.ok(right > 0.98 * judged, `layers right on ${right} of ${judged}`);
    const truth = wkbModel.density({ ...material, thicknessM: 11 * layerM }, 4);
    assertClose(barrier!.device!.median, truth, 0.05);
    assert.ok(barrier!.device!.low95 < truth && truth < barrier!.device!.high95);
  });
}

test('painted and read with Fowler–Nordheim: √m·φ^1.5·d of each terrace', () => {
  const { sample } = make({ model: fowlerNordheimModel(), contactDecades: 0.05 });
  const { barrier } = evaluate(sample, createRecipe({ barrier: { model: 'fowler-nordheim' }, stack: { biasV: 4 } }));
  assert.equal(barrier!.biases!.terraces.length, 3);
  for (const { step, steepnessEv15Nm, steepnessSe, usedShare } of barrier!.biases!.terraces) {
    assertClose(steepnessEv15Nm, Math.sqrt(0.5) * 2.5 ** 1.5 * (11 + step) * 0.333, 2e-3);
    assert.ok(steepnessSe! > 0 && steepnessSe! < 0.02 && usedShare > 0.8);
  }
});

test('below the height there is no √m·φ^1.5·d, but a thickness', () => {
  const { sample, layers } = make({ biasesV: [2.4, 2], layersAt: () => 6, contactM2: 170e-18 });
  const { barrier } = evaluate(sample, createRecipe({ stack: { biasV: 2 } }));
  assert.ok(distance(barrier!, layers) < 0.1);
  assert.ok(barrier!.biases!.terraces.every(({ steepnessEv15Nm }) => steepnessEv15Nm === undefined));
});

test('saturated, floor and flawed pixels take no part', () => {
  const { sample, layers, flawed } = make({ layersAt: (x) => (x < 0.2 ? 8 : x < 0.7 ? 11 : 17) });
  const { ground, barrier, flaws } = evaluate(sample, createRecipe({ stack: { biasV: 4 } }));
  const { saturated, floor } = ground.current!;
  const thickness = barrier!.biases!.thickness;
  let [saturatedPixels, floorPixels] = [0, 0];
  for (let i = 0; i < thickness.length; i++) {
    if (saturated.data[i] === 1) saturatedPixels++;
    if (floor.data[i] === 1) floorPixels++;
    if (saturated.data[i] === 1 || floor.data[i] === 1 || flaws.labels.data[i] !== 0) assert.ok(Number.isNaN(thickness[i]!));
    // At the lower bias 17 layers lie within the noise.
    if (layers[i] === 17 && flawed[i] === 0) assert.ok(Number.isNaN(thickness[i]!));
  }
  assert.ok(saturatedPixels > 100 && floorPixels > 100, `${saturatedPixels}, ${floorPixels}`);
});

test('a stated layer count comes first, and a ratio that contradicts it is said with both numbers', () => {
  const { barrier } = evaluate(make().sample, createRecipe({ barrier: { referenceLayers: 15 }, stack: { biasV: 4 } }));
  assert.deepEqual(barrier!.anchors.map(({ kind, taken }) => [kind, taken]), [['layers', true], ['biases', false], ['area', false]]);
  const said = barrier!.warnings.find(({ code, message }) => code === 'anchors-disagree' && message.includes('biases'))!.message;
  for (const part of ['5.00 nm (15.0 layers)', '3.66 nm (11.0 layers)', 'stated layer count']) assert.ok(said.includes(part), said);
  const agreed = evaluate(make().sample, createRecipe({ barrier: { referenceLayers: 11 }, stack: { biasV: 4 } })).barrier!;
  assert.ok(!codes(agreed).includes('anchors-disagree'));
});

test('a map that cannot be used is left out with the reason', () => {
  const { sample } = make({ biasesV: [5.9, 5] });
  const [height, first, second] = sample.channels;
  const other = make({ seed: 'elsewhere', contactDecades: 0.2, layersAt: (x, y) => slantedTerraces(1 - y, x) }).sample;
  // Turned half round: another place.
  const turned = channelOf(other, 'current')!.values.data.slice().reverse();
  const clipped = second!.values.data.map((value, i) => (i < 0.005 * size * size ? value : 1e-8));
  const reasons: readonly (readonly [object, string])[] = [
    [{ biasV: -5 }, 'polarity'], [{ biasV: 5.85 }, '2 %'], [{ unit: 'relative' }, 'amperes'], [{ biasV: undefined }, 'no bias'],
    [{ values: { ...second!.values, data: clipped } }, 'amplifier’s limit'],
    [{ values: { ...second!.values, data: turned } }, 'look alike'],
  ];
  for (const [change, part] of reasons) {
    const { warnings, barrier } = evaluate({ ...sample, channels: [height!, first!, { ...second!, ...change }], sources: [{ name: part, sha256: part, bytes: 1 }] }, createRecipe({ stack: { biasV: 4 } }));
    const said = warnings.find(({ code }) => code === 'bias-map-left-out');
    assert.ok(said?.message.includes(part), `${part}: ${said?.message}`);
    assert.equal(barrier!.biases, undefined);
    assert.equal(barrier!.anchors[0]!.kind, 'area');
  }
});

test('one map alone gives what it gave: no further current, no remark', () => {
  const { sample } = make();
  const single = { ...sample, channels: sample.channels.slice(0, 2) };
  const { ground, barrier } = evaluate(single, createRecipe({ stack: { biasV: 4 } }));
  assert.equal(ground.further, undefined);
  assert.equal(barrier!.biases, undefined);
  assert.ok(!codes(barrier!).includes('bias-map-left-out'));
});

test('the quick look thins further currents along', () => {
  const { sample } = make();
  const recipe = createRecipe({ stack: { biasV: 4 } });
  const { ground } = evaluate(sample, recipe);
  const thinned = thinnedGround(sample, ground, 80);
  assert.equal(thinned.ground.further![0]!.log10.length, 80 * 80);
  assert.ok(previewOf(thinned, recipe).ledger.usable.areaM2 > 0);
});
