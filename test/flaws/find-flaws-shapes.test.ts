/** The whole of the two stages on things drawn in nanometres: what touches what, at the border, on dark ground, on square and on long pixels. */
import assert from 'node:assert/strict';
import { test } from 'node:test';
import { findFlaws } from '../../src/flaws/find-flaws.ts';
import type { Flaw, FlawCause, Flaws } from '../../src/flaws/flaws.ts';
import { levelGround } from '../../src/ground/level-ground.ts';
import { seededRandom } from '../../src/stats/random.ts';
import { createRecipe, createSample } from '../fixtures/create-sample.ts';
import type { RecipeChanges } from '../fixtures/create-sample.ts';
import { dome, patch, ridge } from '../fixtures/draw-rises.ts';
import type { Rise, RiseGrid } from '../fixtures/draw-rises.ts';

const layerNm = 0.333;
const stepDecades = 0.55;
const square: RiseGrid = { columns: 150, rows: 150, pitchXM: 20e-9, pitchYM: 20e-9 };
/** The same 3 µm × 3 µm. */
const long: RiseGrid = { columns: 200, rows: 120, pitchXM: 15e-9, pitchYM: 25e-9 };

interface Drawing {
  readonly grid?: RiseGrid;
  readonly seed?: string;
  /** Layers over the thinnest terrace, whose current is 1 nA; the ladder's two lowest rungs by default. */
  readonly layers?: (x: number, y: number) => number;
  /** Steps of the conductor under the barrier, layers. */
  readonly conductor?: (x: number, y: number) => number;
  /** Rises that block, and films: rises that cost decades. */
  readonly blocking?: readonly Rise[];
  readonly films?: readonly { readonly rise: Rise; readonly decades: number }[];
  /** Where a needle of current goes through, nm. */
  readonly shorts?: (c: number, r: number) => boolean;
  readonly channels?: 'both' | 'height' | 'current';
  readonly turn?: 'mirrored' | 'exchanged';
  readonly changes?: RecipeChanges;
}

const halves = (x: number): number => (x < 1800 ? 0 : 1);

function find(drawing: Drawing): { flaws: Flaws; at: (x: number, y: number) => Flaw | undefined } {
  const { grid = square, layers = halves, conductor = () => 0, channels = 'both' } = drawing;
  const { columns, rows, pitchXM, pitchYM } = grid;
  const random = seededRandom(drawing.seed ?? 'shapes');
  const heightM = new Float32Array(columns * rows);
  const currentA = new Float32Array(columns * rows);
  for (let r = 0, i = 0; r < rows; r++) {
    const line = 0.15 * random.normal();
    for (let c = 0; c < columns; c++, i++) {
      const [x, y] = [(c + 0.5) * pitchXM * 1e9, (r + 0.5) * pitchYM * 1e9];
      const rise = (things: readonly Rise[]): number => Math.max(0, ...things.map((thing) => thing(x, y)));
      const blocked = rise(drawing.blocking ?? []);
      let filmNm = 0;
      let decades = 0;
      for (const film of drawing.films ?? []) {
        if (film.rise(x, y) <= 0) continue;
        filmNm = film.rise(x, y);
        decades = film.decades;
      }
      heightM[i] = 1e-9 * (layerNm * (layers(x, y) + conductor(x, y)) + Math.max(blocked, filmNm) + 0.004 * x - 0.002 * y + line + 0.08 * random.normal());
      const carried = blocked > 0.1 ? 0 : 10 ** (-9 - stepDecades * layers(x, y) - decades + 0.05 * random.normal());
      currentA[i] = (drawing.shorts?.(c, r) ? 1e-8 : Math.min(1e-8, carried)) + 3e-14 * random.normal();
    }
  }
  const exchanged = (values: Float32Array): Float32Array => Float32Array.from({ length: values.length }, (_, i) => values[(i % rows) * columns + Math.floor(i / rows)]!);
  const mirrored = (values: Float32Array): Float32Array => values.map((_, i) => values[i - (i % columns) + columns - 1 - (i % columns)]!);
  const turn = drawing.turn === 'mirrored' ? mirrored : drawing.turn === 'exchanged' ? exchanged : (values: Float32Array) => values;
  const recipe = createRecipe(drawing.changes ?? {});
  const sample = createSample({
    ...(drawing.turn === 'exchanged' ? { columns: rows, rows: columns, pitchXM: pitchYM, pitchYM: pitchXM } : grid), biasV: 5.9,
    ...(channels === 'current' ? {} : { heightM: turn(heightM) }), ...(channels === 'height' ? {} : { currentA: turn(currentA) }),
  });
  const ground = levelGround(sample, recipe.ground, recipe.scan, layerNm * 1e-9);
  const flaws = findFlaws(ground, sample.grid, sample.footprint, recipe.flaws, { layerM: layerNm * 1e-9, layerDecades: stepDecades, shortMaxM2: 0.02e-12, terraceMinM2: 0.25e-12 });
  const place = (x: number, y: number): number => {
    const [c, r] = [Math.floor(x / (pitchXM * 1e9)), Math.floor(y / (pitchYM * 1e9))];
    return drawing.turn === 'exchanged' ? c * rows + r : drawing.turn === 'mirrored' ? r * columns + columns - 1 - c : r * columns + c;
  };
  return { flaws, at: (x, y) => flaws.list[flaws.labels.data[place(x, y)]! - 1] };
}

const counts = ({ list }: Flaws): Partial<Record<FlawCause, number>> => {
  const found: Partial<Record<FlawCause, number>> = {};
  for (const flaw of list) found[flaw.cause] = (found[flaw.cause] ?? 0) + 1;
  return found;
};
const reasons = ({ list }: Flaws): string => list.map((flaw) => `${flaw.pixels} px: ${flaw.reason}`).join('; ');

const anchor = dome(500, 500, 220, 26);

for (const seed of ['a', 'b']) {
  test(`a step of the conductor by whole layers under an unchanged current is no flaw, seed ${seed}`, () => {
    for (const graphite of [1, 2, 3, 6]) {
      const { flaws } = find({ seed, blocking: [anchor], conductor: (x, y) => (y + 0.4 * x > 2600 ? graphite : 0) });
      assert.deepEqual(counts(flaws), { bubble: 1 }, `${graphite} layers: ${reasons(flaws)}`);
    }
  });

  test(`a terrace, however small, is none where height and current rise and fall by as many layers, seed ${seed}`, () => {
    for (const up of [1, 2]) {
      const { flaws } = find({ seed, blocking: [anchor], layers: (x, y) => halves(x) + (Math.hypot(x - 900, y - 2000) < 330 ? up : 0) });
      assert.deepEqual(counts(flaws), { bubble: 1 }, `${up} layers: ${reasons(flaws)}`);
    }
  });

  test(`a film fits no number of layers: residue, one thing, also where its current alone would be that of a terrace, seed ${seed}`, () => {
    for (const [peakNm, decades] of [[1.5, 0.8], [2.5, 1.65], [2.5, 1.9], [3, 2.2]] as const) {
      const { flaws, at } = find({ seed, blocking: [anchor], films: [{ rise: patch(900, 2000, 220, peakNm), decades }] });
      assert.deepEqual(counts(flaws), { bubble: 1, residue: 1 }, `${peakNm} nm, ${decades} decades: ${reasons(flaws)}`);
      assert.match(at(900, 2000)!.reason, /a film/);
    }
  });
}

for (const [name, blocking, places] of [
  ['two bubbles that touch', [dome(800, 1400, 260, 28), dome(1280, 1400, 240, 26)], [[800, 1400, 'bubble'], [1280, 1400, 'bubble']]],
  ['a ridge through a bubble', [dome(1000, 1400, 280, 32), ridge(200, 1400, 2300, 1400, 40, 7)], [[1000, 1400, 'bubble'], [450, 1400, 'wrinkle'], [1800, 1400, 'wrinkle']]],
  ['a bubble cut by the left border', [dome(60, 1400, 280, 30)], [[60, 1400, 'bubble']]],
  ['a bubble cut by the upper border', [dome(1000, 40, 280, 30)], [[1000, 40, 'bubble']]],
  ['a bubble in a corner', [dome(2960, 2960, 280, 30)], [[2960, 2960, 'bubble']]],
] as readonly (readonly [string, readonly Rise[], readonly (readonly [number, number, FlawCause])[]])[]) {
  for (const grid of [square, long]) {
    test(`${name}, ${grid.columns} × ${grid.rows}, also mirrored and with the axes exchanged`, () => {
      for (const turn of [undefined, 'mirrored', 'exchanged'] as const) {
        const { flaws, at } = find({ grid, blocking, ...(turn ? { turn } : {}), changes: turn === 'exchanged' ? { ground: { wear: false } } : {} });
        const found = places.map(([x, y]) => at(x, y));
        assert.deepEqual(found.map((flaw) => flaw?.cause), places.map(([, , cause]) => cause), `${turn}: ${reasons(flaws)}`);
        assert.equal(new Set(found).size, places.length, 'each a flaw of its own');
        assert.equal(flaws.list.length, places.length, `${turn}: ${reasons(flaws)}`);
        for (const flaw of found) assert.equal(flaw!.touchesEdge, name.includes('border') || name.includes('corner'));
      }
    });
  }
}

test('a film beside a bubble is parted from it', () => {
  for (const grid of [square, long]) {
    const { flaws, at } = find({ grid, blocking: [dome(800, 1400, 260, 30)], films: [{ rise: patch(1150, 1400, 150, 2), decades: 1.9 }] });
    assert.deepEqual([at(800, 1400)?.cause, at(1200, 1400)?.cause], ['bubble', 'residue'], reasons(flaws));
    assert.equal(flaws.list.length, 2, reasons(flaws));
  }
});

test('on a terrace at the floor a bubble is found by its height, and the terrace is none', () => {
  for (const seed of ['a', 'b']) {
    // At 8 layers the current is at the floor.
    const { flaws, at } = find({ seed, layers: (x) => (x < 1000 ? 5 : x < 1700 ? 6 : 8), blocking: [dome(2350, 1500, 260, 30)] });
    assert.equal(at(2350, 1500)?.cause, 'bubble', reasons(flaws));
    assert.deepEqual(counts(flaws), { bubble: 1 }, reasons(flaws));
  }
});

test('a short of one pixel', () => {
  for (const grid of [square, long]) {
    const { flaws, at } = find({ grid, blocking: [anchor], shorts: (c, r) => c === Math.floor(2407e-9 / grid.pitchXM) && r === Math.floor(2007e-9 / grid.pitchYM) });
    assert.deepEqual([at(2407, 2007)?.cause, at(2407, 2007)?.pixels], ['short', 1]);
    assert.deepEqual(counts(flaws), { bubble: 1, short: 1 }, reasons(flaws));
  }
});

test('height alone: bubbles and ridges by their shape, terraces none; nothing that only a current can tell', () => {
  for (const grid of [square, long]) {
    const { flaws, at } = find({ grid, channels: 'height', blocking: [dome(700, 1400, 260, 28), ridge(1300, 600, 2600, 600, 40, 7)], films: [{ rise: patch(900, 2300, 170, 2.6), decades: 1.9 }] });
    assert.deepEqual([at(700, 1400)?.cause, at(1950, 600)?.cause, at(900, 2300)?.cause], ['bubble', 'wrinkle', 'residue'], reasons(flaws));
    assert.deepEqual(counts(flaws), { bubble: 1, wrinkle: 1, residue: 1 }, reasons(flaws));
    assert.ok(flaws.list.every((flaw) => Number.isNaN(flaw.log10Current)));
    assert.equal(flaws.drop, undefined);
  }
});

test('current alone: shorts and open spots, terraces none, and no height is made up', () => {
  for (const grid of [square, long]) {
    const { flaws, at } = find({ grid, channels: 'current', blocking: [dome(700, 1400, 150, 28)], shorts: (c, r) => Math.hypot(c - 40, r - 90) < 1.5 });
    assert.deepEqual(counts(flaws), { short: 1, open: 1 }, reasons(flaws));
    assert.equal(at(700, 1400)?.cause, 'open');
    assert.ok(flaws.list.every((flaw) => Number.isNaN(flaw.peakM) && Number.isNaN(flaw.volumeM3)));
    assert.equal(flaws.rise, undefined);
  }
});
