import assert from 'node:assert/strict';
import { test } from 'node:test';
import { nearestWord } from '../../src/schema/nearest-word.ts';

test('the nearest known word within two changes, or a third of its letters', () => {
  const known = ['heightNm', 'heightNoise', 'dropDecades', 'edgeShare'];
  assert.equal(nearestWord('heightnm', known), 'heightNm');
  assert.equal(nearestWord('hieghtNm', known), 'heightNm');
  assert.equal(nearestWord('height', known), 'heightNm');
  assert.equal(nearestWord('dropDecade', known), 'dropDecades');
  assert.equal(nearestWord('colour', known), undefined);
  assert.equal(nearestWord('x', ['y', 'xy']), undefined);
  assert.equal(nearestWord('', known), undefined);
  assert.equal(nearestWord('anything', []), undefined);
});
