import assert from 'node:assert/strict';
import { test } from 'node:test';
import { alternativeOf } from '../../src/flaws/alternative.ts';

test('only an ambiguous flaw has an alternative, and it is another class', () => {
  assert.equal(alternativeOf({ cause: 'bubble', confidence: 0.6 }), 'residue');
  assert.equal(alternativeOf({ cause: 'residue', confidence: 0.5 }), 'bubble');
  assert.equal(alternativeOf({ cause: 'wrinkle', confidence: 0.55 }), 'bubble');
  assert.equal(alternativeOf({ cause: 'bubble', confidence: 0.65 }), undefined);
  assert.equal(alternativeOf({ cause: 'bubble', confidence: 0.649 }), undefined, 'shown as 0.65');
  assert.equal(alternativeOf({ cause: 'bubble', confidence: 0.64 }), 'residue');
  assert.equal(alternativeOf({ cause: 'short', confidence: 0.5 }), undefined);
  assert.equal(alternativeOf({ cause: 'residue', confidence: 0.5, byHand: true }), undefined);
});
