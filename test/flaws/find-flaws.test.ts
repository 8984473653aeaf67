import assert from 'node:assert/strict';
import { test } from 'node:test';
import { findFlaws } from '../../src/flaws/find-flaws.ts';
import type { FlawScale } from '../../src/flaws/find-flaws.ts';
import type { Flaw, FlawCause, Flaws } from '../../src/flaws/flaws.ts';
import { levelGround } from '../../src/ground/level-ground.ts';
import type { Sample } from '../../src/read/sample.ts';
import { assertClose } from '../fixtures/assert-close.ts';
import { createRecipe, createSample } from '../fixtures/create-sample.ts';
import type { RecipeChanges } from '../fixtures/create-sample.ts';
import { createScene, flipped, saturationA, threeTerraces, transposed, typicalThings } from '../fixtures/create-scene.ts';
import type { Thing } from '../fixtures/create-scene.ts';

const size = 128;
const pitchM = 20e-9;
const biasV = 5.9;
const scale: FlawScale = { layerM: 0.333e-9, layerDecades: 0.545, shortMaxM2: 0.02e-12, terraceMinM2: 0.25e-12 };

function find(sample: Sample, changes: RecipeChanges = {}, more: Partial<FlawScale> = {}): Flaws {
  const recipe = createRecipe(changes);
  return findFlaws(levelGround(sample, recipe.ground, recipe.scan, scale.layerM), sample.grid, sample.footprint, recipe.flaws, { ...scale, ...more });
}

const flawAt = (flaws: Flaws, c: number, r: number): Flaw | undefined => flaws.list[flaws.labels.data[r * size + c]! - 1];
const counts = (flaws: Flaws): Record<FlawCause, number> => {
  const found = { bubble: 0, residue: 0, wrinkle: 0, short: 0, open: 0 };
  for (const flaw of flaws.list) found[flaw.cause]++;
  return found;
};

/** Labels and list must tell the same story. */
function assertConsistent(flaws: Flaws): void {
  const pixels = new Map<number, number>();
  for (const label of flaws.labels.data) if (label > 0) pixels.set(label, (pixels.get(label) ?? 0) + 1);
  assert.deepEqual([...pixels.keys()].sort((a, b) => a - b), flaws.list.map((flaw) => flaw.flaw));
  flaws.list.forEach((flaw, k) => {
    assert.equal(flaw.flaw, k + 1);
    assert.equal(flaw.pixels, pixels.get(flaw.flaw));
    assertClose(flaw.areaM2, flaw.pixels * pitchM ** 2, 1e-12);
    assertClose(flaw.diameterM, 2 * Math.sqrt(flaw.areaM2 / Math.PI), 1e-12);
    assert.ok(flaw.confidence >= 0.5 && flaw.confidence <= 1, `${flaw.confidence}`);
    assert.match(flaw.reason, new RegExp(`: ${flaw.cause}(, a film)?(, could be [a-z ]+)?$`));
    assert.ok(flaw.longM >= flaw.shortM && flaw.angleDeg > -90 && flaw.angleDeg <= 90);
  });
}

/** A bubble and a ridge clear of each other, on one terrace: labels of both are beyond doubt. */
const plain: Thing[] = [
  { kind: 'bubble', c: 40, r: 30, radiusPx: 12, peakNm: 30 },
  { kind: 'ridge', c: 85, r: 85, angle: 0.4, lengthPx: 50, sigmaPx: 2, peakNm: 7 },
  { kind: 'pinhole', c: 30, r: 100, radiusPx: 1.6 },
  { kind: 'dead', c: 100, r: 30, radiusPx: 5 },
];

for (const seed of ['a', 'b', 'c']) {
  const scene = createScene({ seed, size, layersAt: threeTerraces(size), things: typicalThings(size), tiltNm: 10, bowNm: 2 });
  const flaws = find(scene.sample);

  test(`each thing is found, with its class and its reason, seed ${seed}`, () => {
    assertConsistent(flaws);
    for (const thing of typicalThings(size)) {
      const flaw = flawAt(flaws, thing.c, thing.r);
      assert.equal(flaw?.cause, { bubble: 'bubble', residue: 'residue', ridge: 'wrinkle', pinhole: 'short', dead: 'open' }[thing.kind]);
      assertClose(flaw!.xM, (thing.c + 0.5) * pitchM, 0.05);
      assertClose(flaw!.yM, (size - thing.r - 0.5) * pitchM, 0.05);
    }
    assert.equal(counts(flaws).short, 2);
    assert.equal(counts(flaws).open, 0);
  });

  test(`a bubble measured: area, peak, volume πR²h/2 of a paraboloid [F], no current, seed ${seed}`, () => {
    const [first] = typicalThings(size) as [Extract<Thing, { kind: 'bubble' }>];
    const flaw = flawAt(flaws, first.c, first.r)!;
    const radiusM = first.radiusPx * pitchM;
    assertClose(flaw.areaM2, Math.PI * radiusM ** 2, 0.05, 'area');
    assertClose(flaw.diameterM, 2 * radiusM, 0.03, 'diameter');
    assertClose(flaw.boundaryM, 2 * Math.PI * radiusM, 0.06, 'outline');
    assertClose(flaw.longM, 2 * radiusM, 0.06, 'long axis');
    assertClose(flaw.peakM, first.peakNm * 1e-9, 0.03, 'peak');
    assertClose(flaw.volumeM3, (Math.PI / 2) * radiusM ** 2 * first.peakNm * 1e-9, 0.05, 'volume');
    assertClose(flaw.meanM, flaw.peakM / 2, 0.06, 'mean of a paraboloid');
    assertClose(flaw.heightToRadius, (first.peakNm * 1e-9) / radiusM, 0.05);
    assert.match(flaw.reason, /smooth dome, h\/R 0\.1[0-9], no current: bubble$/);
    assert.equal(flaw.touchesEdge, false);
  });

  test(`mirrored maps have mirrored flaws, seed ${seed}`, () => {
    const mirrored = find(createSample({ columns: size, rows: size, biasV, heightM: flipped(scene.heightM, size), currentA: flipped(scene.currentA, size) }));
    assertConsistent(mirrored);
    // Ties between equally near pixels of the surroundings are broken by direction, so a pixel on an outline may differ.
    const before = flipped(Uint8Array.from(flaws.labels.data, (label) => (label > 0 ? 1 : 0)), size);
    let differing = 0;
    for (let i = 0; i < before.length; i++) if ((mirrored.labels.data[i]! > 0) !== (before[i] === 1)) differing++;
    assert.ok(differing <= 10, `${differing} pixels differ`);
    for (const thing of typicalThings(size)) {
      const own = flawAt(flaws, thing.c, thing.r)!;
      const other = flawAt(mirrored, size - 1 - thing.c, thing.r)!;
      assert.equal(other.cause, own.cause);
      assert.ok(Math.abs(other.pixels - own.pixels) <= 10, `${own.pixels} and ${other.pixels}`);
    }
  });

  test(`labels of well-separated flaws under flip and transpose: the same flaws, to the pixel where nothing is tied, seed ${seed}`, () => {
    const made = createScene({ seed, size, things: plain });
    // What belongs to the fast axis is off for the transposed map.
    const still: RecipeChanges = { ground: { lines: false, repair: false, wear: false } };
    const own = find(made.sample, still);
    assert.deepEqual(counts(own), { bubble: 1, residue: 0, wrinkle: 1, short: 1, open: 1 });
    for (const turn of [flipped, transposed]) {
      const turned = find(createSample({ columns: size, rows: size, biasV, heightM: turn(made.heightM, size), currentA: turn(made.currentA, size) }), still);
      assert.deepEqual(counts(turned), counts(own));
      const wanted = turn(Uint8Array.from(own.labels.data, (label) => (label > 0 ? own.list.map((flaw) => ['', 'short', 'bubble', 'wrinkle', 'open'].indexOf(flaw.cause))[label - 1]! : 0)), size);
      const found = Uint8Array.from(turned.labels.data, (label) => (label > 0 ? ['', 'short', 'bubble', 'wrinkle', 'open'].indexOf(turned.list[label - 1]!.cause) : 0));
      const differing = found.filter((value, i) => value !== wanted[i]).length;
      assert.ok(differing <= 6, `${turn.name}: ${differing} pixels differ`);
    }
  });
}

test('a ridge: long, thin, its angle against +x', () => {
  const flaws = find(createScene({ seed: 'angle', size, things: plain }).sample);
  const flaw = flawAt(flaws, 85, 85)!;
  assert.equal(flaw.cause, 'wrinkle');
  // Rows count downwards: 0.4 rad towards lower rows is −22.9° with y up.
  assert.ok(Math.abs(flaw.angleDeg + (0.4 * 180) / Math.PI) < 2, `${flaw.angleDeg}`);
  assert.ok(flaw.longM > 5 * flaw.shortM);
});

test('a bump that conducts like its surroundings is a remark, not a flaw', () => {
  const made = createScene({ seed: 'bump', size, things: plain.slice(0, 1) });
  const heightM = made.heightM.slice();
  let raised = 0;
  for (let r = 85; r < 97; r++) for (let c = 60; c < 72; c++, raised++) heightM[r * size + c]! += 3e-9;
  const flaws = find(createSample({ columns: size, rows: size, biasV, heightM, currentA: made.currentA }));
  assert.equal(flawAt(flaws, 66, 91), undefined);
  assert.deepEqual(counts(flaws), { bubble: 1, residue: 0, wrinkle: 0, short: 0, open: 0 });
  assert.deepEqual(flaws.warnings.map(({ code }) => code), ['bumps-conduct']);
  // 144 pixels of 0.0004 µm².
  assert.match(flaws.warnings[0]!.message, /0\.06 µm²/);
});

test('a step of one whole layer in height and current is barrier, not a flaw', () => {
  const made = createScene({ seed: 'step', size, things: plain.slice(0, 1), layersAt: (c) => (c < 80 ? 11 : 14), noiseNm: 0.05 });
  const flaws = find(made.sample);
  let onStep = 0;
  for (let r = 0; r < size; r++) for (let c = 77; c < 85; c++) if (flaws.labels.data[r * size + c]! > 0) onStep++;
  // Three layers are 1 nm, above flaws.heightNm of 0.8 nm.
  assert.ok(onStep < 0.02 * 8 * size, `${onStep} pixels of the step are flaws`);
});

test('height alone: raised flaws only; current alone: shorts and opens only', () => {
  const made = createScene({ seed: 'alone', size, things: plain });
  const height = find(createSample({ columns: size, rows: size, heightM: made.heightM }));
  assertConsistent(height);
  assert.deepEqual(counts(height), { bubble: 1, residue: 0, wrinkle: 1, short: 0, open: 0 });
  assert.ok(height.list.every((flaw) => Number.isNaN(flaw.log10Current) && flaw.reason.includes('current not measured')));
  const terraced = createScene({ seed: 'alone', size, things: plain, layersAt: threeTerraces(size) });
  const current = find(createSample({ columns: size, rows: size, currentA: terraced.currentA, biasV }));
  assertConsistent(current);
  assert.deepEqual([counts(current).bubble, counts(current).residue, counts(current).wrinkle, counts(current).short], [0, 0, 0, 1]);
  // The blocked ground under bubble and ridge cannot be told from dead ground.
  assert.equal(flawAt(current, 40, 30)?.cause, 'open');
  assert.ok(current.list.every((flaw) => Number.isNaN(flaw.peakM) && Number.isNaN(flaw.volumeM3)));
});

test('one saturated pixel is a short; a spot two layers brighter is, a spot of one layer is not', () => {
  const made = createScene({ seed: 'bright', size, things: plain.slice(0, 1), scatterDecades: 0.02 });
  const currentA = made.currentA.slice();
  currentA[90 * size + 30] = saturationA;
  const spot = (c: number, r: number, layers: number) => {
    for (let y = r; y < r + 3; y++) for (let x = c; x < c + 3; x++) currentA[y * size + x]! *= 10 ** (layers * scale.layerDecades);
  };
  spot(60, 90, 2.3);
  spot(90, 90, 1.2);
  const flaws = find(createSample({ columns: size, rows: size, biasV, heightM: made.heightM, currentA }));
  assert.deepEqual([flawAt(flaws, 30, 90)?.cause, flawAt(flaws, 61, 91)?.cause, flawAt(flaws, 91, 91)], ['short', 'short', undefined]);
  assert.equal(flawAt(flaws, 30, 90)!.pixels, 1);
  assert.equal(flawAt(flaws, 61, 91)!.pixels, 9);
  const three = find(createSample({ columns: size, rows: size, biasV, heightM: made.heightM, currentA }), { flaws: { shortLayers: 1 } });
  assert.equal(flawAt(three, 91, 91)?.cause, 'short');
});

test('the largest short: 49 pixels of 0.0004 µm² are within 0.02 µm², 56 are not', () => {
  const made = createScene({ seed: 'largest', size, things: plain.slice(0, 1), scatterDecades: 0.02 });
  const currentA = made.currentA.slice();
  for (let r = 90; r < 97; r++) {
    for (let c = 30; c < 37; c++) currentA[r * size + c]! *= 10 ** (2.4 * scale.layerDecades);
    for (let c = 80; c < 88; c++) currentA[r * size + c]! *= 10 ** (2.4 * scale.layerDecades);
  }
  const flaws = find(createSample({ columns: size, rows: size, biasV, heightM: made.heightM, currentA }));
  assert.deepEqual([flawAt(flaws, 33, 93)?.pixels, flawAt(flaws, 84, 93)], [49, undefined]);
});

test('thresholds: flaws.heightNm, flaws.dropDecades and flaws.minPixels decide', () => {
  const made = createScene({ seed: 'limits', size, things: [...plain.slice(0, 1), { kind: 'residue', c: 90, r: 90, radiusPx: 9, peakNm: 1.5, decades: 0.8 }] });
  assert.equal(flawAt(find(made.sample), 90, 90)?.cause, 'residue');
  assert.equal(flawAt(find(made.sample, { flaws: { heightNm: 2.5 } }), 90, 90), undefined);
  assert.equal(flawAt(find(made.sample, { flaws: { dropDecades: 1.2 } }), 90, 90), undefined);
  assert.equal(counts(find(made.sample, { flaws: { minPixels: 600 } })).bubble, 0);
});

test('a flaw at the border touches the edge; missing height takes no part', () => {
  const made = createScene({ seed: 'edge', size, things: [{ kind: 'bubble', c: 2, r: 60, radiusPx: 10, peakNm: 25 }, { kind: 'bubble', c: 80, r: 60, radiusPx: 10, peakNm: 25 }] });
  const heightM = made.heightM.slice();
  for (let r = 58; r < 63; r++) heightM.fill(Number.NaN, r * size + 78, r * size + 83);
  const flaws = find(createSample({ columns: size, rows: size, biasV, heightM, currentA: made.currentA }), { ground: { repair: false } });
  assert.equal(flawAt(flaws, 3, 60)?.touchesEdge, true);
  const holed = flawAt(flaws, 74, 60)!;
  assert.equal(holed.cause, 'bubble');
  assert.equal(holed.touchesEdge, false);
  assert.ok(Number.isFinite(holed.peakM) && Number.isFinite(holed.volumeM3));
});

test('flawless ground has no flaws, over several seeds', () => {
  for (const seed of ['p', 'q', 'r']) {
    const flaws = find(createScene({ seed, size, layersAt: threeTerraces(size) }).sample);
    assert.deepEqual(counts(flaws), { bubble: 0, residue: 0, wrinkle: 0, short: 0, open: 0 }, seed);
  }
});

test('a patch of residue stays one flaw', () => {
  const things: Thing[] = [...plain.slice(0, 1), { kind: 'residue', c: 90, r: 90, radiusPx: 9, peakNm: 2.2, decades: 2.1 }];
  for (const seed of ['a', 'b', 'c']) assert.deepEqual(counts(find(createScene({ seed, size, things }).sample)), { bubble: 1, residue: 1, wrinkle: 0, short: 0, open: 0 }, seed);
});

test('a dead spot of one pixel on bright ground is open; at the foot of ground that is dim itself it is not', () => {
  const dead: Thing[] = [{ kind: 'dead', c: 40, r: 40, radiusPx: 0.5 }, { kind: 'dead', c: 80, r: 20, radiusPx: 1.05 }];
  const bubble: Thing = { kind: 'bubble', c: 100, r: 90, radiusPx: 10, peakNm: 26 };
  const bright = find(createScene({ seed: 'dead', size, things: [bubble, ...dead] }).sample);
  assert.deepEqual([counts(bright).open, flawAt(bright, 40, 40)?.cause, flawAt(bright, 40, 40)?.pixels, flawAt(bright, 80, 20)?.pixels], [2, 'open', 1, 5]);
  // Ground a few standard deviations of the amplifier's noise above zero: pixels fall to the floor by noise.
  const dim = find(createScene({ seed: 'dim', size, things: [bubble], biasV: 3.55 }).sample);
  assert.equal(dim.list.filter((flaw) => flaw.cause === 'open' && flaw.pixels < 4).length, 0);
});
