import assert from 'node:assert/strict';
import { test } from 'node:test';
import { findRidges } from '../../src/flaws/find-ridges.ts';
import { assertClose } from '../fixtures/assert-close.ts';
import { dome, drawRises, exchanged, patch, ridge } from '../fixtures/draw-rises.ts';
import type { DrawnRises } from '../fixtures/draw-rises.ts';

const grid = { columns: 128, rows: 128, pitchXM: 20e-9, pitchYM: 20e-9 };
const flat = { columns: 160, rows: 90, pitchXM: 16e-9, pitchYM: 28e-9 };
const crestPixels = (drawn: DrawnRises): number => findRidges(drawn).crest.reduce((sum, value) => sum + value, 0);

for (const angleDeg of [0, 20, 45, 75, 90, 130]) {
  test(`the crest of a Gaussian ridge at ${angleDeg}° lies on its middle line and knows its width [F]`, () => {
    const [ux, uy] = [Math.cos((angleDeg * Math.PI) / 180), Math.sin((angleDeg * Math.PI) / 180)];
    const sigma = 40;
    for (const drawn of [drawRises(grid, [ridge(1280 - 700 * ux, 1280 - 700 * uy, 1280 + 700 * ux, 1280 + 700 * uy, sigma, 7)]), drawRises(flat, [ridge(1280 - 700 * ux, 1280 - 700 * uy, 1280 + 700 * ux, 1280 + 700 * uy, sigma, 7)])]) {
      const { crest, widthM } = findRidges(drawn);
      const on = [...crest.keys()].filter((i) => crest[i] === 1);
      const along = on.map((i) => {
        const [x, y] = [((i % drawn.columns) + 0.5) * drawn.pitchXM * 1e9 - 1280, (Math.floor(i / drawn.columns) + 0.5) * drawn.pitchYM * 1e9 - 1280];
        assert.ok(Math.abs(x * uy - y * ux) < 1.6 * 28, `${x}, ${y} is off the crest`);
        return x * ux + y * uy;
      });
      assert.ok(Math.max(...along) - Math.min(...along) > 1000, 'over most of its length');
      // 2√(2 ln 2) σ; the average over three pixels and the directions in steps of some 20° widen it.
      const widths = on.map((i) => widthM[i]!).sort((a, b) => a - b);
      assertClose(widths[widths.length >> 1], 2.3548 * sigma * 1e-9, 0.2);
      assert.ok(widthM.every((width, i) => (width > 0) === (crest[i] === 1)));
    }
  });
}

test('a dome, two domes that touch and a patch have no crest', () => {
  for (const seed of ['a', 'b', 'c']) {
    for (const [name, things] of Object.entries({
      'a dome': [dome(1280, 1280, 260, 30)], 'a small dome': [dome(1280, 1280, 90, 10)],
      'two domes': [dome(1080, 1280, 240, 28), dome(1480, 1280, 200, 22)], 'a patch': [patch(1280, 1280, 300, 2)],
    })) assert.equal(crestPixels(drawRises(grid, things, { seed })), 0, `${name}, seed ${seed}`);
  }
});

test('a wide hill is no fold, however long', () => {
  assert.equal(crestPixels(drawRises(grid, [ridge(200, 1280, 2360, 1280, 250, 20)])), 0);
});

test('a ridge that leaves the map over one border or two is one all the same', () => {
  for (const [x1, x2] of [[-500, 900], [-500, 3100]] as const) {
    const { crest } = findRidges(drawRises(grid, [ridge(x1, 1280, x2, 1280, 40, 7)]));
    assert.ok([...crest.keys()].filter((i) => crest[i] === 1 && i % 128 < 40).length >= 35, `from ${x1} to ${x2}`);
  }
});

test('with rows and columns exchanged, and the pitches with them, the crest is exchanged too', () => {
  const drawn = drawRises(flat, [ridge(300, 400, 1900, 2000, 40, 7), dome(1800, 600, 200, 20)]);
  const turned = exchanged(drawn);
  const own = findRidges(drawn).crest;
  const other = findRidges(turned).crest;
  let differing = 0;
  for (let r = 0; r < 90; r++) for (let c = 0; c < 160; c++) if (own[r * 160 + c] !== other[c * 90 + r]) differing++;
  // Directions across the ridge that tie are taken in order.
  assert.ok(differing <= 4, `${differing} pixels differ`);
});

test('only inside the mask, and nowhere on a map of nothing', () => {
  const drawn = drawRises(grid, [ridge(300, 1280, 2200, 1280, 40, 7)]);
  assert.equal(crestPixels({ ...drawn, mask: new Uint8Array(drawn.mask.length) }), 0);
  assert.equal(crestPixels({ ...drawn, rise: new Float32Array(drawn.rise.length).fill(Number.NaN) }), 0);
});
