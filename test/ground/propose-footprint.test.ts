import assert from 'node:assert/strict';
import { existsSync, readdirSync, readFileSync } from 'node:fs';
import { test } from 'node:test';
import { fileURLToPath } from 'node:url';
import type { Ground } from '../../src/ground/ground.ts';
import { levelGround } from '../../src/ground/level-ground.ts';
import { footprintOf } from '../../src/read/footprint.ts';
import type { InputFile } from '../../src/read/input.ts';
import { readOutlines } from '../../src/read/outlines.ts';
import { groupInputs } from '../../src/read/pairing.ts';
import { readSample } from '../../src/read/read-sample.ts';
import type { Outline, Sample } from '../../src/read/sample.ts';
import { sha256 } from '../../src/read/sha256.ts';
import { verdictOf } from '../../src/report/verdict.ts';
import { seededRandom } from '../../src/stats/random.ts';
import { createAppraisal } from '../fixtures/create-appraisal.ts';
import { createSample, createRecipe } from '../fixtures/create-sample.ts';
import { createScene, layerNm, noiseA, saturationA, threeTerraces, typicalThings } from '../fixtures/create-scene.ts';

const size = 192;
const pitchM = 50e-9;
const pixelUm2 = 0.05 * 0.05;
const recipe = createRecipe();
const ground = (sample: Sample) => levelGround(sample, recipe.ground, recipe.scan, layerNm * 1e-9);
const remarks = (found: Ground) => found.warnings.filter(({ code }) => code === 'footprint-proposed').map(({ message }) => message);

type Where = (c: number, r: number) => boolean;
interface Flake {
  readonly bare: Where;
  readonly depthNm: number;
  /** What flows over the bare ground, A; no current map without it. */
  readonly bareA?: number | undefined;
  /** Thicker terrace on the flake, a layer up and 0.9 decades down. */
  readonly thick?: Where;
  readonly pitM?: Where;
  readonly outlines?: readonly Outline[];
  readonly seed?: string;
}

const diagonal: Where = (c, r) => c + 0.5 * r < 0.55 * size;
const thick: Where = (c, r) => c - 0.3 * r > 0.62 * size;

/** A flake beside bare ground under tilt 20 nm, bow 3 nm, line offsets 0.2 nm and noise 0.1 nm. */
function flakeSample(spec: Flake): Sample {
  const random = seededRandom(spec.seed ?? 'flake');
  const heightM = new Float32Array(size * size);
  const currentA = new Float32Array(size * size);
  for (let r = 0, i = 0; r < size; r++) {
    const line = 0.2 * random.normal();
    for (let c = 0; c < size; c++, i++) {
      const bare = spec.bare(c, r);
      const pit = !bare && spec.pitM?.(c, r) === true;
      const layers = !bare && spec.thick?.(c, r) ? 1 : 0;
      const u = c / (size - 1);
      const v = r / (size - 1);
      const surface = bare || pit ? -spec.depthNm : layers * layerNm;
      heightM[i] = 1e-9 * (surface + 20 * (u - 0.6 * v) + 3 * (u * u + 0.5 * u * v - v * v) + line + 0.1 * random.normal());
      const bareA = spec.bareA ?? 0;
      const flows = bare ? (bareA < saturationA ? bareA * 10 ** (0.1 * random.normal()) : bareA) : pit ? 1 : 1e-10 * 10 ** (0.1 * random.normal() - 0.9 * layers);
      currentA[i] = Math.min(saturationA, flows + noiseA * random.normal());
    }
  }
  return createSample({
    columns: size, rows: size, pitchXM: pitchM, pitchYM: pitchM, heightM,
    ...(spec.bareA === undefined ? {} : { currentA }), ...(spec.outlines ? { outlines: spec.outlines } : {}),
  });
}

const drawn = (where: Where) => Uint8Array.from({ length: size * size }, (_, i) => (where(i % size, Math.floor(i / size)) ? 1 : 0));
const sum = (mask: Uint8Array) => mask.reduce((total, value) => total + value, 0);

/** What the proposal keeps, as the read stage would mask it, against the flake: share of pixels that differ. */
function wrongShare(sample: Sample, found: Ground, flake: Where): number {
  const kept = footprintOf(sample.grid, [found.footprintProposal!.outline]).data;
  const wanted = drawn(flake);
  return kept.reduce((wrong, value, i) => wrong + (value === wanted[i] ? 0 : 1), 0) / sum(wanted);
}

for (const [name, bare] of [
  ['a slanted border', diagonal],
  ['a border across the lines', (c) => c < 0.3 * size],
  ['a border 6° off the lines', (c, r) => r + 0.1 * c < 0.35 * size],
  ['both sides of a flake', (c) => c < 0.16 * size || c > 0.86 * size],
] as readonly [string, Where][]) {
  test(`height alone, substrate 4 nm lower over 30 %, ${name}: told, and the area is right within 2 %`, () => {
    const sample = flakeSample({ bare, depthNm: 4 });
    const found = ground(sample);
    const proposal = found.footprintProposal;
    assert.ok(proposal);
    const bareUm2 = sum(drawn(bare)) * pixelUm2;
    assert.equal(proposal.ground, 'unknown');
    assert.ok(Math.abs((proposal.bareM2 * 1e12) / bareUm2 - 1) < 0.02, `${proposal.bareM2 * 1e12} µm² for ${bareUm2}`);
    assert.ok(Math.abs(proposal.stepM * 1e9 - 4) < 0.4, `${proposal.stepM * 1e9} nm`);
    assert.ok(wrongShare(sample, found, (c, r) => !bare(c, r)) < 0.02);
    assert.equal(remarks(found).length, 1);
    assert.match(remarks(found)[0]!, /^Substrate or bare injector .* µm².*save footprintProposal from verdict\.json .* as made\.outlines\.geojson/);
  });
}

test('bare injector 3.7 nm lower and saturated is called by its name', () => {
  const sample = flakeSample({ bare: (c, r) => c + r < 0.5 * size, depthNm: 3.7, bareA: 1, thick });
  const found = ground(sample);
  assert.equal(found.footprintProposal?.ground, 'injector');
  assert.ok(wrongShare(sample, found, (c, r) => c + r >= 0.5 * size) < 0.02);
  assert.match(remarks(found)[0]!, /^Bare injector seems to be in view over 11\.\d\d µm², 3\.\d nm below/);
});

test('substrate at the floor is called by its name, from 3 % of the map on', () => {
  const corner = (share: number): Where => (c, r) => c + r < Math.sqrt(2 * share) * size;
  const told = ground(flakeSample({ bare: corner(0.04), depthNm: 3, bareA: 0, thick }));
  assert.equal(told.footprintProposal?.ground, 'substrate');
  assert.equal(ground(flakeSample({ bare: corner(0.02), depthNm: 3, bareA: 0, thick })).footprintProposal, undefined);
});

test('a smaller corner like the bare ground goes with it, but alone it is not evidence', () => {
  const corner: Where = (c, r) => (size - 1 - c) + r < 0.15 * size;
  assert.equal(ground(flakeSample({ bare: corner, depthNm: 4, bareA: 1, thick })).footprintProposal, undefined);
  const sample = flakeSample({ bare: (c, r) => diagonal(c, r) || corner(c, r), depthNm: 4, bareA: 1, thick });
  const found = ground(sample);
  assert.ok(wrongShare(sample, found, (c, r) => !diagonal(c, r) && !corner(c, r)) < 0.02);
});

test('pinholes stay in the flake, a hole of 0.25 µm² and more does not', () => {
  const disc = (c0: number, r0: number, radiusPx: number): Where => (c, r) => Math.hypot(c - c0, r - r0) < radiusPx;
  const small = disc(140, 50, 4);
  const large = disc(150, 140, 9);
  const sample = flakeSample({ bare: diagonal, depthNm: 4, bareA: 1, thick, pitM: (c, r) => small(c, r) || large(c, r) });
  const found = ground(sample);
  const kept = footprintOf(sample.grid, [found.footprintProposal!.outline]).data;
  assert.equal(kept[50 * size + 140], 1);
  assert.equal(kept[140 * size + 150], 0);
  assert.equal(found.footprintProposal!.outline.rings.length, 2);
});

test('no proposal for a flake that fills the map, with bubbles, pinholes, residue and a ridge', () => {
  for (const seed of ['one', 'two', 'three']) {
    const { sample } = createScene({ seed, size: 128, layersAt: threeTerraces(128), things: typicalThings(128), tiltNm: 20, bowNm: 3, lineNm: 0.2 });
    assert.equal(ground(sample).footprintProposal, undefined);
    assert.equal(ground({ ...sample, channels: sample.channels.slice(0, 1) }).footprintProposal, undefined);
  }
});

test('no proposal for lower terraces: five layers with the height alone, seven that carry a current', () => {
  const lower = (layers: number, bareA?: number) => ground(flakeSample({ bare: diagonal, depthNm: layers * layerNm, bareA, thick }));
  assert.equal(lower(5).footprintProposal, undefined);
  assert.equal(lower(5, 1).footprintProposal, undefined);
  assert.equal(lower(7, 4e-9).footprintProposal, undefined);
  assert.ok(lower(7, 1).footprintProposal, 'the same step over saturated ground is told');
});

test('no proposal for a jump between lines, nor for a slope without a step', () => {
  const jump: Where = (_, r) => r >= 0.4 * size && r < 0.6 * size;
  for (const bareA of [undefined, 0, 1]) assert.equal(ground(flakeSample({ bare: jump, depthNm: 5, bareA, thick })).footprintProposal, undefined);
  const slope = createSample({
    columns: size, rows: size, pitchXM: pitchM, pitchYM: pitchM,
    heightM: Float32Array.from({ length: size * size }, (_, i) => -12e-9 * Math.max(0, 0.5 - (i % size) / size) ** 2 * 4),
  });
  assert.equal(ground(slope).footprintProposal, undefined);
});

test('no proposal without height, nor where outlines are given', () => {
  const sample = flakeSample({ bare: diagonal, depthNm: 4, bareA: 1, thick });
  assert.ok(ground(sample).footprintProposal);
  assert.equal(ground({ ...sample, channels: sample.channels.slice(1) }).footprintProposal, undefined);
  const rings = [[[0, 0], [5e-6, 0], [5e-6, 5e-6], [0, 0]]] as const;
  assert.equal(ground({ ...sample, outlines: [{ layer: 'barrier', rings }] }).footprintProposal, undefined);
});

test('the verdict carries the outline as a file that the read stage takes, few vertices, same polygon', () => {
  const sample = flakeSample({ bare: diagonal, depthNm: 4, bareA: 1, thick, pitM: (c, r) => Math.hypot(c - 150, r - 140) < 12 });
  const found = ground(sample);
  const { footprintProposal } = verdictOf(createAppraisal({ ground: found }), { name: 'Evenglow', version: '0' });
  assert.equal(footprintProposal!.type, 'FeatureCollection');
  const read = readOutlines({ name: 'made.outlines.geojson', bytes: new TextEncoder().encode(JSON.stringify(footprintProposal)) });
  assert.equal(read.length, 1);
  assert.equal(read[0]!.layer, 'barrier');
  const { rings } = found.footprintProposal!.outline;
  assert.deepEqual(read[0]!.rings.map((ring) => ring.length), rings.map((ring) => ring.length));
  assert.ok(rings.length === 2 && rings.flat().length <= 502);
  read[0]!.rings.forEach((ring, k) => ring.forEach(([x, y], i) => {
    assert.ok(Math.abs(x - rings[k]![i]![0]) < 1e-15 && Math.abs(y - rings[k]![i]![1]) < 1e-15);
  }));
  assert.deepEqual(footprintOf(sample.grid, read).data, footprintOf(sample.grid, [found.footprintProposal!.outline]).data);
  assert.ok(!('footprintProposal' in verdictOf(createAppraisal(), { name: 'Evenglow', version: '0' })));
});

const folder = fileURLToPath(new URL('../../../shared/scenes/', import.meta.url));
test('no proposal on the nine scenes with known truth, with and without their current', { skip: !existsSync(folder) && 'no ../shared/scenes' }, async () => {
  const names = readdirSync(folder).filter((name) => /\.(tif|json)$/.test(name));
  const groups = groupInputs(names.map((name) => ({ name, explicit: false }))).samples;
  assert.equal(groups.length, 9);
  for (const group of groups) {
    const files: InputFile[] = names.filter((name) => name.startsWith(`${group.name}.`)).map((name) => ({ name, bytes: new Uint8Array(readFileSync(folder + name)) }));
    const sample = await readSample(group, files, recipe.scan, sha256);
    assert.equal(ground(sample).footprintProposal, undefined, group.name);
    assert.equal(ground({ ...sample, channels: sample.channels.filter(({ quantity }) => quantity === 'height') }).footprintProposal, undefined, `${group.name}, height alone`);
  }
});
