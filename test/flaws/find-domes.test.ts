import assert from 'node:assert/strict';
import { test } from 'node:test';
import { findDomes } from '../../src/flaws/find-domes.ts';
import { assertClose } from '../fixtures/assert-close.ts';
import { dome, drawRises, exchanged, mirrored, patch, ridge } from '../fixtures/draw-rises.ts';
import type { Rise } from '../fixtures/draw-rises.ts';

const grid = { columns: 128, rows: 128, pitchXM: 20e-9, pitchYM: 20e-9 };
const oblong = { columns: 142, rows: 116, pitchXM: 18e-9, pitchYM: 22e-9 };

for (const seed of ['a', 'b']) {
  test(`a dome alone, one that touches another and one with a ridge through it are found with their whole area, seed ${seed}`, () => {
    for (const [name, things, domes] of [
      ['alone', [dome(1280, 1280, 300, 35)], [[1280, 1280, 300]]],
      ['touching', [dome(900, 1280, 280, 30), dome(1390, 1290, 230, 26)], [[900, 1280, 280], [1390, 1290, 230]]],
      ['crossed', [dome(1287, 1291, 290, 35), ridge(-500, 1291, 3100, 1291, 40, 7)], [[1287, 1291, 290]]],
      ['beside a film', [dome(900, 1280, 280, 30), patch(1300, 1280, 240, 2)], [[900, 1280, 280]]],
    ] as readonly (readonly [string, readonly Rise[], readonly (readonly [number, number, number])[]])[]) {
      for (const on of name === 'touching' ? [grid] : [grid, oblong]) {
        const drawn = drawRises(on, things, { seed });
        for (const [turned, place] of [
          [drawn, (x: number, y: number) => [x, y] as const], [mirrored(drawn), (x: number, y: number) => [on.columns * on.pitchXM * 1e9 - x, y] as const], [exchanged(drawn), (x: number, y: number) => [y, x] as const],
        ] as const) {
          const { labels, count } = findDomes(turned);
          assert.equal(count, domes.length, `${name}, ${on.columns} × ${on.rows}`);
          for (const [x, y, radius] of domes) {
            const label = labels[turned.at(...place(x, y))]!;
            assert.ok(label > 0, name);
            // A dome that leans on another gives way to the larger one where they overlap.
            assertClose(labels.filter((value) => value === label).length * on.pitchXM * on.pitchYM * 1e18, Math.PI * radius ** 2, 0.12, name);
          }
        }
      }
    }
  });
}

test('a block, a patch, a cone, a hollow and a dome of two pixels are none', () => {
  const at = (shape: (rho: number) => number): Rise => (x, y) => shape(Math.hypot(x - 1280, y - 1280) / 300);
  for (const [name, thing] of [
    ['block', at((rho) => 30 * (1 - rho ** 4))], ['patch', patch(1280, 1280, 300, 2)], ['cone', at((rho) => 30 * (1 - rho))],
    ['crater', at((rho) => (rho < 1 ? 5 + 20 * rho : 0))], ['speck', dome(1280, 1280, 45, 5)],
  ] as const) assert.equal(findDomes(drawRises(grid, [thing])).count, 0, name);
});

test('labels lie inside the mask and are numbered without gaps; nothing rises, nothing is found', () => {
  const drawn = drawRises(grid, [dome(507, 511, 275, 30), dome(1803, 607, 230, 26), dome(613, 1885, 190, 20), patch(1900, 1900, 300, 2)]);
  const { labels, count } = findDomes(drawn);
  assert.equal(count, 3);
  labels.forEach((label, i) => { if (label > count || (label > 0 && drawn.mask[i] === 0)) assert.fail(`label ${label} at ${i}`); });
  assert.equal(new Set(labels.filter((label) => label > 0)).size, 3);
  assert.equal(findDomes(drawRises(grid, [])).count, 0);
});

test('a dome on the flank of a fold is found by its rim, where the slope breaks', () => {
  // The middle of the dome lies beside the crest, so that the largest inscribed circle is displaced towards the fold's far side.
  const drawn = drawRises(grid, [ridge(-500, 1340, 3100, 1250, 60, 10), dome(1300, 1200, 140, 17)], { seed: 'flank' });
  for (const [turned, x, y] of [[drawn, 1300, 1200], [mirrored(drawn), 2560 - 1300, 1200], [exchanged(drawn), 1200, 1300]] as const) {
    const { labels, count } = findDomes(turned);
    assert.equal(count, 1);
    const label = labels[turned.at(x, y)]!;
    assertClose(labels.filter((value) => value === label).length * 400, Math.PI * 140 ** 2, 0.15);
  }
  assert.equal(findDomes(drawRises(grid, [ridge(-500, 1340, 3100, 1250, 60, 10)], { seed: 'flank' })).count, 0, 'the fold alone');
});

test('a dome that the map cuts, with its middle on the map or beyond it', () => {
  for (const y of [2560 - 100, 2560 + 80]) {
    const drawn = drawRises(grid, [dome(1300, y, 260, 30)], { seed: 'cut' });
    for (const turned of [drawn, mirrored(drawn), exchanged(drawn)]) {
      const { labels, count } = findDomes(turned);
      assert.equal(count, 1, `middle at ${y} nm`);
      const cut = turned.mask.reduce((sum, value) => sum + value, 0);
      assertClose(labels.filter((value) => value === 1).length, cut, 0.06);
    }
  }
  assert.equal(findDomes(drawRises(grid, [ridge(-500, 2540, 3100, 2540, 60, 10)])).count, 0, 'a fold along the border');
  assert.equal(findDomes(drawRises(grid, [patch(1300, 2560, 260, 2)])).count, 0, 'a patch at the border');
});
