import assert from 'node:assert/strict';
import { test } from 'node:test';
import { chooseReference } from '../../src/barrier/reference.ts';
import type { Candidate, ReferenceRule } from '../../src/barrier/reference.ts';

/** 0.1–30 nA/µm² in A/m²; smallest terrace 0.25 µm². */
const rule: ReferenceRule = { minAPerM2: 1e2, maxAPerM2: 3e4, bandFactor: 3, terraceMinM2: 0.25e-12, floor: 1e-13 };

/** A terrace of an area in µm²; its density in nA/µm² is known within a factor of 2 either way. */
function terrace(step: number, areaUm2: number, naPerUm2?: number, more: Partial<Candidate> = {}): Candidate {
  return {
    step, pixels: Math.round(areaUm2 * 2500), medianLog10: -9 - 0.5 * step, scatterDecades: 0.05, bound: 'exact', areaM2: areaUm2 * 1e-12,
    ...(naPerUm2 === undefined ? {} : { density: { median: naPerUm2 * 1e3, low95: naPerUm2 * 500, high95: naPerUm2 * 2e3 } }), ...more,
  };
}
const choose = (candidates: readonly Candidate[], more: Partial<ReferenceRule> = {}) => chooseReference(candidates, { ...rule, ...more });

test('a terrace in range is preferred to a larger one out of range', () => {
  const found = choose([terrace(0, 6, 500), terrace(1, 3, 5), terrace(2, 2, 0.5)])!;
  assert.equal(found.chosen.step, 1);
  assert.equal(found.inRange, true);
  assert.equal(found.runnerUp, undefined);
});

test('the largest of those in range is taken', () => {
  assert.equal(choose([terrace(0, 2, 20), terrace(1, 3, 5), terrace(2, 5, 0.5)])!.chosen.step, 2);
});

test('a runner-up within 10 % is named, one further off or out of range is not', () => {
  assert.equal(choose([terrace(0, 3, 20), terrace(1, 2.8, 5)])!.runnerUp?.step, 1);
  assert.equal(choose([terrace(0, 3, 20), terrace(1, 2.6, 5)])!.runnerUp, undefined);
  assert.equal(choose([terrace(0, 3, 20), terrace(1, 2.9, 500)])!.runnerUp, undefined);
});

test('none in range: the most common one, and not in range', () => {
  const found = choose([terrace(0, 3, 900), terrace(1, 5, 300), terrace(2, 1, 100)])!;
  assert.equal(found.chosen.step, 1);
  assert.deepEqual([found.inRange, found.reaches], [false, false]);
});

test('without densities: the most common one, nothing said of a range', () => {
  const found = choose([terrace(0, 3), terrace(1, 5)])!;
  assert.equal(found.chosen.step, 1);
  assert.equal(found.inRange, undefined);
});

test('a centre out of range whose interval reaches into it may glow', () => {
  const found = choose([terrace(0, 3, 45)])!;
  assert.deepEqual([found.inRange, found.reaches], [false, true]);
});

test('censored terraces are not taken while a measured one is there', () => {
  const found = choose([terrace(-3, 6, 5, { bound: 'at-most' }), terrace(1, 1, 500), terrace(9, 4, 5, { bound: 'at-least' })])!;
  assert.equal(found.chosen.step, 1);
  assert.equal(choose([terrace(-3, 6, undefined, { bound: 'at-most' }), terrace(9, 7, undefined, { bound: 'at-least' })]), undefined, 'all ground is censored');
  const speck = terrace(1, 0.1);
  assert.equal(choose([terrace(-3, 6, undefined, { bound: 'at-most' }), speck]), undefined, 'a speck between censored ground is none either');
  assert.equal(choose([speck])!.chosen, speck, 'all there is on a tiny map');
});

test('too small a share or too near the floor: passed over, and said; what is smaller than a terrace is not even said', () => {
  const small = choose([terrace(0, 3, 500), terrace(1, 0.2, 5)])!;
  assert.deepEqual([small.chosen.step, small.passedOver], [0, []]);
  const patch = choose([terrace(0, 30, 500), terrace(1, 1, 5)])!;
  assert.deepEqual([patch.chosen.step, patch.passedOver.map((c) => c.step)], [0, [1]]);
  // −12 is ten times the floor; a band of ×/÷3 above 10σ needs 10/3 · 3 = 10 times 3σ.
  const dim = terrace(1, 2, 5, { medianLog10: -12.1 });
  assert.deepEqual([choose([terrace(0, 3, 500), dim])!.chosen.step, choose([terrace(0, 3, 500), { ...dim, medianLog10: -11.9 }])!.chosen.step], [0, 1]);
});

test('no candidate, no reference', () => {
  assert.equal(choose([]), undefined);
});

test('the order of the candidates does not matter', () => {
  const candidates = [terrace(0, 2, 20), terrace(1, 3, 5), terrace(2, 5, 800), terrace(3, 2.9, 0.2)];
  const straight = choose(candidates)!;
  const back = choose([...candidates].reverse())!;
  assert.deepEqual([back.chosen, back.runnerUp], [straight.chosen, straight.runnerUp]);
  assert.deepEqual([straight.chosen.step, straight.runnerUp?.step], [1, 3]);
});
