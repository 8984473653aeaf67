import assert from 'node:assert/strict';
import { test } from 'node:test';
import { tipGaps } from '../../src/flaws/tip-gaps.ts';

/** One row of 10 nm pixels between two walls of a height in nm; returns what is marked. */
function marked(gapPx: number, heightNm: number, pitchXM = 10e-9): string {
  const wall = [1, 1, 1, 1];
  const raised = Uint8Array.from([...wall, ...Array.from({ length: gapPx }, () => 0), ...wall]);
  const rise = Float32Array.from(raised, (value) => value * heightNm * 1e-9);
  return [...tipGaps(raised, rise, raised.length, 1, pitchXM, 10e-9, 25e-9)].join('');
}

test('a gap is marked when a circle of the tip’s radius on both edges does not touch its ground [F: chord 2·√(h(2R − h))]', () => {
  // R 25 nm, h 10 nm: chord 40 nm. h 40 nm, above R: 50 nm.
  assert.equal(marked(3, 10), '00001110000');
  assert.equal(marked(5, 10), '0000000000000');
  assert.equal(marked(4, 40), '000011110000');
  assert.equal(marked(6, 40), '00000000000000');
  // The same number of wider pixels is a wider gap.
  assert.equal(marked(3, 10, 20e-9), '00000000000');
});

test('ground open to one side, and ground beside the map’s edge, is in no gap', () => {
  assert.deepEqual([...tipGaps(Uint8Array.from([0, 0, 1, 1]), new Float32Array(4).fill(40e-9), 4, 1, 10e-9, 10e-9, 25e-9)], [0, 0, 0, 0]);
});

test('columns count like rows, at their own pitch', () => {
  const raised = Uint8Array.from([1, 1, 0, 0, 1, 1]);
  const rise = Float32Array.from(raised, (value) => value * 40e-9);
  assert.deepEqual([...tipGaps(raised, rise, 1, 6, 10e-9, 10e-9, 25e-9)], [0, 0, 1, 1, 0, 0]);
  assert.deepEqual([...tipGaps(raised, rise, 1, 6, 10e-9, 30e-9, 25e-9)], [0, 0, 0, 0, 0, 0]);
});
