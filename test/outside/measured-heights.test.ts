import assert from 'node:assert/strict';
import { existsSync, readFileSync } from 'node:fs';
import { test } from 'node:test';
import { evaluate } from '../../src/evaluate/evaluate.ts';
import { levelGround } from '../../src/ground/level-ground.ts';
import { groupInputs } from '../../src/read/pairing.ts';
import { readSample } from '../../src/read/read-sample.ts';
import type { Sample } from '../../src/read/sample.ts';
import { sha256 } from '../../src/read/sha256.ts';
import { medianAbsoluteDeviation } from '../../src/stats/mad.ts';
import { seededRandom } from '../../src/stats/random.ts';
import { createRecipe, createSample } from '../fixtures/create-sample.ts';
import { streakRatio } from '../fixtures/streaks.ts';

const folder = new URL('../../../shared/data/topography-x3p/', import.meta.url);
const skip = existsSync(folder) ? false : 'the measured files are not here';
const recipe = createRecipe({ scan: { channel: 'height', widthUm: 2368.4, heightUm: 660.5, heightUnit: 'um' } });

async function land(name: string): Promise<Sample> {
  const file = { name, bytes: new Uint8Array(readFileSync(new URL(name, folder))) };
  return readSample(groupInputs([{ name, explicit: true }]).samples[0]!, [file], recipe.scan, sha256);
}

// A measured surface (confocal microscope, public, MIT; 918 × 256 points, 25 292 of them missing [P, its SOURCE.txt]).
for (const name of ['sample-land_um_f32.tif', 'sample-land_um_f32.npy']) {
  test(`outside: ${name} is levelled and its 25 292 missing points are booked unmeasured [P]`, { skip }, async () => {
    const sample = await land(name);
    const { ground, ledger } = evaluate(sample, recipe);
    assert.equal(ledger.rows.find(({ cause }) => cause === 'unmeasured')!.pixels, 25292);
    assert.equal(ledger.rows.reduce((sum, { pixels }) => sum + pixels, 0), 918 * 256);
    assert.equal(ledger.usable.meaning, 'flaw-free');
    assert.ok(ground.height!.tiltM > 50e-6, `${ground.height!.tiltM} of curvature removed`);
    // What is left of the surface spreads less than half as far as what was read.
    const spread = (values: Float32Array): number => medianAbsoluteDeviation(values.filter((value) => !Number.isNaN(value))).mad;
    const [before, after] = [spread(sample.channels[0]!.values.data), spread(ground.height!.levelled.data)];
    assert.ok(after < before / 2, `${after} of ${before}`);
  });
}

test('outside: line offsets put on the measured surface leave it as streaked as it is levelled without them [measured surface, known offsets]', { skip }, async () => {
  const sample = await land('sample-land_um_f32.tif');
  const { columns, rows } = sample.grid;
  const raw = sample.channels[0]!.values.data;
  const levelled = (heightM: Float32Array): number => {
    const { height } = levelGround(createSample({ ...sample.grid, heightM }), recipe.ground, recipe.scan, 0.333e-9);
    return streakRatio(height!.levelled.data, columns, rows);
  };
  const own = levelled(raw);
  assert.ok(own <= streakRatio(raw, columns, rows), `levelling makes streaks: ${own}`);
  for (const offsetM of [0.2e-6, 1e-6]) {
    const random = seededRandom(`offsets ${offsetM}`);
    const offsets = Array.from({ length: rows }, () => offsetM * random.normal());
    const moved = raw.map((value, i) => value + offsets[Math.floor(i / columns)]!);
    const [before, after] = [streakRatio(moved, columns, rows), levelled(moved)];
    assert.ok(before > 2 * own && Math.abs(after / own - 1) < 0.15, `${offsetM}: ${before} before, ${after} after, ${own} without offsets`);
  }
});
