/** Anchors before the reference is chosen: which maps at several biases count, and which anchor is taken. */
import assert from 'node:assert/strict';
import { test } from 'node:test';
import { anchorOf } from '../../src/barrier/anchor.ts';
import type { BiasTerrace, BiasThickness } from '../../src/barrier/bias-thickness.ts';
import { wkbModel } from '../../src/barrier/model/wkb.ts';
import type { Candidate } from '../../src/barrier/reference.ts';
import { gatherWitnesses, takenOf } from '../../src/barrier/thickness-anchors.ts';
import { biasSolver } from '../../src/barrier/two-bias.ts';
import { assertClose } from '../fixtures/assert-close.ts';
import { createRecipe } from '../fixtures/create-sample.ts';
import { terraceCurrentA } from '../fixtures/create-scene.ts';

const layerM = 0.333e-9;
const material = { heightEv: 2.5, massRatio: 0.5 };
const { barrier: section } = createRecipe();
const candidate = (step: number): Candidate => ({ step, pixels: 4000, areaM2: 1.6e-12, medianLog10: Math.log10(terraceCurrentA(11 + step, 5.9)), scatterDecades: 0.05, bound: 'exact' });
const terrace = (step: number, layers: number, usedShare: number): BiasTerrace => ({
  step, pixels: 4000 + step, usedShare, thicknessM: layers * layerM, seM: 1e-12, pixelSeM: 4e-11, lnRatioSe: 1e-3,
  lnRatio: wkbModel.lnDensity({ ...material, thicknessM: layers * layerM }, 5.9) - wkbModel.lnDensity({ ...material, thicknessM: layers * layerM }, 5),
});

function gather(terraces: readonly BiasTerrace[], secondV = 5, wearDecades = 0) {
  const none = new Float32Array(0);
  const biases: BiasThickness = { biasesV: [5.9, secondV], lowV: secondV, highV: 5.9, thickness: none, pixelSe: none, lnRatio: none, solver: biasSolver(wkbModel, material, [5.9, secondV])!, further: [], terraces };
  const anchor = anchorOf(section, { offsetV: 0, targetAPerM2: 1e3 }, 5.9)!;
  return gatherWitnesses({ anchor, section, current: { wearDecades }, candidates: [candidate(0), candidate(1)], common: candidate(0), biases, edge: undefined });
}

test('a terrace of which most pixels are censored at one bias says nothing; where all are, that is said', () => {
  const some = gather([terrace(0, 11, 0.9), terrace(1, 9, 0.2)]).witnesses.find(({ kind }) => kind === 'biases')!;
  assertClose(some.at(0, 1), 11 * layerM, 1e-12);
  assertClose(some.at(1, 1), 12 * layerM, 1e-12);
  const { witnesses, warnings } = gather([terrace(0, 11, 0.4), terrace(1, 12, 0.2)]);
  assert.deepEqual(witnesses.map(({ kind }) => kind), ['area']);
  assert.deepEqual(warnings.map(({ code }) => code), ['biases-no-terrace']);
});

test('biases too near each other are compared but not taken', () => {
  const far = gather([terrace(0, 11, 0.9)]).witnesses;
  assert.equal(takenOf(far, layerM)!.kind, 'biases');
  const near = gather([terrace(0, 11, 0.9)], 5.75).witnesses;
  assert.equal(near[0]!.kind, 'biases');
  assert.ok(near[0]!.sdM > layerM);
  assert.equal(takenOf(near, layerM)!.kind, 'area');
});

test('the area that follows from the ratio is the painted one, with an error that holds it', () => {
  const { area } = gather([terrace(0, 11, 0.9)]).witnesses[0]!.given;
  assertClose(area!.areaM2, 17e-18, 1e-6);
  // 5 % between the scans, over the difference of the slopes at both biases, times the slope at the scan's.
  const slope = (biasV: number): number => wkbModel.slopes({ ...material, thicknessM: 11 * layerM }, biasV).lnPerM;
  assertClose(Math.log(area!.factor95), 1.96 * Math.abs((slope(5.9) * 0.05) / (slope(5.9) - slope(5))), 1e-3);
});

test('a ladder that the biases contradict, and a tip that wore, are said', () => {
  assert.deepEqual(gather([terrace(0, 11, 0.9), terrace(1, 11, 0.9)]).warnings.map(({ code }) => code), ['biases-ladder']);
  const worn = gather([terrace(0, 11, 0.9)], 5, 0.3).warnings[0]!;
  assert.equal(worn.code, 'biases-worn');
  assert.match(worn.message, /0\.30 decades.*may be off by 1\.\d\d nm/);
});

test('a finished device stands on the most common terrace; others lie whole layers from it', () => {
  const density = wkbModel.density({ ...material, thicknessM: 12 * layerM }, 4);
  const { barrier: stated } = createRecipe({ barrier: { finishedBiasV: 4, finishedCurrentNa: density * 1e-12 * 1e9, finishedAreaUm2: 1 } });
  const anchor = anchorOf(stated, { offsetV: 0, targetAPerM2: 1e3 }, 5.9)!;
  const { witnesses } = gatherWitnesses({ anchor, section: stated, current: { wearDecades: 0 }, candidates: [candidate(0), candidate(1)], common: candidate(1), biases: undefined, edge: undefined });
  const device = witnesses.find(({ kind }) => kind === 'device')!;
  assertClose(device.at(1, 1), 12 * layerM, 1e-9);
  assertClose(device.at(0, 1), 11 * layerM, 1e-9);
  assertClose(device.given.area!.areaM2, 17e-18, 1e-6);
});
