import assert from 'node:assert/strict';
import { test } from 'node:test';
import { anchorOf } from '../../src/barrier/anchor.ts';
import type { Anchor } from '../../src/barrier/anchor.ts';
import { chooseAnchored } from '../../src/barrier/choose-anchored.ts';
import type { Candidate, ReferenceRule } from '../../src/barrier/reference.ts';
import { createRecipe } from '../fixtures/create-sample.ts';

const rule: ReferenceRule = { minAPerM2: 1e2, maxAPerM2: 3e4, bandFactor: 3, terraceMinM2: 0.25e-12, floor: 1e-13 };
const terrace = (step: number, areaUm2: number): Candidate => ({
  step, pixels: Math.round(areaUm2 * 2500), medianLog10: -9 - 0.5 * step, scatterDecades: 0.05, bound: 'exact', areaM2: areaUm2 * 1e-12,
});

/** Knows 11 layers; a terrace carries what the table says of its layers, A/m², within a factor of 2. */
function known11(byLayers: Readonly<Record<number, number>>): Anchor {
  const anchor = anchorOf(createRecipe({ barrier: { referenceLayers: 11 } }).barrier, { offsetV: 0, targetAPerM2: 1e3 }, 5.9)!;
  return { ...anchor, density: (_currentA, _biasV, layers = 11) => ({ median: byLayers[layers]!, low95: byLayers[layers]! / 2, high95: byLayers[layers]! * 2 }) };
}
const choose = (candidates: readonly Candidate[], byLayers: Readonly<Record<number, number>>) => chooseAnchored(candidates, rule, known11(byLayers), 4)!;

test('the largest terrace stands as the reference where it is in range with the known count', () => {
  const found = choose([terrace(0, 3), terrace(1, 6)], { 10: 3000, 11: 1000, 12: 300 });
  assert.deepEqual([found.chosen.step, found.chosen.density?.median, found.outranking], [1, 1000, undefined]);
});

test('the others lie whole layers from the reference: what is too rare is passed over by its own count', () => {
  // With the same count for all, the thin patch would be as far out of range as the reference.
  const found = choose([terrace(0, 30), terrace(1, 1)], { 11: 1e6, 12: 1e3 });
  assert.deepEqual([found.chosen.step, found.inRange, found.passedOver.map(({ step }) => step)], [0, false, [1]]);
  assert.equal(found.passedOver[0]!.density?.median, 1e3);
});

test('a count that makes another terrace the reference belongs to the most common one, and that is kept', () => {
  // The larger terrace with 11 layers is out of range, so the other with 12 would be the reference; but a reference has 11.
  const found = choose([terrace(0, 6), terrace(1, 3)], { 10: 1e7, 11: 1e6, 12: 1e3 });
  assert.deepEqual([found.chosen.step, found.inRange, found.reaches], [0, false, false]);
  assert.deepEqual([found.outranking?.step, found.outranking?.density?.median], [1, 1e3]);
});

test('a smaller terrace that stands with the known count is taken before a larger one that does not glow', () => {
  const own = (currentA: number) => (currentA > 0.5e-9 ? 1e6 : 1e3);
  const anchor: Anchor = { ...known11({}), density: (currentA) => ({ median: own(currentA), low95: own(currentA) / 2, high95: own(currentA) * 2 }) };
  assert.equal(chooseAnchored([terrace(0, 6), terrace(1, 3)], rule, anchor, 4)!.chosen.step, 1);
});

test('no device bias, no densities: the most common terrace', () => {
  const found = chooseAnchored([terrace(0, 3), terrace(1, 6)], rule, known11({}), undefined)!;
  assert.deepEqual([found.chosen.step, found.chosen.density], [1, undefined]);
});
