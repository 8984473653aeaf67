import assert from 'node:assert/strict';
import { test } from 'node:test';
import { partKinds } from '../../src/flaws/measure.ts';
import { partRegions } from '../../src/flaws/part-regions.ts';
import type { Parts } from '../../src/flaws/part-regions.ts';
import { squaredDistance } from '../../src/grid/distance.ts';
import { dome, drawRises, exchanged, mirrored, patch, ridge } from '../fixtures/draw-rises.ts';
import type { DrawnRises, Rise } from '../fixtures/draw-rises.ts';

const grid = { columns: 128, rows: 128, pitchXM: 20e-9, pitchYM: 20e-9 };
/** The same ground on pixels three times as long as wide. */
const flat = { columns: 222, rows: 74, pitchXM: 11.53e-9, pitchYM: 34.6e-9 };

/** The mask is the stage's to change, so it gets its own. */
const part = (drawn: DrawnRises): Parts => partRegions({ ...drawn, mask: drawn.mask.slice() });
const kindAt = (parts: Parts, i: number): string | undefined => Object.entries(partKinds).find(([, code]) => code === parts.kind[parts.labels[i]!])?.[0];

function assertConsistent(drawn: DrawnRises, { labels, count, kind, distance2 }: Parts): void {
  assert.equal(kind.length, count + 1);
  const seen = new Set(labels.filter((label) => label > 0));
  assert.equal(seen.size, count, 'numbered without gaps');
  labels.forEach((label, i) => { if (label > count || (label > 0 && drawn.mask[i] === 0)) assert.fail(`label ${label} at ${i}`); });
  const { columns, rows, pitchXM, pitchYM } = drawn;
  assert.deepEqual(distance2, squaredDistance(labels.map((label) => (label > 0 ? 1 : 0)) as unknown as Uint8Array, columns, rows, { pitchX: pitchXM, pitchY: pitchYM }));
}

/** Things and a place on each, in nm; all lie on 2560 nm × 2560 nm. */
const scenes: Record<string, { things: Rise[]; at: readonly (readonly [x: number, y: number, ridge: boolean])[] }> = {
  'a dome alone': { things: [dome(1280, 1280, 300, 35)], at: [[1280, 1280, false]] },
  'a ridge alone': { things: [ridge(500, 900, 2000, 1500, 40, 7)], at: [[1250, 1200, true]] },
  'a ridge through a bubble': { things: [dome(1280, 1280, 300, 35), ridge(300, 1280, 2300, 1280, 40, 7)], at: [[1280, 1280, false], [600, 1280, true], [2000, 1280, true]] },
  'two bubbles that touch': { things: [dome(950, 1280, 280, 30), dome(1480, 1280, 260, 28)], at: [[950, 1280, false], [1480, 1280, false]] },
  'three bubbles in a row': { things: [dome(700, 1280, 280, 30), dome(1240, 1280, 270, 30), dome(1780, 1280, 280, 30)], at: [[700, 1280, false], [1240, 1280, false], [1780, 1280, false]] },
  'a film beside a bubble': { things: [dome(950, 1280, 280, 30), patch(1400, 1280, 260, 2)], at: [[950, 1280, false], [1480, 1280, false]] },
};

for (const [name, { things, at }] of Object.entries(scenes)) {
  for (const seed of ['a', 'b']) {
    test(`${name}: each thing has a part of its own kind, on square and on long pixels, mirrored and exchanged, seed ${seed}`, () => {
      for (const on of [grid, flat]) {
        const drawn = drawRises(on, things, { seed });
        const width = on.columns * on.pitchXM * 1e9;
        for (const [turned, place] of [
          [drawn, (x: number, y: number) => [x, y] as const],
          [mirrored(drawn), (x: number, y: number) => [width - x, y] as const],
          [exchanged(drawn), (x: number, y: number) => [y, x] as const],
        ] as const) {
          const parts = part(turned);
          assertConsistent(turned, parts);
          const found = at.map(([x, y, isRidge]) => {
            const i = turned.at(...place(x, y));
            assert.equal(kindAt(parts, i) === 'ridge', isRidge, `${x}, ${y} is ${kindAt(parts, i)}, ${on.columns} × ${on.rows}`);
            return parts.labels[i]!;
          });
          assert.ok(!found.includes(0));
          assert.equal(new Set(found).size, at.length, `${found}, ${on.columns} × ${on.rows}`);
        }
      }
    });
  }
}

test('labels of mirrored and exchanged maps agree: what is together stays together', () => {
  const drawn = drawRises(flat, [dome(700, 700, 280, 30), dome(1240, 700, 270, 30), patch(1900, 700, 260, 2), ridge(300, 1800, 2300, 1900, 40, 7), dome(1300, 1850, 250, 26)]);
  const own = part(drawn);
  const { columns, rows } = drawn;
  for (const [name, turned, index] of [
    ['mirrored', mirrored(drawn), (c: number, r: number) => r * columns + columns - 1 - c],
    ['exchanged', exchanged(drawn), (c: number, r: number) => c * rows + r],
  ] as const) {
    const other = part(turned);
    assert.equal(other.count, own.count, name);
    // Each part has one partner; only pixels where parts meet may change sides.
    const together = new Map<string, number>();
    for (let r = 0; r < rows; r++) for (let c = 0; c < columns; c++) {
      const key = `${own.labels[r * columns + c]} ${other.labels[index(c, r)]}`;
      together.set(key, (together.get(key) ?? 0) + 1);
    }
    const largest = [...together.values()].sort((a, b) => b - a).slice(0, own.count + 1);
    assert.ok(columns * rows - largest.reduce((sum, n) => sum + n, 0) <= 40, `${name}: ${columns * rows - largest.reduce((sum, n) => sum + n, 0)} pixels differ`);
  }
});

test('nothing to part, and all of the map as one', () => {
  const empty = drawRises(grid, []);
  const none = part(empty);
  assert.deepEqual([none.count, none.labels.some((label) => label > 0)], [0, false]);
  const all = { ...empty, mask: new Uint8Array(empty.mask.length).fill(1) };
  assertConsistent(all, part(all));
});
