/** Anchors of the thickness: a flake's edge, a finished device, and what happens when they contradict each other. */
import assert from 'node:assert/strict';
import { test } from 'node:test';
import type { AnchorKind, Barrier } from '../../src/barrier/barrier.ts';
import { edgeStep } from '../../src/barrier/edge-step.ts';
import { wkbModel } from '../../src/barrier/model/wkb.ts';
import { evaluate } from '../../src/evaluate/evaluate.ts';
import type { Outline } from '../../src/read/sample.ts';
import { assertClose } from '../fixtures/assert-close.ts';
import { createBiasMaps, slantedTerraces } from '../fixtures/create-bias-maps.ts';
import type { BiasMapsSpec } from '../fixtures/create-bias-maps.ts';
import { createRecipe } from '../fixtures/create-sample.ts';
import type { RecipeChanges } from '../fixtures/create-sample.ts';

const size = 160;
const sideM = size * 20e-9;
const layerM = 0.333e-9;
const rectangle = (layer: Outline['layer'], x0: number, x1: number): Outline => ({ layer, rings: [[[x0 * sideM, 0], [x1 * sideM, 0], [x1 * sideM, sideM], [x0 * sideM, sideM], [x0 * sideM, 0]]] });
/** Barrier over three quarters of an injector that fills the map. */
const outlines = [rectangle('barrier', 0, 0.75), rectangle('injector', 0, 1)];
const edged: Partial<BiasMapsSpec> = { flakeAt: (x) => x < 0.75, outlines };

function assess(spec: Partial<BiasMapsSpec>, barrier: RecipeChanges[string] = {}, more: RecipeChanges = {}): Barrier {
  const { sample } = createBiasMaps({ seed: 'anchors', size, biasesV: [5.9], contactM2: 17e-18, contactDecades: 0.05, layersAt: slantedTerraces, ...spec });
  return evaluate(sample, createRecipe({ stack: { biasV: 4 }, barrier, ...more })).barrier!;
}
const anchorOf = (barrier: Barrier, kind: AnchorKind) => barrier.anchors.find((anchor) => anchor.kind === kind);
const said = (barrier: Barrier, code: string): string => barrier.warnings.find((entry) => entry.code === code)?.message ?? '';

for (const [name, spec] of [['by outlines', edged], ['by saturated ground beside the barrier’s outline', { ...edged, outlines: [outlines[0]!] }], ['by the proposed outline', { ...edged, outlines: [] }]] as const) {
  test(`the step at the edge counts the layers whatever the contact's area, ${name}, and the sentence says what can be wrong with it`, () => {
    const barrier = assess({ ...spec, contactM2: 80e-18 });
    const edge = anchorOf(barrier, 'edge')!;
    assert.equal(edge.taken, true);
    assertClose(edge.thicknessM, barrier.reference.layers! * layerM, 0.03);
    const truth = barrier.reference.median / (80e-18 * 1.02);
    assertClose(Math.log(wkbModel.density({ heightEv: 2.5, massRatio: 0.5, thicknessM: barrier.reference.layers! * layerM }, 5.9)), Math.log(truth), 0.01);
    assert.ok(edge.sdM >= 0.3e-9 && edge.sdM < 0.333e-9, `${edge.sdM}`);
    for (const part of ['water', 'adhesion', '0.30 nm', 'injector']) assert.ok(edge.sentence.includes(part), edge.sentence);
  });
}

test('a step of an edge that is half a nanometre off lies within twice its error', () => {
  const edge = anchorOf(assess({ ...edged, edgeExtraNm: 0.5 }), 'edge')!;
  assert.ok(Math.abs(edge.thicknessM / layerM - Math.round(edge.thicknessM / layerM)) > 0.2);
  assert.ok(Math.abs(edge.thicknessM - 11 * layerM - 0.5e-9) < 0.1e-9 && edge.sdM * 2 > 0.5e-9);
});

test('an edge that contradicts a stated count is said with both numbers', () => {
  const barrier = assess(edged, { referenceLayers: 15 });
  const message = said(barrier, 'anchors-disagree');
  assert.match(message, /15\.0 layers\) by the stated layer count.*by the step at the flake’s edge/);
});

test('the density with a thickness that has an error holds the truth, and is wider than with an exact count', () => {
  const byEdge = assess(edged);
  const counted = assess(edged, { referenceLayers: byEdge.reference.layers! });
  const truth = wkbModel.density({ heightEv: 2.5, massRatio: 0.5, thicknessM: byEdge.reference.layers! * layerM }, 4);
  for (const { device } of [byEdge, counted]) assert.ok(device!.low95 < truth && truth < device!.high95);
  assert.ok(byEdge.device!.high95 / byEdge.device!.low95 > counted.device!.high95 / counted.device!.low95);
});

test('no edge over bare injector: over substrate, without a step, too few places', () => {
  const grid = { columns: 40, rows: 40, pitchXM: 20e-9, pitchYM: 20e-9 };
  const barrier = Uint8Array.from({ length: 1600 }, (_, i) => (i % 40 < 20 ? 1 : 0));
  const levelled = Float32Array.from(barrier, (on) => on * 3.663e-9);
  const saturated = barrier.map((on) => 1 - on);
  const steps = new Int8Array(1600).fill(2);
  const found = edgeStep(levelled, saturated, steps, { barrier }, grid, layerM)!;
  assertClose(found.stepM, 3.663e-9, 1e-6);
  assertClose(found.firstM, 3.663e-9 - 2 * layerM, 1e-6);
  const none = new Uint8Array(1600);
  assert.equal(edgeStep(levelled, none, steps, { barrier }, grid, layerM), undefined);
  assert.equal(edgeStep(new Float32Array(1600), saturated, steps, { barrier }, grid, layerM), undefined);
  assert.equal(edgeStep(levelled, saturated, new Int8Array(1600).fill(-128), { barrier }, grid, layerM), undefined);
  assert.equal(edgeStep(levelled, saturated, steps, { barrier, injector: none }, grid, layerM), undefined);
  // NaN beside the edge leaves places out.
  assert.equal(edgeStep(levelled.map((value, i) => (i % 40 > 20 && i % 40 < 24 ? Number.NaN : value)), saturated, steps, { barrier }, grid, layerM), undefined);
});

/** Current in nA of a device of 12 µm² on 11 layers at 4 V. */
const finishedNa = wkbModel.density({ heightEv: 2.5, massRatio: 0.5, thicknessM: 11 * layerM }, 4) * 12e-12 * 1e9;

test('a finished device anchors thickness and density whatever the contact’s area', () => {
  const barrier = assess({ contactM2: 170e-18 }, { finishedBiasV: 4, finishedCurrentNa: finishedNa, finishedAreaUm2: 12 });
  const device = anchorOf(barrier, 'device')!;
  assert.equal(device.taken, true);
  assert.equal(barrier.reference.layers, 11);
  assertClose(device.thicknessM, 11 * layerM, 1e-6);
  assertClose(barrier.device!.median, finishedNa * 1e-9 / 12e-12, 0.05);
  assert.match(device.sentence, /12 µm² at 4 V/);
  assert.match(said(barrier, 'anchors-disagree'), /3\.66 nm \(11\.0 layers\) by the finished device’s current.*by the current through the stated contact area/);
  // Read with the true area nothing disagrees.
  assert.equal(said(assess({}, { finishedBiasV: 4, finishedCurrentNa: finishedNa, finishedAreaUm2: 12 }), 'anchors-disagree'), '');
});

test('stack.offsetV does not fall across the finished device’s barrier', () => {
  const barrier = assess({}, { finishedBiasV: 4.5, finishedCurrentNa: finishedNa, finishedAreaUm2: 12 }, { stack: { biasV: 4.5, offsetV: 0.5 } });
  assertClose(anchorOf(barrier, 'device')!.thicknessM, 11 * layerM, 1e-6);
});

test('a finished device with a value missing, or one that no barrier gives, is left out and said', () => {
  const partly = assess({}, { finishedBiasV: 4, finishedAreaUm2: 12 });
  assert.match(said(partly, 'finished-incomplete'), /barrier\.finishedCurrentNa is not given/);
  assert.equal(anchorOf(partly, 'device'), undefined);
  const wild = assess({}, { finishedBiasV: 0.001, finishedCurrentNa: 1e12, finishedAreaUm2: 1e-3 });
  assert.match(said(wild, 'finished-no-thickness'), /barrier\.finishedBiasV/);
});

test('without anything else the current through the stated area is the anchor, with the error of its decade', () => {
  const barrier = assess({});
  assert.deepEqual(barrier.anchors.map(({ kind, taken }) => [kind, taken]), [['area', true]]);
  const { thicknessM, sdM } = barrier.anchors[0]!;
  // ×√10 in area at 95 % over the slope of ln J.
  const slope = wkbModel.slopes({ heightEv: 2.5, massRatio: 0.5, thicknessM }, 5.9).lnPerM;
  assertClose(sdM, Math.log(10) / 2 / 1.96 / Math.abs(slope), 0.02);
});

test('every density says the field it was measured at and the one it is meant for', () => {
  const { device, reference } = assess({}, { referenceLayers: 11 });
  assertClose(device!.probeFieldVPerNm, 5.9 / (reference.thicknessM! * 1e9), 1e-12);
  assertClose(device!.fieldVPerNm, 4 / (reference.thicknessM! * 1e9), 1e-12);
});

test('the device’s field is warned of from the recipe’s limit on, 0.8 V/nm by default', () => {
  const codes = (biasV: number, band = {}): string[] => assess({}, { referenceLayers: 11 }, { stack: { biasV }, band }).warnings.map(({ code }) => code).filter((code) => code.startsWith('device-field'));
  // 11 layers are 3.663 nm: 2.92 V is 0.797, 2.94 V 0.803 V/nm.
  assert.deepEqual([codes(2.92), codes(2.94), codes(4.41)], [[], ['device-field-limit'], ['device-field']]);
  assert.deepEqual(codes(4, { deviceFieldVPerNm: 1.1 }), []);
  assert.deepEqual(codes(4.41, { deviceFieldVPerNm: 2 }), ['device-field']);
});

test('an image charge asked of another model is left out and said', () => {
  assert.match(said(assess({}, { imagePermittivity: 3.4 }), 'image-charge-unused'), /wkb has no image charge/);
  assert.equal(said(assess({}, { imagePermittivity: 3.4, model: 'fowler-nordheim' }), 'image-charge-unused'), '');
});
