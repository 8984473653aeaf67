/** The ledger's rules on small invented scans, carried through the whole chain. */
import assert from 'node:assert/strict';
import { test } from 'node:test';
import type { Appraisal } from '../../src/evaluate/appraisal.ts';
import { evaluate } from '../../src/evaluate/evaluate.ts';
import { causes } from '../../src/ledger/ledger.ts';
import type { Cause } from '../../src/ledger/ledger.ts';
import { assertClose } from '../fixtures/assert-close.ts';
import { createRecipe, createSample } from '../fixtures/create-sample.ts';
import type { RecipeChanges } from '../fixtures/create-sample.ts';
import { createScene, saturationA, threeTerraces, typicalThings } from '../fixtures/create-scene.ts';
import type { Scene, SceneSpec, Thing } from '../fixtures/create-scene.ts';

const size = 128;
const biasV = 5.9;
const anchored: RecipeChanges = { stack: { biasV: 4 }, barrier: { referenceLayers: 11 } };
/** One pixel in µm². */
const pixelUm2 = 4e-4;

/** A bubble keeps a reading at zero current on every map. */
const bubble: Thing = { kind: 'bubble', c: 100, r: 28, radiusPx: 10, peakNm: 26 };

const scene = (spec: Partial<SceneSpec>): Scene => createScene({ seed: 'rules', size, things: [bubble], ...spec });
const even = scene({});
const typical = scene({ layersAt: threeTerraces(size), things: typicalThings(size) });

/** Appraises maps after `change` has been at them. */
function appraise(made: Scene, changes: RecipeChanges = anchored, change: (maps: { heightM: Float32Array; currentA: Float32Array }) => void = () => {}, spec: object = {}): Appraisal {
  const maps = { heightM: made.heightM.slice(), currentA: made.currentA.slice() };
  change(maps);
  return evaluate(createSample({ columns: size, rows: size, biasV, ...maps, ...spec }), createRecipe(changes));
}

const causeAt = (appraisal: Appraisal, c: number, r: number): Cause => causes[appraisal.ledger.codes.data[r * size + c]!]!;
const row = (appraisal: Appraisal, cause: Cause) => appraisal.ledger.rows[causes.indexOf(cause) - 1]!;
const codes = (appraisal: Appraisal) => appraisal.warnings.map(({ code }) => code);

/** Every pixel within a square around (c, r), as indices. */
function square(c: number, r: number, half: number): number[] {
  const found: number[] = [];
  for (let y = r - half; y <= r + half; y++) for (let x = c - half; x <= c + half; x++) found.push(y * size + x);
  return found;
}

test('a typical scene: every cause where it was put, usable within 2 % of the truth', () => {
  const made = scene({ layersAt: threeTerraces(size), things: typicalThings(size), tiltNm: 10, bowNm: 2, lineNm: 0.2 });
  const appraisal = appraise(made);
  const truth = made.things.reduce((sum, thing, i) => sum + (thing === '' && made.layers[i] === 11 ? 1 : 0), 0) / size ** 2;
  assert.ok(Math.abs(appraisal.ledger.usable.share - truth) < 0.02, `${appraisal.ledger.usable.share} for ${truth}`);
  for (const thing of typicalThings(size)) {
    const cause = { bubble: 'bubble', residue: 'residue', ridge: 'wrinkle', pinhole: 'short', dead: 'open' }[thing.kind];
    assert.equal(causeAt(appraisal, thing.c, thing.r), cause);
  }
  assert.equal(causeAt(appraisal, 3, 3), 'thin');
  assert.equal(causeAt(appraisal, size - 4, 60), 'thick');
  const { usable, footprintM2 } = appraisal.ledger;
  assert.ok(usable.low95M2 <= usable.areaM2 && usable.areaM2 <= usable.high95M2 && usable.high95M2 <= footprintM2 && usable.low95M2 > 0);
  assert.ok(usable.largestPatchM2 <= usable.areaM2 && usable.largestPatchM2 > 0);
  assert.equal(usable.meaning, 'usable');
  assertClose(appraisal.ledger.glow.data[60 * size + 64]!, 1, 1e-6, 'glow on the reference');
  assert.equal(appraisal.ledger.glow.data[typicalThings(size)[0]!.r * size + typicalThings(size)[0]!.c], 0);
});

test('a short inside a bubble is a short', () => {
  const appraisal = appraise(even, anchored, ({ currentA }) => square(bubble.c, bubble.r, 1).forEach((i) => { currentA[i] = saturationA; }));
  for (const i of square(bubble.c, bubble.r, 1)) assert.equal(causes[appraisal.ledger.codes.data[i]!], 'short');
  assert.equal(causeAt(appraisal, bubble.c + 4, bubble.r), 'bubble');
  assert.equal(causeAt(appraisal, bubble.c, bubble.r - 5), 'bubble');
});

test('a small saturated spot is a short, large saturated ground is thin with only a bound', () => {
  const appraisal = appraise(even, anchored, ({ currentA }) => {
    square(30, 30, 2).forEach((i) => { currentA[i] = saturationA; });
    square(64, 90, 10).forEach((i) => { currentA[i] = saturationA; });
  });
  for (const i of square(30, 30, 2)) assert.equal(causes[appraisal.ledger.codes.data[i]!], 'short');
  for (const i of square(64, 90, 10)) assert.equal(causes[appraisal.ledger.codes.data[i]!], 'thin');
  assert.deepEqual([row(appraisal, 'short').pixels, row(appraisal, 'thin').pixels], [25, 441]);
  const bound = appraisal.barrier!.ladder.rungs.find((rung) => rung.bound === 'at-most');
  assert.equal(bound?.pixels, 441);
  // The limit between them is band.shortMaxUm2.
  const wide = appraise(even, { ...anchored, band: { shortMaxUm2: 0.2 } }, ({ currentA }) => square(64, 90, 10).forEach((i) => { currentA[i] = saturationA; }));
  assert.equal(row(wide, 'short').pixels, 441);
});

test('a dead spot is open, a dead terrace is thick with only a bound', () => {
  // Discs of 5 and 16 pixels' radius: 0.03 and 0.32 µm², below and above band.terraceMinUm2 of 0.25.
  const made = scene({ things: [bubble, { kind: 'dead', c: 30, r: 30, radiusPx: 5 }, { kind: 'dead', c: 60, r: 90, radiusPx: 16 }] });
  const inSpot = (i: number) => made.things[i] === 'dead' && Math.floor(i / size) < 50;
  const spotPixels = [...made.things.keys()].filter(inSpot).length;
  const terracePixels = made.things.filter((thing) => thing === 'dead').length - spotPixels;
  const appraisal = appraise(made);
  assert.deepEqual([causeAt(appraisal, 30, 30), causeAt(appraisal, 60, 90)], ['open', 'thick']);
  assert.equal(row(appraisal, 'open').pixels + row(appraisal, 'thick').pixels, spotPixels + terracePixels);
  assert.ok(Math.abs(row(appraisal, 'open').pixels - spotPixels) <= 1, `${row(appraisal, 'open').pixels} for ${spotPixels}`);
  const thickest = appraisal.barrier!.ladder.rungs[appraisal.barrier!.ladder.rungs.length - 1]!;
  assert.equal(thickest.bound, 'at-least');
  assert.ok(Math.abs(thickest.pixels - terracePixels) <= 0.01 * terracePixels, `${thickest.pixels} for ${terracePixels}`);
  // The limit between them is band.terraceMinUm2.
  const fussy = appraise(made, { ...anchored, band: { terraceMinUm2: 0.4 } });
  // One pixel in 740 of white noise lies above three sigmas and so above the floor.
  assert.ok(row(fussy, 'open').pixels > 0.99 * (spotPixels + terracePixels), `${row(fussy, 'open').pixels}`);
  assert.equal(row(fussy, 'open').pixels + row(fussy, 'thick').pixels, spotPixels + terracePixels);
});

test('a spot of the wrong sign is at the floor: open', () => {
  const appraisal = appraise(even, { ...anchored, ground: { repair: false } }, ({ currentA }) => square(30, 60, 2).forEach((i) => { currentA[i] = -3e-10; }));
  for (const i of square(30, 60, 2)) {
    assert.equal(appraisal.ground.current!.floor.data[i], 1);
    assert.equal(causes[appraisal.ledger.codes.data[i]!], 'open');
  }
});

test('height alone: flaw-free; thin, thick, short and open are not assessed', () => {
  const made = scene({ things: typicalThings(size) });
  const appraisal = evaluate(createSample({ columns: size, rows: size, heightM: made.heightM }), createRecipe());
  assert.equal(appraisal.barrier, undefined);
  assert.equal(appraisal.ledger.usable.meaning, 'flaw-free');
  assert.equal(appraisal.ledger.usable.knownToGlow, false);
  for (const cause of ['short', 'open', 'thin', 'thick', 'starved'] as const) assert.deepEqual([row(appraisal, cause).assessed, row(appraisal, cause).pixels], [false, 0], cause);
  for (const cause of ['usable', 'unmeasured', 'bubble', 'residue', 'wrinkle'] as const) assert.equal(row(appraisal, cause).assessed, true, cause);
  assert.equal(causeAt(appraisal, 38, 32), 'bubble');
  assert.equal(causeAt(appraisal, 70, 51), 'wrinkle');
  assert.equal(causeAt(appraisal, 5, 120), 'usable');
  assert.match(appraisal.ledger.verdict, /free of flaws in height/);
});

test('height alone with a hole: the hole is unmeasured', () => {
  const heightM = even.heightM.slice();
  for (const i of square(30, 60, 4)) heightM[i] = Number.NaN;
  const appraisal = evaluate(createSample({ columns: size, rows: size, heightM }), createRecipe());
  assert.equal(causeAt(appraisal, 30, 60), 'unmeasured');
});

test('current alone: flaws in height are not assessed, short, open, thin and thick are', () => {
  const appraisal = evaluate(createSample({ columns: size, rows: size, currentA: typical.currentA, biasV }), createRecipe(anchored));
  for (const cause of ['bubble', 'residue', 'wrinkle'] as const) assert.deepEqual([row(appraisal, cause).assessed, row(appraisal, cause).pixels], [false, 0], cause);
  for (const cause of ['short', 'open', 'thin', 'thick'] as const) assert.equal(row(appraisal, cause).assessed, true, cause);
  assert.equal(causeAt(appraisal, 26, 96), 'short');
  assert.equal(causeAt(appraisal, 38, 32), 'open', 'what blocks the current cannot be told from a bubble');
  assert.equal(causeAt(appraisal, 3, 3), 'thin');
  assert.equal(appraisal.ledger.usable.meaning, 'usable');
});

test('missing current is unmeasured, unless a flaw in height explains it; missing height over good current is not', () => {
  const appraisal = appraise(even, anchored, ({ heightM, currentA }) => {
    square(30, 60, 4).forEach((i) => { currentA[i] = Number.NaN; });
    square(bubble.c, bubble.r, 3).forEach((i) => { currentA[i] = Number.NaN; });
    square(60, 100, 4).forEach((i) => { heightM[i] = Number.NaN; });
  });
  for (const i of square(30, 60, 2)) assert.equal(causes[appraisal.ledger.codes.data[i]!], 'unmeasured');
  assert.equal(causeAt(appraisal, bubble.c, bubble.r), 'bubble');
  for (const i of square(60, 100, 4)) assert.equal(causes[appraisal.ledger.codes.data[i]!], 'usable');
  assert.equal(row(appraisal, 'unmeasured').pixels, 81);
});

test('a run of one to three lines between agreeing neighbours is repaired, counted and booked by its repaired value', () => {
  const broken = [{ r: 60, lines: 1 as const, from: 10, to: 70, current: true }, { r: 100, lines: 2 as const, from: 30, to: 80, current: true }];
  const appraisal = appraise(scene({ broken }));
  assertClose(appraisal.ledger.repairedM2 * 1e12, (60 + 100) * pixelUm2, 1e-9);
  assert.deepEqual(['unmeasured', 'open', 'short', 'thick'].map((cause) => row(appraisal, cause as Cause).pixels), [0, 0, 0, 0]);
  assert.equal(causeAt(appraisal, 40, 60), 'usable');
  assert.equal(causeAt(appraisal, 40, 101), 'usable');
});

test('one line of missing current is repaired, three are unmeasured', () => {
  const appraisal = appraise(even, anchored, ({ currentA }) => {
    currentA.fill(Number.NaN, 60 * size + 10, 60 * size + 70);
    for (const r of [100, 101, 102]) currentA.fill(Number.NaN, r * size + 10, r * size + 70);
  });
  assertClose(appraisal.ledger.repairedM2 * 1e12, 60 * pixelUm2, 1e-9);
  assert.equal(row(appraisal, 'unmeasured').pixels, 180);
});

test('a missing line between neighbours that disagree is unmeasured, not guessed', () => {
  // The line lies on the border between 11 and 13 layers, which carry currents a decade apart.
  const made = scene({ layersAt: (_, r) => (r <= 80 ? 11 : 13) });
  const appraisal = appraise(made, anchored, ({ currentA }) => currentA.fill(Number.NaN, 80 * size + 10, 80 * size + 70));
  assert.equal(row(appraisal, 'unmeasured').pixels, 60);
  assert.equal(appraisal.ledger.repairedM2, 0);
});

test('two lines of missing current are repaired', () => {
  const appraisal = appraise(even, anchored, ({ currentA }) => {
    for (const r of [60, 61]) currentA.fill(Number.NaN, r * size + 10, r * size + 70);
  });
  assertClose(appraisal.ledger.repairedM2 * 1e12, 120 * pixelUm2, 1e-9);
  assert.equal(row(appraisal, 'unmeasured').pixels, 0);
});

test('repaired pixels outside the footprint are not counted', () => {
  const footprint = new Uint8Array(size * size).map((_, i) => (Math.floor(i / size) < 80 ? 1 : 0));
  const broken = [{ r: 60, lines: 1 as const, from: 10, to: 70, current: true }, { r: 100, lines: 1 as const, from: 30, to: 80, current: true }];
  const appraisal = appraise(scene({ broken }), anchored, undefined, { footprint });
  assertClose(appraisal.ledger.repairedM2 * 1e12, 60 * pixelUm2, 1e-9);
  assert.equal(appraisal.ledger.footprintPixels, 80 * size);
});

test('rim at the map’s border and at shorts, in µm', () => {
  const appraisal = appraise(even, { ...anchored, band: { rimUm: 0.05, shortRimUm: 0.1 } }, ({ currentA }) => square(64, 64, 0).forEach((i) => { currentA[i] = saturationA; }));
  assert.equal(row(appraisal, 'short').pixels, 1);
  const line = Array.from({ length: size }, (_, c) => causeAt(appraisal, c, 64));
  // Centres at 0.01 and 0.03 µm from the border are closer than 0.05 µm; 0.05 itself is not.
  assert.deepEqual([line.slice(0, 4), line.slice(-4)], [['rim', 'rim', 'usable', 'usable'], ['usable', 'usable', 'rim', 'rim']]);
  // From the short's edge: 0.01, 0.03 … 0.09 µm.
  assert.deepEqual(line.slice(57, 72), ['usable', 'usable', 'rim', 'rim', 'rim', 'rim', 'rim', 'short', 'rim', 'rim', 'rim', 'rim', 'rim', 'usable', 'usable']);
  assert.deepEqual([row(appraisal, 'rim').assessed, row(appraise(even), 'rim').assessed], [true, false]);
});

test('stray below band.strayMinUm2: a small island of the reference in a thicker terrace', () => {
  const layersAt = (c: number, r: number) => (c < 72 ? 11 : Math.max(Math.abs(c - 90), Math.abs(r - 90)) <= 7 ? 11 : 12);
  const made = scene({ things: [{ ...bubble, c: 30, r: 30 }], layersAt });
  // 15 × 15 pixels are 0.09 µm².
  assert.equal(causeAt(appraise(made, { ...anchored, band: { strayMinUm2: 0.08 } }), 90, 90), 'usable');
  const strict = appraise(made, { ...anchored, band: { strayMinUm2: 0.1 } });
  assert.equal(causeAt(strict, 90, 90), 'stray');
  assert.equal(causeAt(strict, 10, 90), 'usable');
  assert.equal(row(strict, 'stray').assessed, true);
  assert.equal(row(appraise(made), 'stray').assessed, false);
});

test('barrier.referenceLayers is what the reference has; the others are counted from it', () => {
  for (const referenceLayers of [7, 11]) {
    const { reference, layers, thickness, ladder } = appraise(typical, { stack: { biasV: 4 }, barrier: { referenceLayers }, band: { minNaPerUm2: 0, maxNaPerUm2: 1e12 } }).barrier!;
    assert.equal(reference.layers, referenceLayers);
    assertClose(reference.thicknessM, referenceLayers * 0.333e-9, 1e-9);
    assert.deepEqual([layers!.data[3 * size + 3], layers!.data[64 * size + 64], layers!.data[60 * size + size - 4]], [referenceLayers - 1, referenceLayers, referenceLayers + 1]);
    assertClose(thickness!.data[3 * size + 3], (referenceLayers - 1) * 0.333e-9, 1e-6);
    assert.ok(ladder.from === 'map');
  }
});

test('no bias given: one is proposed at which the reference carries the target', () => {
  const found = appraise(typical, { barrier: { referenceLayers: 11 }, stack: { targetNaPerUm2: 2 } });
  const { device, reference } = found.barrier!;
  assert.equal(device?.proposed, true);
  assert.ok(device.biasV > 0 && device.biasV < biasV, `${device.biasV}`);
  // 2 nA/µm² are 2000 A/m². The stated density is the median of an interval, the bias that of the centre of its inputs.
  assertClose(device.median, 2000, 0.1, 'density at the proposed bias');
  assert.ok(device.low95 < 2000 && device.high95 > 2000);
  assert.equal(reference.inRange, true);
  assert.match(found.ledger.verdict, /\(proposed\)/);
  const stiff = appraise(typical, { barrier: { referenceLayers: 11 }, stack: { targetNaPerUm2: 20 } }).barrier!.device!;
  assert.ok(stiff.biasV > device.biasV);
});

test('a negative bias with negated current gives the same ledger', () => {
  const plus = appraise(typical, { barrier: { referenceLayers: 11 } });
  const minus = appraise(typical, { barrier: { referenceLayers: 11 } }, ({ currentA }) => currentA.forEach((value, i) => { currentA[i] = -value; }), { biasV: -biasV });
  assert.deepEqual(minus.ledger.codes.data, plus.ledger.codes.data);
  assert.deepEqual(minus.ledger.rows, plus.ledger.rows);
  assert.equal(minus.barrier!.device!.biasV, -plus.barrier!.device!.biasV);
  assertClose(minus.barrier!.device!.median, plus.barrier!.device!.median, 1e-9);
});

test('a wide band takes every terrace in', () => {
  const narrow = appraise(typical);
  const wide = appraise(typical, { ...anchored, band: { factor: 1e6 } });
  assert.ok(row(narrow, 'thin').pixels > 1000 && row(narrow, 'thick').pixels > 1000);
  assert.equal(row(wide, 'thin').pixels, 0);
  assert.equal(row(wide, 'thick').pixels, 0);
  assert.equal(row(wide, 'usable').pixels, row(narrow, 'usable').pixels + row(narrow, 'thin').pixels + row(narrow, 'thick').pixels);
});

test('a finished stack: even current, but no layers, no thickness and no device density', () => {
  const appraisal = appraise(typical, anchored, undefined, { surface: 'stack' });
  const { layers, thickness, device, reference } = appraisal.barrier!;
  assert.deepEqual([layers, thickness, device, reference.layers, reference.thicknessM], [undefined, undefined, undefined, undefined, undefined]);
  assert.ok(codes(appraisal).includes('barrier-stack-surface'));
  assert.match(appraisal.ledger.verdict, /carries an even current/);
  assert.doesNotMatch(appraisal.ledger.verdict, /upper bound/);
  assert.match(appraise(typical).ledger.verdict, /upper bound/);
  assert.equal(causeAt(appraisal, 3, 3), 'thin');
});

test('relative units: causes are booked, a device density is neither given nor hinted at', () => {
  const appraisal = appraise(typical, anchored, ({ currentA }) => currentA.forEach((value, i) => { currentA[i] = value * 1e9; }), { unit: 'relative' });
  const { device, layers, reference } = appraisal.barrier!;
  assert.deepEqual([device, layers, reference.layers, reference.inRange], [undefined, undefined, undefined, undefined]);
  assert.equal(appraisal.ledger.usable.knownToGlow, false);
  assert.match(appraisal.ledger.verdict, /not known to glow, as no density is known/);
  assert.equal(causeAt(appraisal, 3, 3), 'thin');
  assert.equal(causeAt(appraisal, 26, 96), 'short');
  assert.equal(causeAt(appraisal, size - 4, 60), 'thick');
});

test('starved is not assessed without a sheet resistance, and is with one', () => {
  assert.equal(row(appraise(even), 'starved').assessed, false);
  const sheet = appraise(even, { ...anchored, stack: { biasV: 4, emitterSheetOhm: 1e6 } });
  assert.equal(row(sheet, 'starved').assessed, true);
});

test('the verdict says so when the reference is not known to glow', () => {
  // 1.5 V across eleven layers carries far below 0.1 nA/µm².
  const appraisal = appraise(typical, { barrier: { referenceLayers: 11 }, stack: { biasV: 1.5 } });
  assert.equal(appraisal.barrier!.reference.inRange, false);
  assert.equal(appraisal.ledger.usable.knownToGlow, false);
  assert.match(appraisal.ledger.verdict, /even, but not known to glow/);
  assert.ok(codes(appraisal).includes('reference-not-known-to-glow'));
  assert.equal(appraisal.barrier!.reference.layers, 11, 'none in range: the most common terrace');
});
