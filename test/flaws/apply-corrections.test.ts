import assert from 'node:assert/strict';
import { test } from 'node:test';
import { evaluate } from '../../src/evaluate/evaluate.ts';
import { applyCorrections } from '../../src/flaws/apply-corrections.ts';
import type { CorrectionEntry } from '../../src/flaws/correction-recipe.ts';
import type { Flaw, Flaws } from '../../src/flaws/flaws.ts';
import { labelComponents } from '../../src/grid/label-components.ts';
import type { Grid } from '../../src/grid/maps.ts';
import { labelMap, maskMap } from '../../src/grid/maps.ts';
import type { Ground } from '../../src/ground/ground.ts';
import type { Sample } from '../../src/read/sample.ts';
import { measureRegions } from '../../src/flaws/measure.ts';
import { flawOf } from '../../src/flaws/flaw-of.ts';
import { squaredDistance } from '../../src/grid/distance.ts';
import { seededRandom } from '../../src/stats/random.ts';
import { assertClose } from '../fixtures/assert-close.ts';
import { createRecipe } from '../fixtures/create-sample.ts';
import type { RecipeChanges } from '../fixtures/create-sample.ts';
import { createScene, flipped, threeTerraces, typicalThings } from '../fixtures/create-scene.ts';

const pitchUm = 0.1;
const noGround: Ground = { warnings: [] } as unknown as Ground;

/** Flaws drawn as letters, one letter one flaw: b, B bubble; r, R residue; w wrinkle; s short; o open. Pitch 0.1 µm. */
function drawn(...lines: string[]): { flaws: Flaws; grid: Grid; footprint: ReturnType<typeof maskMap> } {
  const grid: Grid = { columns: lines[0]!.length, rows: lines.length, pitchXM: pitchUm * 1e-6, pitchYM: pitchUm * 1e-6 };
  const text = lines.join('');
  const letters = [...new Set(text)].filter((letter) => !'.#'.includes(letter));
  const labels = Uint32Array.from(text, (letter) => letters.indexOf(letter) + 1);
  const mask = Uint8Array.from(labels, (label) => Math.min(1, label));
  const causes = { b: 'bubble', r: 'residue', w: 'wrinkle', s: 'short', o: 'open' } as const;
  const list = letters.length === 0 ? [] : measureRegions({ ...grid, labels, count: letters.length, distance2: squaredDistance(mask, grid.columns, grid.rows) })
    .map((region, k) => flawOf(region, k + 1, { cause: causes[letters[k]!.toLowerCase() as 'b'], confidence: 0.7, reason: `found: ${letters[k]}` }));
  // # is beyond the footprint.
  return { flaws: { labels: labelMap(grid, labels), list, warnings: [] }, grid, footprint: maskMap(grid, Uint8Array.from(text, (letter) => (letter === '#' ? 0 : 1))) };
}

function corrected(lines: string[], ...corrections: CorrectionEntry[]): Flaws {
  const { flaws, grid, footprint } = drawn(...lines);
  const before = flaws.labels.data.slice();
  const after = applyCorrections(flaws, corrections, noGround, grid, footprint);
  assert.deepEqual(flaws.labels.data, before, 'what is given is not changed');
  assertConsistent(after, grid, footprint.data);
  return after;
}

/** Labels and list tell the same story, and only the footprint has flaws. */
function assertConsistent(flaws: Flaws, grid: Grid, footprint: Uint8Array): void {
  const pixels = new Uint32Array(flaws.list.length + 1);
  flaws.labels.data.forEach((label, i) => {
    if (label > 0 && footprint[i] === 0) assert.fail(`pixel ${i} lies beyond the footprint`);
    pixels[label]!++;
  });
  flaws.list.forEach((flaw, k) => {
    assert.equal(flaw.flaw, k + 1);
    assert.ok(flaw.pixels > 0);
    assert.equal(flaw.pixels, pixels[flaw.flaw]);
    assertClose(flaw.areaM2, flaw.pixels * grid.pitchXM * grid.pitchYM, 1e-9);
    assert.ok(flaw.confidence >= 0.5 && flaw.confidence <= 1);
  });
}

/** The labels as text, 0 as a point. */
function shown({ labels }: Flaws): string[] {
  const [rows, columns] = labels.shape as [number, number];
  return Array.from({ length: rows }, (_, r) => Array.from({ length: columns }, (_, c) => labels.get(r, c) || '.').join(''));
}

/** Centre of a pixel of a drawing with so many rows, µm. */
const at = (rows: number, column: number, row: number): [number, number] => [(column + 0.5) * pitchUm, (rows - row - 0.5) * pitchUm];
const point = (rows: number, column: number, row: number) => {
  const [xUm, yUm] = at(rows, column, row);
  return { xUm, yUm };
};

test('reclassify: cause, confidence 1 and a reason that says so; extent and measurements stay', () => {
  const lines = ['bb..', 'bb.r', '...r'];
  const after = corrected(lines, { kind: 'reclassify', ...point(3, 0, 1), cause: 'residue' });
  const before = drawn(...lines).flaws;
  assert.deepEqual(after.list[0], { ...before.list[0], cause: 'residue', confidence: 1, reason: 'set by hand: residue', byHand: true });
  assert.deepEqual(after.list[1], before.list[1]);
  assert.deepEqual(after.labels.data, before.labels.data);
  assert.deepEqual([after.warnings, after.corrections], [[], { given: 1, applied: 1 }]);
});

test('a point beside the flaw means the nearest within two pixels, or within the stated reach', () => {
  const lines = ['b....r'];
  assert.equal(corrected(lines, { kind: 'reclassify', ...point(1, 2, 0), cause: 'wrinkle' }).list[0]!.cause, 'wrinkle');
  assert.equal(corrected(lines, { kind: 'reclassify', ...point(1, 3, 0), cause: 'wrinkle' }).list[1]!.cause, 'wrinkle');
  assert.equal(corrected(lines, { kind: 'dismiss', ...point(1, 2, 0), radiusUm: 0.11 }).corrections?.applied, 0);
  assert.equal(corrected(['b.......r'], { kind: 'dismiss', ...point(1, 4, 0) }).corrections?.applied, 0);
  assert.equal(corrected(['b.......r'], { kind: 'dismiss', ...point(1, 3, 0), radiusUm: 0.31 }).list[0]!.cause, 'residue');
});

test('dismiss: pixels are free, numbers close up', () => {
  const after = corrected(['bb.r', '....', 'w.ss'], { kind: 'dismiss', ...point(3, 3, 0) });
  assert.deepEqual(shown(after), ['11..', '....', '2.33']);
  assert.deepEqual(after.list.map(({ cause }) => cause), ['bubble', 'wrinkle', 'short']);
});

test('merge: one flaw with the pixels of all, measured again', () => {
  const after = corrected(['bb..BBB', 'r......'], { kind: 'merge', pointsUm: [at(2, 5, 0), at(2, 0, 0)] });
  assert.deepEqual(shown(after), ['11..111', '2......']);
  assert.equal(after.list[0]!.pixels, 5);
  assertClose(after.list[0]!.xM, (0.05 + 0.15 + 0.45 + 0.55 + 0.65) / 5 * 1e-6, 1e-9);
  assert.match(after.list[0]!.reason, /^merged by hand: /);
});

test('merge: a class set by hand stays, so does that of a short; points on one flaw change nothing and are no fault', () => {
  const set: CorrectionEntry = { kind: 'reclassify', ...point(1, 0, 0), cause: 'residue' };
  const both: CorrectionEntry = { kind: 'merge', pointsUm: [at(1, 3, 0), at(1, 0, 0)] };
  const byHand = corrected(['b..BBB'], set, both).list;
  assert.deepEqual(byHand.map(({ cause, confidence, pixels, reason }) => [cause, confidence, pixels, reason]), [['residue', 1, 4, 'set by hand: residue']]);
  assert.equal(corrected(['s..bbb'], both).list[0]!.cause, 'short');
  const one = corrected(['bbbb'], both);
  assert.deepEqual([one.list.length, one.corrections, one.warnings], [1, { given: 1, applied: 1 }, []]);
  assert.match(corrected(['b.....'], both).warnings[0]!.message, /meets fewer than two flaws/);
});

test('split: every pixel goes to the side of its centre', () => {
  const lines = ['bbbbbb', 'bbbbbb'];
  const after = corrected(lines, { kind: 'split', pointsUm: [[0.2, 0.3], [0.2, -0.1]] });
  assert.deepEqual(shown(after), ['221111', '221111']);
  assert.equal(after.list.reduce((sum, { pixels }) => sum + pixels, 0), 12);
  for (const flaw of after.list) assert.match(flaw.reason, /^split by hand: /);
  // A slanted line leaves no leak between corners.
  assert.deepEqual(shown(corrected(['bbbb', 'bbbb', 'bbbb', 'bbbb'], { kind: 'split', pointsUm: [[-0.03, -0.02], [0.45, 0.42]] })), ['1111', '1112', '1122', '2222']);
});

test('split: several parts, a bent line, a class set by hand', () => {
  assert.equal(corrected(['bbb.bbb', 'bbbbbbb', 'bbb.bbb'], { kind: 'split', pointsUm: [[-0.1, 0.1], [0.8, 0.1]] }).list.length, 3, 'the upper side falls into two');
  const bent = corrected(['bbbbb', 'bbbbb', 'bbbbb'], { kind: 'split', pointsUm: [[0.2, 0.4], [0.2, 0.1], [0.6, 0.1]] });
  assert.deepEqual(shown(bent), ['11222', '11222', '11111']);
  const set = corrected(['bbbb'], { kind: 'reclassify', ...point(1, 0, 0), cause: 'wrinkle' }, { kind: 'split', pointsUm: [[0.2, 0.2], [0.2, -0.1]] });
  assert.deepEqual(set.list.map(({ cause, confidence, reason }) => [cause, confidence, reason]), [['wrinkle', 1, 'set by hand: wrinkle'], ['wrinkle', 1, 'set by hand: wrinkle']]);
});

test('split: a line that a flaw has outgrown still parts it when it is nearly across; one that ends inside, or beside all flaws, does not', () => {
  assert.equal(corrected(['bb', 'bb', 'bb', 'bb'], { kind: 'split', pointsUm: [[0.1, 0.35], [0.1, 0.05]] }).list.length, 2);
  for (const pointsUm of [[[0.1, 0.5], [0.1, 0.2]], [[0.5, 0.5], [0.6, 0.6]]] as [number, number][][]) {
    const after = corrected(['bb', 'bb', 'bb', 'bb', 'bb', 'bb'], { kind: 'split', pointsUm });
    assert.equal(after.list.length, 1);
    assert.match(after.warnings[0]!.message, /^Correction 1 \(flaw split along a line from .*\) goes right across no flaw and changes nothing/);
  }
});

test('split parts the flaw that most of the line lies on and leaves those that it grazes', () => {
  const after = corrected(['bbbbb', 'bbbbb', '.....', 'rr...'], { kind: 'split', pointsUm: [[0.2, 0.45], [0.2, 0.08]] });
  assert.deepEqual(shown(after), ['33111', '33111', '.....', '22...']);
});

test('paint: a new flaw of its cause; what was there loses the pixels and is measured again', () => {
  const after = corrected(['rrrr', 'rrrr', '....'], { kind: 'paint', pointsUm: [at(3, 0, 1), at(3, 3, 1)], widthUm: 0.1, cause: 'open' });
  assert.deepEqual(shown(after), ['1111', '2222', '....']);
  assert.deepEqual(after.list.map(({ cause, confidence, reason, pixels }) => [cause, confidence, reason, pixels]), [
    ['residue', 0.7, 'trimmed by hand: found: r', 4], ['open', 1, 'painted by hand: open', 4],
  ]);
});

test('paint: joins flaws of the same cause that it overlaps, not those that it only touches', () => {
  const after = corrected(['bb.BB', '.....'], { kind: 'paint', pointsUm: [at(2, 1, 0), at(2, 3, 0)], widthUm: 0.05, cause: 'bubble' });
  assert.deepEqual(shown(after), ['11111', '.....']);
  assert.equal(after.list[0]!.reason, 'painted by hand in part: bubble');
  assert.equal(corrected(['bb.BB', '.....'], { kind: 'paint', pointsUm: [at(2, 2, 0)], widthUm: 0.05, cause: 'bubble' }).list.length, 3);
});

test('paint: a stroke thinner than a pixel leaves no gap, one beyond the footprint is cut off there', () => {
  const thin = corrected(['......', '......', '......'], { kind: 'paint', pointsUm: [[0.01, 0.02], [0.59, 0.28]], widthUm: 0.001, cause: 'wrinkle' });
  assert.equal(thin.list.length, 1);
  assert.equal(labelComponents(Uint8Array.from(thin.labels.data), 6, 3, 8).count, 1);
  assert.deepEqual([thin.labels.get(2, 0), thin.labels.get(0, 5), thin.labels.get(0, 0)], [1, 1, 0]);
  const cut = corrected(['..##', '..##'], { kind: 'paint', pointsUm: [at(2, 1, 0), at(2, 3, 0)], widthUm: 0.1, cause: 'short' });
  assert.deepEqual(shown(cut), ['.1..', '....']);
  const beyond = corrected(['..##', '..##'], { kind: 'paint', pointsUm: [at(2, 3, 0)], widthUm: 0.1, cause: 'short' }, { kind: 'paint', pointsUm: [[5, 5]], widthUm: 1, cause: 'short' });
  assert.deepEqual([beyond.list.length, beyond.corrections], [0, { given: 2, applied: 0 }]);
  assert.match(beyond.warnings[1]!.message, /^Correction 2 \(short painted 1 µm wide from x 5\.00, y 5\.00 µm\) covers no pixel of the footprint/);
});

test('erase: frees pixels; what comes apart is numbered apart, what is gone is gone', () => {
  const middle: CorrectionEntry = { kind: 'erase', pointsUm: [at(3, 2, 0), at(3, 2, 2)], widthUm: 0.1 };
  assert.deepEqual(shown(corrected(['wwwwww', '......', '..r...'], middle)), ['22.111', '......', '......']);
  assert.match(corrected(['b'], { kind: 'erase', pointsUm: [[0.05, 0.05]], widthUm: 0.1 }, { kind: 'erase', pointsUm: [[0.05, 0.05]], widthUm: 0.1 }).warnings[0]!.message, /^Correction 2 .* meets no flaw/);
});

test('erase does not undo a merge of flaws that lie apart', () => {
  const after = corrected(['bbb..BB'], { kind: 'merge', pointsUm: [at(1, 0, 0), at(1, 5, 0)] }, { kind: 'erase', pointsUm: [at(1, 0, 0)], widthUm: 0.1 });
  assert.deepEqual(shown(after), ['.11..11']);
});

test('polygon: fills by centres, clears with none; corners may lie beyond the map', () => {
  const ring: [number, number][] = [[0.1, 0.1], [0.3, 0.1], [0.3, 1], [0.1, 1]];
  assert.deepEqual(shown(corrected(['....', 'rrrr', '....'], { kind: 'polygon', pointsUm: ring, cause: 'bubble' })), ['.22.', '1223', '....']);
  assert.deepEqual(shown(corrected(['....', 'rrrr', '....'], { kind: 'polygon', pointsUm: ring, cause: 'none' })), ['....', '1..2', '....']);
  assert.match(corrected(['rr'], { kind: 'polygon', pointsUm: [[0.01, 0.01], [0.02, 0.01], [0.01, 0.02]], cause: 'open' }).warnings[0]!.message, /covers no pixel/);
});

test('order matters: a painted flaw can be reclassified, and painted over', () => {
  const paint: CorrectionEntry = { kind: 'paint', pointsUm: [at(1, 1, 0)], widthUm: 0.1, cause: 'bubble' };
  const set: CorrectionEntry = { kind: 'reclassify', ...point(1, 1, 0), cause: 'residue' };
  assert.deepEqual(corrected(['....'], paint, set).list.map(({ cause, reason }) => [cause, reason]), [['residue', 'set by hand: residue']]);
  const wrong = corrected(['....'], set, paint);
  assert.deepEqual(wrong.list.map(({ cause }) => cause), ['bubble']);
  assert.match(wrong.warnings[0]!.message, /^Correction 1 \(flaw at x 0\.15, y 0\.05 µm set to residue\) meets no flaw and changes nothing/);
});

test('without corrections the very same flaws', () => {
  const { flaws, grid, footprint } = drawn('bb.r');
  assert.equal(applyCorrections(flaws, [], noGround, grid, footprint), flaws);
});

for (let seed = 0; seed < 30; seed++) {
  test(`any list of corrections leaves a consistent map within the footprint, seed ${seed}`, () => {
    const random = seededRandom(`corrections ${seed}`);
    const [columns, rows] = [4 + random.integer(20), 4 + random.integer(20)];
    const letters = '.....bBrRwso##';
    const lines = Array.from({ length: rows }, () => Array.from({ length: columns }, () => letters[random.integer(letters.length)]).join(''));
    const anywhere = (): [number, number] => [pitchUm * columns * (1.2 * random.uniform() - 0.1), pitchUm * rows * (1.2 * random.uniform() - 0.1)];
    const some = (least: number): [number, number][] => Array.from({ length: least + random.integer(4) }, anywhere);
    const causes = ['bubble', 'residue', 'wrinkle', 'short', 'open'] as const;
    const cause = causes[random.integer(5)]!;
    const corrections = Array.from({ length: 12 }, (): CorrectionEntry => {
      const [xUm, yUm] = anywhere();
      switch (random.integer(7)) {
        case 0: return { kind: 'reclassify', xUm, yUm, cause };
        case 1: return { kind: 'dismiss', xUm, yUm };
        case 2: return { kind: 'merge', pointsUm: some(2) };
        case 3: return { kind: 'split', pointsUm: some(2) };
        case 4: return { kind: 'paint', pointsUm: some(1), widthUm: 0.3 * random.uniform() + 0.01, cause };
        case 5: return { kind: 'erase', pointsUm: some(1), widthUm: 0.3 * random.uniform() + 0.01 };
        default: return { kind: 'polygon', pointsUm: some(3), cause: random.uniform() < 0.5 ? 'none' : cause };
      }
    });
    const after = corrected(lines, ...corrections);
    assert.equal(after.corrections!.given, 12);
    assert.equal(after.warnings.length, 12 - after.corrections!.applied);
    // One after the other: what the first half gives, corrected by the second, is what both give together.
    const { flaws, grid, footprint } = drawn(...lines);
    const half = applyCorrections(flaws, corrections.slice(0, 6), noGround, grid, footprint);
    const whole = applyCorrections(half, corrections.slice(6), noGround, grid, footprint);
    assert.deepEqual(whole.labels.data, after.labels.data);
    whole.list.forEach((flaw, k) => {
      for (const key of ['pixels', 'areaM2', 'xM', 'yM', 'boundaryM', 'longM', 'shortM'] as const) assertClose(flaw[key], after.list[k]![key], 1e-9, key, 1e-18);
    });
  });
}

const size = 128;
const scene = createScene({ seed: 'by hand', size, layersAt: threeTerraces(size), things: typicalThings(size), tiltNm: 10, bowNm: 2 });

function find(sample: Sample, changes: RecipeChanges, corrections: readonly CorrectionEntry[]): Flaws {
  const { flaws } = evaluate(sample, createRecipe({ ...changes, corrections: corrections as never }));
  assertConsistent(flaws, sample.grid, sample.footprint.data);
  return flaws;
}

/** Centre of a pixel of the scene, µm; 20 nm pitch. */
const inScene = (c: number, r: number): [number, number] => [(c + 0.5) * 0.02, (size - r - 0.5) * 0.02];
const flawAt = (flaws: Flaws, c: number, r: number): Flaw | undefined => flaws.list[flaws.labels.data[r * size + c]! - 1];
const [bubble, other, residue] = typicalThings(size) as unknown as [{ c: number; r: number }, { c: number; r: number }, { c: number; r: number }];
const free = { c: 110, r: 20 };
const byHand: CorrectionEntry[] = [
  { kind: 'reclassify', xUm: inScene(bubble.c, bubble.r)[0], yUm: inScene(bubble.c, bubble.r)[1], cause: 'residue' },
  { kind: 'dismiss', xUm: inScene(residue.c, residue.r)[0], yUm: inScene(residue.c, residue.r)[1] },
  { kind: 'split', pointsUm: [inScene(other.c + 0.3, other.r - 14), inScene(other.c + 0.3, other.r + 14)] },
  { kind: 'paint', pointsUm: [inScene(free.c - 6, free.r), inScene(free.c + 6, free.r)], widthUm: 0.1, cause: 'wrinkle' },
];

for (const [name, changes] of [
  ['as they were', {}], ['lower thresholds', { flaws: { heightNm: 0.6, dropDecades: 0.3 } }], ['higher thresholds', { flaws: { heightNm: 1.4, dropDecades: 0.9, edgeShare: 0.6 } }],
  ['levelled by another order, without lines', { ground: { order: 1, lines: false } }], ['levelled by a high order', { ground: { order: 4 } }],
] as const) {
  test(`corrections hold: ${name}`, () => {
    const plain = find(scene.sample, changes, []);
    const after = find(scene.sample, changes, byHand);
    assert.deepEqual(after.corrections, { given: 4, applied: 4 });
    assert.deepEqual([flawAt(after, bubble.c, bubble.r)?.cause, flawAt(after, bubble.c, bubble.r)?.confidence], ['residue', 1]);
    assert.equal(flawAt(after, residue.c, residue.r), undefined);
    const [west, east] = [flawAt(after, other.c - 2, other.r), flawAt(after, other.c + 2, other.r)];
    assert.ok(west && east && west.flaw !== east.flaw);
    assert.equal(west.pixels + east.pixels, flawAt(plain, other.c, other.r)!.pixels);
    assertClose(west.volumeM3 + east.volumeM3, flawAt(plain, other.c, other.r)!.volumeM3, 1e-6);
    assert.equal(flawAt(after, free.c, free.r)?.reason, 'painted by hand: wrinkle');
  });
}

test('painted pixels are the same whatever the thresholds', () => {
  const pixels = (changes: RecipeChanges): number[] => {
    const after = find(scene.sample, changes, byHand);
    return [...after.labels.data.keys()].filter((i) => after.list[after.labels.data[i]! - 1]?.reason === 'painted by hand: wrinkle');
  };
  const own = pixels({});
  assert.ok(own.length > 40);
  assert.deepEqual(pixels({ flaws: { heightNm: 3, dropDecades: 2 }, ground: { order: 0, lines: false } }), own);
});

test('taken out of the list a correction leaves no trace', () => {
  const without = find(scene.sample, {}, byHand.filter((_, k) => k !== 0));
  const bare = find(scene.sample, {}, []);
  assert.deepEqual(flawAt(without, bubble.c, bubble.r), { ...flawAt(bare, bubble.c, bubble.r), flaw: flawAt(without, bubble.c, bubble.r)!.flaw });
});

test('the mirrored map with mirrored corrections: labels and measurements mirrored', () => {
  // From the same flaws, so that nothing but the corrections is compared: what was found is mirrored too.
  const { grid, footprint } = scene.sample;
  const found = find(scene.sample, {}, []);
  const widthUm = size * 0.02;
  const turnPoint = ([x, y]: readonly [number, number]): [number, number] => [widthUm - x, y];
  const turn = (entry: CorrectionEntry): CorrectionEntry => ('xUm' in entry ? { ...entry, xUm: widthUm - entry.xUm } : { ...entry, pointsUm: entry.pointsUm.map(turnPoint) });
  const more: CorrectionEntry[] = [...byHand, { kind: 'erase', pointsUm: [inScene(bubble.c, bubble.r - 20.2), inScene(bubble.c + 0.3, bubble.r + 20.2)], widthUm: 0.07 },
    { kind: 'polygon', pointsUm: [inScene(60.2, 60.3), inScene(90.1, 55.7), inScene(70.4, 95.2)], cause: 'open' }];
  const mirrored: Flaws = {
    ...found, labels: labelMap(grid, Uint32Array.from(found.labels.data, (_, i) => found.labels.data[i - (i % size) + size - 1 - (i % size)]!)),
    rise: flipped(found.rise!, size), drop: flipped(found.drop!, size),
  };
  const own = applyCorrections(found, more, { warnings: [] } as unknown as Ground, grid, footprint);
  const turned = applyCorrections(mirrored, more.map(turn), { warnings: [] } as unknown as Ground, grid, footprint);
  const back = Uint32Array.from(turned.labels.data, (_, i) => turned.labels.data[i - (i % size) + size - 1 - (i % size)]!);
  // Parts are numbered in raster order, so the numbers of equal areas may differ; the flaws that a pixel and its twin belong to may not.
  own.labels.data.forEach((label, i) => {
    assert.equal(label === 0, back[i] === 0, `pixel ${i}`);
    const [one, two] = [own.list[label - 1], turned.list[back[i]! - 1]];
    if (!one || !two) return;
    if (one.cause !== two.cause || one.pixels !== two.pixels || one.reason !== two.reason) assert.fail(`pixel ${i}: ${JSON.stringify([one, two])}`);
  });
  assert.equal(own.corrections!.applied, more.length);
});

test('what is measured again agrees with what was measured at first', () => {
  const found = find(scene.sample, {}, []);
  // A dot painted where the flaw is already changes no pixel, but has it measured again.
  for (const { c, r, cause } of [{ ...bubble, cause: 'bubble' }, { ...other, cause: 'bubble' }, { ...residue, cause: 'residue' }] as const) {
    const again = flawAt(find(scene.sample, {}, [{ kind: 'paint', pointsUm: [inScene(c, r)], widthUm: 0.02, cause }]), c, r)!;
    const before = flawAt(found, c, r)!;
    assert.equal(again.reason, `painted by hand in part: ${cause}`);
    for (const [key, value] of Object.entries(before)) {
      // A round flaw has no direction.
      if (key === 'angleDeg' && before.longM < 1.001 * before.shortM) continue;
      if (typeof value === 'number' && key !== 'confidence' && key !== 'flaw') assertClose(again[key as 'xM'], value, 1e-9, key);
      if (key === 'touchesEdge') assert.equal(again.touchesEdge, value);
    }
  }
});

test('a split bubble is classed anew from its halves, with height', () => {
  const after = find(scene.sample, {}, [byHand[2]!]);
  const west = flawAt(after, other.c - 2, other.r)!;
  assert.match(west.reason, /^split by hand: .*(bubble|residue|wrinkle)/);
  assert.ok(west.peakM > 10e-9 && Number.isFinite(west.log10Current));
});
