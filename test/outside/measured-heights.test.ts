import assert from 'node:assert/strict';
import { existsSync, readFileSync } from 'node:fs';
import { test } from 'node:test';
import { evaluate } from '../../src/evaluate/evaluate.ts';
import { groupInputs } from '../../src/read/pairing.ts';
import { readSample } from '../../src/read/read-sample.ts';
import { sha256 } from '../../src/read/sha256.ts';
import { medianAbsoluteDeviation } from '../../src/stats/mad.ts';
import { createRecipe } from '../fixtures/create-sample.ts';

const folder = new URL('../../../shared/data/topography-x3p/', import.meta.url);

// A measured surface (confocal microscope, public, MIT; 918 × 256 points, 25 292 of them missing [P, its SOURCE.txt]).
for (const name of ['sample-land_um_f32.tif', 'sample-land_um_f32.npy']) {
  test(`outside: ${name} is levelled and its 25 292 missing points are booked unmeasured [P]`, { skip: existsSync(folder) ? false : 'the measured files are not here' }, async () => {
    const file = { name, bytes: new Uint8Array(readFileSync(new URL(name, folder))) };
    const recipe = createRecipe({ scan: { channel: 'height', widthUm: 2368.4, heightUm: 660.5, heightUnit: 'um' } });
    const sample = await readSample(groupInputs([{ name, explicit: true }]).samples[0]!, [file], recipe.scan, sha256);
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
