/** The verdict's sentence says nothing that the map does not. */
import assert from 'node:assert/strict';
import { test } from 'node:test';
import type { VerdictInput } from '../../src/ledger/verdict.ts';
import { verdictSentence } from '../../src/ledger/verdict.ts';

function sentence(usableUm2: number, change: Partial<VerdictInput> = {}): string {
  const usable = { areaM2: usableUm2 * 1e-12, share: usableUm2 / 10, low95M2: usableUm2 * 0.9e-12, high95M2: usableUm2 * 1.1e-12, largestPatchM2: usableUm2 * 1e-12, knownToGlow: true, meaning: 'usable' as const };
  return verdictSentence({
    usable, footprintM2: 10e-12, surface: 'barrier', bandFactor: 3, hasCurrent: true, biasV: 3.25, proposed: false, shorts: { seen: 2, expectedMissed: 6 }, breaksDown: false, mayGlow: false, unmeasuredM2: 0, setAsideM2: 0, ...change,
  });
}

test('a given bias is printed as given, a proposed one to three digits', () => {
  assert.match(sentence(4), /is even barrier, within a factor of 3 at 3\.25 V; 2 shorts seen \(about 6 more expected between the lines\)/);
  assert.match(sentence(4, { biasV: -4 }), /at -4 V/);
  assert.match(sentence(4, { biasV: 3.374221, proposed: true }), /within a factor of 3 at 3\.37 V \(proposed\)/);
});

test('nothing usable: why, and what good or unknown ground there is', () => {
  assert.equal(sentence(0), 'Nothing of 10.0 µm² is even barrier.');
  assert.equal(sentence(0, { hasCurrent: false }), 'Nothing of 10.0 µm² is free of flaws in height.');
  assert.equal(sentence(0, { surface: 'stack' }), 'Nothing of 10.0 µm² is usable.');
  assert.equal(sentence(0, { unmeasuredM2: 10e-12 }), 'Nothing of 10.0 µm² is known to be even barrier; 10.0 µm² could not be measured.');
  assert.equal(sentence(0, { hasCurrent: false, setAsideM2: 9e-12 }), 'Nothing of 10.0 µm² is usable: 9.00 µm² is free of flaws in height but starved, in the rim or too small a patch.');
  assert.equal(sentence(0, { setAsideM2: 2e-12, unmeasuredM2: 1e-12 }), 'Nothing of 10.0 µm² is usable: 2.00 µm² is even barrier but starved, in the rim or too small a patch; 1.00 µm² could not be measured.');
});

test('a bias above the breakdown field is cautioned against right behind it', () => {
  assert.match(sentence(4, { breaksDown: true }), /at 3\.25 V; caution: this bias puts more than hBN’s breakdown field on it/);
  assert.doesNotMatch(sentence(4), /caution/);
});
