/** The six demo samples through the whole chain with the default recipe, against what was painted. */
import assert from 'node:assert/strict';
import { test } from 'node:test';
import { demoFiles, demoSamples } from '../../src/demo/demo-samples.ts';
import type { Placed } from '../../src/demo/canvas.ts';
import type { Appraisal } from '../../src/evaluate/appraisal.ts';
import { evaluate } from '../../src/evaluate/evaluate.ts';
import { causes } from '../../src/ledger/ledger.ts';
import type { Cause } from '../../src/ledger/ledger.ts';
import { groupInputs } from '../../src/read/pairing.ts';
import { readSample } from '../../src/read/read-sample.ts';
import type { Sample } from '../../src/read/sample.ts';
import { sha256 } from '../../src/read/sha256.ts';
import { defaultRecipe } from '../../src/recipe/parse-recipe.ts';
import { median } from '../../src/stats/median.ts';
import type { Truth } from './truth.ts';
import { truthOf } from './truth.ts';

const size = 512;

interface Looked {
  readonly sample: Sample;
  readonly appraisal: Appraisal;
  readonly truth: Truth;
}

const known = new Map<string, Promise<Looked>>();

function look(name: string): Promise<Looked> {
  const found = known.get(name) ?? appraised(name);
  known.set(name, found);
  return found;
}

async function appraised(name: string): Promise<Looked> {
  const files = demoFiles(name, size);
  const recipe = defaultRecipe();
  const { samples, skipped, failed } = groupInputs(files);
  assert.deepEqual([samples.length, skipped.length, failed.length], [1, 0, 0]);
  const sample = await readSample(samples[0]!, files, recipe.scan, sha256);
  return { sample, appraisal: evaluate(sample, recipe), truth: truthOf(name, size, sample.footprint.data) };
}

/** Index of the pixel under the centre of something drawn, where that lies on the map. */
function pixelUnder({ canvas }: Truth, { xNm, yNm }: Placed): number | undefined {
  const [c, r] = [Math.floor((xNm / canvas.widthNm) * size), Math.floor((yNm / canvas.heightNm) * size)];
  return c >= 0 && c < size && r >= 0 && r < size ? r * size + c : undefined;
}

/** Causes booked under the centres of everything of a kind. */
function bookedUnder({ appraisal, truth }: Looked, kind: Placed['kind']): Cause[] {
  return truth.canvas.placed.flatMap((placed) => {
    const i = placed.kind === kind ? pixelUnder(truth, placed) : undefined;
    return i === undefined ? [] : [causes[appraisal.ledger.codes.data[i]!]!];
  });
}

const share = (found: readonly Cause[], cause: Cause): number => found.filter((one) => one === cause).length / found.length;

for (const { name } of demoSamples) {
  test(`${name} reads without remarks: two channels, six volts, a bare barrier, size as painted`, async () => {
    const { sample, truth } = await look(name);
    assert.deepEqual(sample.warnings, []);
    assert.deepEqual(sample.channels.map(({ quantity, unit, biasV }) => [quantity, unit, biasV]), [['height', 'm', undefined], ['current', 'A', 6]]);
    assert.equal(sample.surface, 'barrier');
    assert.ok(Math.abs(sample.grid.pitchXM * size * 1e6 - truth.scene.scene.widthUm) < 1e-6);
    assert.ok(Math.abs(sample.grid.pitchYM * size * 1e6 - truth.scene.scene.heightUm) < 1e-6);
  });

  test(`${name}: usable share within 0.03 of the truth, reference of the painted layers, wear within 0.15 decades [known truth]`, async () => {
    const { appraisal, truth } = await look(name);
    const { ledger, barrier, ground } = appraisal;
    let usable = 0;
    for (const value of truth.usable) usable += value;
    assert.ok(Math.abs(ledger.usable.share - usable / ledger.footprintPixels) < 0.03, `${ledger.usable.share} for ${usable / ledger.footprintPixels}`);
    assert.equal(barrier!.reference.layers, truth.reference);
    const { wearDecades } = ground.current!;
    assert.ok(Math.abs(wearDecades - truth.scene.scene.wearDecades) < 0.15, `${wearDecades} for ${truth.scene.scene.wearDecades}`);
  });

  test(`${name}: a barrier of 3.6–4.4 nm for a device near 4 V, currents of pA to nA on sound ground, heights not levelled [common practice]`, async () => {
    const { sample, appraisal, truth } = await look(name);
    const { thicknessM } = appraisal.barrier!.reference;
    assert.ok(thicknessM! > 3.6e-9 && thicknessM! < 4.4e-9, `${thicknessM}`);
    const { biasV, proposed } = appraisal.barrier!.device!;
    assert.ok(proposed && biasV > 3.2 && biasV < 4.4, `${biasV}`);
    const current = sample.channels.find(({ quantity }) => quantity === 'current')!.values.data;
    const sound = current.filter((value, i) => truth.usable[i] === 1 && !Number.isNaN(value));
    assert.ok(median(sound) > 1e-12 && median(sound) < 1e-9, `${median(sound)}`);
    assert.ok(appraisal.ground.height!.tiltM > 1e-9);
  });
}

test('the verdicts differ: usable shares spread from under 0.4 to over 0.94, the even flake first, the terraces last', async () => {
  const shares = await Promise.all(demoSamples.map(async ({ name }) => ({ name, share: (await look(name)).appraisal.ledger.usable.share })));
  shares.sort((a, b) => b.share - a.share);
  assert.equal(shares[0]!.name, 'quarry-03');
  assert.ok(shares[0]!.share > 0.94, `${shares[0]!.share}`);
  assert.equal(shares[5]!.name, 'quarry-16');
  assert.ok(shares[5]!.share < 0.4, `${shares[5]!.share}`);
});

test('quarry-03 ends within the map: the bare injector is outside the footprint, and no short is booked on the flake', async () => {
  const { appraisal, truth } = await look('quarry-03');
  const { codes, footprintPixels } = appraisal.ledger;
  assert.ok(footprintPixels < size * size);
  for (let i = 0; i < size * size; i++) if (truth.canvas.layers[i] === 0) assert.equal(codes.data[i], 0);
  assert.equal(appraisal.ledger.rows.find(({ cause }) => cause === 'short')!.pixels, 0);
});

test('quarry-07: bubbles are found as bubbles, with a median h/R near 0.11, and the wrinkles as wrinkles', async () => {
  const looked = await look('quarry-07');
  const under = bookedUnder(looked, 'bubble');
  assert.ok(under.length > 70 && share(under, 'bubble') > 0.95, `${share(under, 'bubble')} of ${under.length}`);
  const ratios = looked.appraisal.flaws.list.filter(({ cause, pixels, touchesEdge }) => cause === 'bubble' && pixels > 40 && !touchesEdge).map(({ heightToRadius }) => heightToRadius);
  const middle = median(Float64Array.from(ratios));
  assert.ok(middle > 0.09 && middle < 0.13, `${middle}`);
  const rows = new Map(looked.appraisal.ledger.rows.map((row) => [row.cause, row.share]));
  assert.ok(rows.get('bubble')! > 0.1);
  assert.ok(rows.get('wrinkle')! > 0.005);
});

test('quarry-11: particles are found as residue, and no film counts as usable', async () => {
  const looked = await look('quarry-11');
  const particles = bookedUnder(looked, 'particle');
  assert.ok(particles.length > 20 && share(particles, 'residue') > 0.9, `${share(particles, 'residue')} of ${particles.length}`);
  const films = bookedUnder(looked, 'film');
  assert.ok(films.length > 15);
  assert.equal(share(films, 'usable'), 0);
});

test('quarry-16: four terraces on unequal pitch, whole layers right on 99 % of sound ground, ladder within a tenth of the model', async () => {
  const { sample, appraisal, truth } = await look('quarry-16');
  assert.notEqual(sample.grid.pitchXM, sample.grid.pitchYM);
  const { ladder, layers } = appraisal.barrier!;
  assert.equal(ladder.from, 'map');
  assert.ok(Math.abs(ladder.stepDecades / ladder.modelStepDecades! - 1) < 0.1, `${ladder.stepDecades} for ${ladder.modelStepDecades}`);
  let judged = 0;
  let right = 0;
  for (let i = 0; i < size * size; i++) {
    if (truth.canvas.lossDecades[i]! > 0 || truth.canvas.shorted[i] === 1) continue;
    judged++;
    if (layers!.data[i] === truth.canvas.layers[i]) right++;
  }
  assert.ok(right > 0.99 * judged, `${right} of ${judged}`);
  const counted = [11, 12, 13, 14].map((count) => ladder.rungs.find((rung) => rung.layers === count)?.areaM2 ?? 0);
  for (const areaM2 of counted) assert.ok(areaM2 > 10e-12, `${areaM2}`);
});

test('quarry-21: pinholes are found as shorts, saturated, and nothing else is', async () => {
  const looked = await look('quarry-21');
  const { appraisal, truth, sample } = looked;
  const under = bookedUnder(looked, 'pinhole');
  assert.ok(under.length >= 25 && share(under, 'short') > 0.95, `${share(under, 'short')} of ${under.length}`);
  for (let i = 0; i < size * size; i++) if (truth.canvas.shorted[i] === 1) assert.equal(appraisal.ground.current!.saturated.data[i], 1);
  const pinholes = truth.canvas.placed.filter(({ kind }) => kind === 'pinhole');
  for (const flaw of appraisal.flaws.list) {
    if (flaw.cause !== 'short') continue;
    const yNm = truth.canvas.heightNm - flaw.yM * 1e9;
    assert.ok(pinholes.some((pinhole) => Math.hypot(pinhole.xNm - flaw.xM * 1e9, pinhole.yNm - yNm) < pinhole.radiusNm + 3e9 * sample.grid.pitchXM), `${flaw.flaw}`);
  }
});

test('quarry-24: the tip’s wear is said, and broken runs are repaired rather than booked as unmeasured', async () => {
  const { appraisal } = await look('quarry-24');
  assert.ok(appraisal.warnings.some(({ code }) => code === 'current-wear'));
  // 18 runs of one or two lines, 0.1–0.4 of the width each, every second one without current: some 1700 pixels.
  assert.ok(appraisal.ground.current!.repairedPixels > 800, `${appraisal.ground.current!.repairedPixels}`);
  assert.ok(appraisal.ground.height!.repairedPixels > 1600, `${appraisal.ground.height!.repairedPixels}`);
  assert.ok(appraisal.ledger.rows.find(({ cause }) => cause === 'unmeasured')!.share < 0.002);
});
