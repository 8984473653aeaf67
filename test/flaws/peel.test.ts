import assert from 'node:assert/strict';
import { test } from 'node:test';
import { peelParts } from '../../src/flaws/peel.ts';
import { dome, drawRises, patch } from '../fixtures/draw-rises.ts';
import type { DrawnRises, Rise } from '../fixtures/draw-rises.ts';

const grid = { columns: 128, rows: 128, pitchXM: 20e-9, pitchYM: 20e-9 };

/** All that rises as one part, peeled. */
function peeled(things: readonly Rise[], seed = 'peel'): { drawn: DrawnRises; labels: Uint32Array; count: number } {
  const drawn = drawRises(grid, things, { seed });
  const labels = Uint32Array.from(drawn.mask);
  return { drawn, labels, count: peelParts({ ...drawn, labels, count: 1 }) };
}

for (const seed of ['a', 'b', 'c']) {
  test(`a dome, a steep block and a patch are not peeled, small or large, seed ${seed}`, () => {
    const block = (radius: number, peak: number): Rise => (x, y) => peak * (1 - (((x - 1280) ** 2 + (y - 1280) ** 2) / radius ** 2) ** 2);
    for (const radius of [80, 150, 300, 600]) {
      for (const [name, thing] of [['dome', dome(1280, 1280, radius, radius / 9)], ['block', block(radius, radius / 9)], ['patch', patch(1280, 1280, radius, 2)]] as const) {
        assert.equal(peeled([thing], seed).count, 1, `${name} of ${radius} nm`);
      }
    }
  });

  test(`a film beside a bubble is a part of its own, seed ${seed}`, () => {
    const { drawn, labels, count } = peeled([dome(900, 1280, 250, 30), patch(1350, 1280, 260, 2)], seed);
    assert.equal(count, 2);
    assert.equal(labels[drawn.at(900, 1280)], 1);
    assert.equal(labels[drawn.at(1400, 1280)], 2);
    assert.equal(labels[drawn.at(900, 1100)], 1, 'the bubble keeps its foot');
  });

  test(`a small dome on the flank of a large one, without a summit of its own, comes off, seed ${seed}`, () => {
    const { drawn, labels, count } = peeled([dome(900, 1280, 400, 50), dome(1360, 1280, 160, 6)], seed);
    assert.equal(count, 2);
    assert.notEqual(labels[drawn.at(1420, 1280)], labels[drawn.at(900, 1280)]);
  });
}

test('parts keep what they have: every labelled pixel stays labelled, and remains become parts in turn', () => {
  const { drawn, labels, count } = peeled([dome(640, 1280, 300, 60), patch(1100, 1280, 260, 6), patch(1560, 1280, 280, 1.6)]);
  assert.ok(labels.every((label, i) => (label > 0) === (drawn.mask[i] === 1) && label <= count));
  assert.equal(count, 3);
  assert.equal(new Set([[640, 1280], [1100, 1280], [1650, 1280]].map(([x, y]) => labels[drawn.at(x!, y!)])).size, 3);
});

test('a part without a height stays whole', () => {
  const drawn = drawRises(grid, [dome(640, 1280, 300, 60)]);
  const labels = Uint32Array.from(drawn.mask);
  assert.equal(peelParts({ ...drawn, rise: new Float32Array(drawn.rise.length).fill(Number.NaN), labels, count: 1 }), 1);
});
