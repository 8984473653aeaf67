import assert from 'node:assert/strict';
import { test } from 'node:test';
import { assessBarrier } from '../../src/barrier/assess-barrier.ts';
import type { BandQuestion } from '../../src/barrier/assess-barrier.ts';
import type { Barrier } from '../../src/barrier/barrier.ts';
import { wkbModel } from '../../src/barrier/model/wkb.ts';
import { evaluate } from '../../src/evaluate/evaluate.ts';
import type { Flaws } from '../../src/flaws/flaws.ts';
import { labelMap, maskMap } from '../../src/grid/maps.ts';
import { levelGround } from '../../src/ground/level-ground.ts';
import { assertClose } from '../fixtures/assert-close.ts';
import { createRecipe, createSample } from '../fixtures/create-sample.ts';
import type { RecipeChanges } from '../fixtures/create-sample.ts';
import { createScene, layerNm, terraceCurrentA, threeTerraces, typicalThings } from '../fixtures/create-scene.ts';
import type { Scene } from '../fixtures/create-scene.ts';

const size = 128;
const scanV = 5.9;
const band: BandQuestion = { biasV: 4, offsetV: 0, targetAPerM2: 1e3, minAPerM2: 1e2, maxAPerM2: 3e4, bandFactor: 3, terraceMinM2: 0.25e-12, deviceFieldVPerNm: 0.8 };
const wide: Partial<BandQuestion> = { minAPerM2: 0, maxAPerM2: 1e12 };
const materials = { heightEv: 2.5, massRatio: 0.5 };

/** Assesses a scene without looking for flaws: those of the scene's truth are taken. */
function assess(scene: Scene, barrier: RecipeChanges[string] = {}, more: Partial<BandQuestion> = wide, surface: 'barrier' | 'stack' = 'barrier'): Barrier {
  const { sample } = scene;
  const recipe = createRecipe({ barrier });
  const { current, height } = levelGround(sample, recipe.ground, recipe.scan, layerNm * 1e-9);
  const flaws: Flaws = { labels: labelMap(sample.grid, Uint32Array.from(scene.things, (thing) => (thing === '' ? 0 : 1))), list: [], warnings: [] };
  return assessBarrier(current!, flaws, sample.footprint, sample.grid, surface, recipe.barrier, { ...band, ...more }, height?.levelled.data);
}
const codes = (barrier: Barrier) => barrier.warnings.map(({ code }) => code);

for (const seed of ['a', 'b']) {
  const scene = createScene({ seed, size, layersAt: threeTerraces(size), things: typicalThings(size) });

  test(`the ladder’s step is recovered on model-made terraces, seed ${seed}`, () => {
    const { ladder } = assess(scene);
    const made = (Math.log10(terraceCurrentA(10, scanV)) - Math.log10(terraceCurrentA(12, scanV))) / 2;
    assert.equal(ladder.from, 'map');
    assert.ok(Math.abs(ladder.stepDecades - made) < 0.02, `${ladder.stepDecades} for ${made}`);
    assert.ok(Math.abs(ladder.stepDecades - made) < 3 * ladder.stepSeDecades + 0.01);
    assertClose(ladder.modelStepDecades, made, 0.05, 'the model’s own step at 4 nm');
    for (const [k, layers] of [10, 11, 12].entries()) {
      const rung = ladder.rungs[k]!;
      assert.ok(Math.abs(rung.medianLog10 - Math.log10(terraceCurrentA(layers, scanV))) < 0.02, `${layers} layers: ${rung.medianLog10} for ${Math.log10(terraceCurrentA(layers, scanV))}`);
      assertClose(rung.scatterDecades, 0.05, 0.15, 'scatter put in');
      assert.equal(rung.bound, 'exact');
    }
  });

  test(`layers are right with the contact’s area known, and with referenceLayers without it, seed ${seed}`, () => {
    for (const barrier of [{}, { referenceLayers: 11 }, { referenceLayers: 11, tipAreaNm2: 100 }]) {
      const { layers, step, thickness, reference } = assess(scene, barrier);
      assert.equal(reference.layers, 11);
      let wrong = 0;
      for (let i = 0; i < size * size; i++) {
        if (scene.things[i] !== '') {
          if (layers!.data[i] !== 0 || step.data[i] !== -128 || !Number.isNaN(thickness!.data[i]!)) assert.fail(`something is known under the flaw at ${i}`);
          continue;
        }
        if (layers!.data[i] !== scene.layers[i]) wrong++;
        else if (step.data[i] !== scene.layers[i]! - 11 || !(Math.abs(thickness!.data[i]! - scene.layers[i]! * layerNm * 1e-9) < 1e-15)) assert.fail(`step or thickness at ${i}`);
      }
      assert.ok(wrong < 0.001 * size ** 2, `${wrong} pixels with a wrong count`);
    }
  });

  test(`density at another bias follows whole layers through the model, seed ${seed}`, () => {
    const { log10Relative } = assess(scene, { referenceLayers: 11 });
    const at4 = (layers: number) => Math.log10(wkbModel.density({ ...materials, thicknessM: layers * layerNm * 1e-9 }, 4));
    const seen = new Set<number>();
    for (let i = 0; i < size * size; i += 7) {
      if (scene.things[i] !== '') continue;
      seen.add(Math.round(1e3 * log10Relative.data[i]!));
    }
    assert.deepEqual([...seen].sort((p, q) => q - p), [10, 11, 12].map((layers) => Math.round(1e3 * (at4(layers) - at4(11)))));
  });
}

const scene = createScene({ seed: 'one', size, layersAt: threeTerraces(size), things: typicalThings(size) });

test('the reference: median current, area and share', () => {
  const { reference } = assess(scene, { referenceLayers: 11 });
  const pixels = scene.layers.filter((layers, i) => layers === 11 && scene.things[i] === '').length;
  const unflawed = scene.things.filter((thing) => thing === '').length;
  assertClose(reference.median, terraceCurrentA(11, scanV), 0.02);
  assertClose(reference.areaM2, pixels * 4e-16, 0.01);
  assertClose(reference.shareOfUnflawed, pixels / unflawed, 0.01);
  assert.equal(reference.step, 0);
  assertClose(reference.thicknessM, 11 * layerNm * 1e-9, 1e-9);
});

test('density at the device’s bias: the model’s, with an interval around it', () => {
  const { device } = assess(scene, { referenceLayers: 11 });
  assertClose(device!.median, wkbModel.density({ ...materials, thicknessM: 11 * layerNm * 1e-9 }, 4), 0.05);
  assert.ok(device!.low95 < device!.median / 2 && device!.high95 > 2 * device!.median);
  assert.deepEqual([device!.biasV, device!.proposed], [4, false]);
});

test('stack.offsetV does not fall across the barrier', () => {
  const plain = assess(scene, { referenceLayers: 11 }, { ...wide, biasV: 4 }).device!;
  const shifted = assess(scene, { referenceLayers: 11 }, { ...wide, biasV: 4.5, offsetV: 0.5 }).device!;
  assertClose(shifted.median, plain.median, 1e-9);
  assert.equal(shifted.biasV, 4.5);
});

test('at the scan’s own bias density is the ratio of currents', () => {
  const { log10Relative, ladder } = assess(scene, { referenceLayers: 11 }, { ...wide, biasV: scanV });
  const [thin, reference] = ladder.rungs;
  assertClose(log10Relative.data[3 * size + 3], thin!.medianLog10 - reference!.medianLog10, 1e-6);
});

test('within a terrace: the contact’s scatter stays out by default, and goes to the barrier when asked', () => {
  const own = assess(scene, { referenceLayers: 11, withinTerrace: 'barrier' });
  const shared = assess(scene, { referenceLayers: 11 });
  const on = [...scene.layers.keys()].filter((i) => scene.layers[i] === 11 && scene.things[i] === '');
  const spread = (values: Float32Array) => Math.sqrt(on.reduce((sum, i) => sum + (values[i]! - mean(values)) ** 2 / on.length, 0));
  const mean = (values: Float32Array) => on.reduce((sum, i) => sum + values[i]! / on.length, 0);
  assert.ok(spread(shared.thickness!.data) < 1e-4 * 1e-9);
  // 0.05 decades at 0.55 decades per layer are 0.09 layers, 0.03 nm.
  assertClose(spread(own.thickness!.data), 0.03e-9, 0.15);
  assertClose(mean(own.thickness!.data), 11 * layerNm * 1e-9, 2e-3);
  assert.ok(spread(own.log10Relative.data) > 0.05, 'the steeper device bias widens the scatter');
  assert.deepEqual(own.layers!.data, shared.layers!.data, 'layers are whole either way');
});

test('the border between two terraces lies half-way between them in log current, but one pixel is no terrace where the height says otherwise', () => {
  const [upper, lower] = [Math.log10(terraceCurrentA(11, scanV)), Math.log10(terraceCurrentA(12, scanV))];
  const currentA = scene.currentA.slice();
  const parts = [0.4, 0.45, 0.55, 0.6];
  const at = (k: number) => 60 * size + 50 + 3 * k;
  parts.forEach((part, k) => { currentA[at(k)] = 10 ** (upper + part * (lower - upper)); });
  const layersAt = (maps: { heightM?: Float32Array }): number[] => {
    const found = assess({ ...scene, sample: createSample({ columns: size, rows: size, biasV: scanV, ...maps, currentA }) }, { referenceLayers: 11 });
    return parts.map((_, k) => found.layers!.data[at(k)]!);
  };
  assert.deepEqual(layersAt({}), [11, 11, 12, 12]);
  // Where the height shows that they stand on one terrace, single pixels are the contact's scatter.
  assert.deepEqual(layersAt({ heightM: scene.heightM }), [11, 11, 11, 11]);
});

test('one terrace: the step is the model’s, and said', () => {
  const found = assess(createScene({ seed: 'single', size, things: typicalThings(size) }), { referenceLayers: 11 });
  assert.equal(found.ladder.from, 'model');
  assert.equal(found.ladder.stepDecades, found.ladder.modelStepDecades);
  assert.ok(codes(found).includes('ladder-one-terrace'));
});

test('one terrace without a model: the step is assumed, and said', () => {
  const { sample } = createScene({ seed: 'single', size, things: typicalThings(size) });
  const [height, current] = sample.channels;
  const relative = createSample({ columns: size, rows: size, heightM: height!.values.data, currentA: current!.values.data, unit: 'relative', biasV: 'none' });
  const { barrier } = evaluate(relative, createRecipe());
  assert.equal(barrier!.ladder.from, 'assumed');
  const said = barrier!.warnings.find(({ code }) => code === 'ladder-one-terrace')!.message;
  assert.match(said, /assumed/);
  assert.doesNotMatch(said, /from the model/);
  assert.equal(barrier!.noDensity, 'current-relative');
});

test('a ladder that contradicts the model is said', () => {
  // A barrier of 8 eV would lose far more per layer than this map does.
  const found = assess(scene, { heightEv: 8 });
  assert.ok(codes(found).includes('ladder-contradicts'));
  assert.equal(found.ladder.rungs.length, 3);
  assert.ok(!codes(assess(scene)).includes('ladder-contradicts'));
});

for (const [thick, between] of [[12, 2], [13, 3]] as const) {
  test(`terraces of 10 and ${thick} layers are told ${between} layers apart by current and height, and that is said`, () => {
    const made = createScene({ seed: 'jump', size, layersAt: (c) => (c < 60 ? 10 : thick), things: typicalThings(size) });
    const found = assess(made);
    assert.deepEqual(codes(found).filter((code) => code.startsWith('ladder-')), ['ladder-skips']);
    assertClose(found.ladder.stepDecades, found.ladder.modelStepDecades!, 0.06);
    let wrong = 0;
    for (let i = 0; i < size * size; i++) if (made.things[i] === '' && found.layers!.data[i] !== made.layers[i]) wrong++;
    assert.ok(wrong < 0.001 * size ** 2, `${wrong} pixels with a wrong count`);
  });
}

test('a runner-up within 10 % is a remark', () => {
  const halves = assess(createScene({ seed: 'halves', size, layersAt: (c) => (c < 62 ? 11 : 12), things: typicalThings(size).slice(0, 1) }));
  assert.ok(codes(halves).includes('reference-runner-up'));
  assert.ok(!codes(assess(scene)).includes('reference-runner-up'));
});

test('a stack’s surface gives no layers, no thickness, no device density', () => {
  const found = assess(scene, { referenceLayers: 11 }, wide, 'stack');
  assert.deepEqual([found.layers, found.thickness, found.device, found.reference.layers], [undefined, undefined, undefined, undefined]);
  assert.ok(codes(found).includes('barrier-stack-surface'));
  assert.equal(found.step.data[3 * size + 3], -1, 'terraces are still told apart');
});

test('a footprint without ground: nothing known, said', () => {
  const recipe = createRecipe();
  const current = levelGround(scene.sample, recipe.ground, recipe.scan, layerNm * 1e-9).current!;
  const none = assessBarrier(current, { labels: labelMap(scene.sample.grid), list: [], warnings: [] }, maskMap(scene.sample.grid), scene.sample.grid, 'barrier', recipe.barrier, band);
  assert.ok(codes(none).includes('barrier-no-ground'));
  assert.ok(none.step.data.every((step) => step === -128));
  assert.ok(none.log10Relative.data.every((value) => Number.isNaN(value)));
  assert.equal(none.device, undefined);
});

test('a model that does not hold at the scan’s bias: terraces, but no layers', () => {
  // Simmons' formula needs a bias below the barrier's height of 2.5 eV.
  const appraisal = evaluate(createSample({ columns: size, rows: size, heightM: scene.heightM, currentA: scene.currentA, biasV: scanV }), createRecipe({ barrier: { model: 'simmons' }, stack: { biasV: 4 } }));
  assert.deepEqual([appraisal.barrier!.layers, appraisal.barrier!.device], [undefined, undefined]);
  assert.ok(appraisal.barrier!.ladder.from === 'map');
  const said = appraisal.warnings.find(({ code }) => code === 'model-out-of-range')!.message;
  for (const part of ['simmons', '5.9 V', 'wkb', 'ratio of currents']) assert.ok(said.includes(part), said);
  assert.equal(appraisal.barrier!.noDensity, 'model');
});

test('a model that does not hold at the device’s bias, or knows no such current: said', () => {
  const at2 = createScene({ seed: 'low', size, biasV: 2, layersAt: () => 6 });
  const device = assess(at2, { model: 'simmons', referenceLayers: 6 }, { ...wide, biasV: 4 });
  assert.deepEqual([device.device, device.noDensity, codes(device).includes('model-out-of-range')], [undefined, 'model', true]);
  assert.match(device.warnings.find(({ code }) => code === 'model-out-of-range')!.message, /device’s bias of 4 V/);
  const bright = assess(scene, { tipAreaNm2: 0.01, heightEv: 0.2 });
  assert.deepEqual([bright.layers === undefined, bright.noDensity], [true, 'model']);
  const said = bright.warnings.find(({ code }) => code === 'model-no-thickness')!.message;
  for (const part of ['wkb', '5.9 V', 'barrier.tipAreaNm2', 'ratio of currents']) assert.ok(said.includes(part), said);
});

for (const [biasV, offsetV, named] of [[0, 0, ['stack.biasV = 0 V']], [1, 2, ['stack.biasV = 1 V', 'stack.offsetV = 2 V']], [-1.5, 1.5, ['stack.biasV = -1.5 V']]] as const) {
  test(`nothing flows at ${biasV} V with an offset of ${offsetV} V: the ratio of currents judges, and it is said`, () => {
    const appraisal = evaluate(scene.sample, createRecipe({ stack: { biasV, offsetV, emitterSheetOhm: 1e4 } }));
    const { barrier, ledger, warnings } = appraisal;
    assert.deepEqual([barrier!.device, barrier!.noDensity, barrier!.reference.inRange, barrier!.reference.layers], [undefined, 'device-bias', undefined, 11]);
    const atScan = evaluate(scene.sample, createRecipe({ stack: { biasV: scanV } }));
    assert.deepEqual(ledger.rows.map(({ pixels }) => pixels), atScan.ledger.rows.map(({ pixels }) => pixels));
    assert.ok(ledger.usable.areaM2 > 0);
    const said = warnings.find(({ code }) => code === 'device-bias-no-density')!.message;
    for (const part of [...named, 'ratio of currents', '5.9 V']) assert.ok(said.includes(part), said);
    const drop = warnings.find(({ code }) => code === 'sheet-no-density')!.message;
    assert.ok(drop.includes('stack.biasV') && !drop.includes('current unit'), drop);
    for (const { message } of warnings) assert.ok(!/NaN|undefined/.test(message), message);
  });
}

test('no bias is proposed where none gives the target: said', () => {
  const found = assess(scene, {}, { ...wide, biasV: undefined, offsetV: -10 });
  assert.deepEqual([found.device, found.noDensity], [undefined, 'device-bias']);
  assert.match(found.warnings.find(({ code }) => code === 'device-bias-not-found')!.message, /stack\.targetNaPerUm2 = 1 nA/);
});

test('the proposed bias gives the reference the target density', () => {
  for (const barrier of [{}, { tipAreaNm2: 30 }, { referenceLayers: 9 }, { referenceLayers: 13 }]) {
    const { device } = assess(scene, barrier, { ...wide, biasV: undefined });
    assert.equal(device!.proposed, true);
    assertClose(device!.median, band.targetAPerM2, 1e-6, JSON.stringify(barrier));
  }
});

test('thin ground has at least one layer, in the ladder and in both maps', () => {
  for (const withinTerrace of ['contact', 'barrier'] as const) {
    const found = assess(scene, { referenceLayers: 1, withinTerrace });
    assert.deepEqual(found.ladder.rungs.map(({ step, layers }) => [step, layers]), [[-1, 1], [0, 1], [1, 2]]);
    let thinnest = Number.POSITIVE_INFINITY;
    for (const value of found.thickness!.data) if (value < thinnest) thinnest = value;
    assertClose(thinnest, layerNm * 1e-9, 1e-6);
    assert.ok(found.layers!.data.every((layers, i) => layers >= 1 || scene.things[i] !== ''));
  }
});

test('a bias is printed as it was given', () => {
  for (const [biasV, printed] of [[3.25, '3.25 V'], [12.5, '12.5 V']] as const) {
    const found = assess(scene, {}, { minAPerM2: 1e20, maxAPerM2: 1e21, biasV });
    assert.match(found.warnings.find(({ code }) => code === 'reference-not-known-to-glow')!.message, new RegExp(` ${printed.replace('.', '\\.')},`));
  }
  assert.match(assess(scene).warnings.find(({ code }) => code === 'probe-field')!.message, / 5\.9 V/);
});

test('outside: above 1.2 V/nm on the reference the device’s bias is warned of [P, Hattori et al., ACS Nano 9, 916, 2015]', () => {
  // 11 layers are 3.663 nm: 4.39 V is 1.198, 4.41 V 1.204 V/nm.
  const said = (biasV: number) => codes(assess(scene, { referenceLayers: 11 }, { ...wide, biasV })).includes('device-field');
  assert.deepEqual([said(4.39), said(4.41)], [false, true]);
});
