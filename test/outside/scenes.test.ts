/** Invented scans with known truth that are kept outside the project (../shared/scenes); skipped where they are not at hand. */
import assert from 'node:assert/strict';
import { existsSync, readdirSync, readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { test } from 'node:test';
import { evaluate } from '../../src/evaluate/evaluate.ts';
import { decodeMaps } from '../../src/read/decode.ts';
import type { InputFile } from '../../src/read/input.ts';
import { groupInputs } from '../../src/read/pairing.ts';
import type { SampleGroup } from '../../src/read/pairing.ts';
import { readSample } from '../../src/read/read-sample.ts';
import { sha256 } from '../../src/read/sha256.ts';
import { createRecipe } from '../fixtures/create-sample.ts';

const folder = fileURLToPath(new URL('../../../shared/scenes/', import.meta.url));
const here = existsSync(folder);
const read = (name: string): InputFile => ({ name, bytes: new Uint8Array(readFileSync(folder + name)) });
const names = here ? readdirSync(folder).filter((name) => /\.(tif|json)$/.test(name)) : [];
const groups: readonly SampleGroup[] = groupInputs(names.map((name) => ({ name, explicit: false }))).samples;

test('outside: nine scenes are at hand', { skip: !here && 'no ../shared/scenes' }, () => {
  assert.equal(groups.length, 9);
});

async function truth(name: string, map: 'truth' | 'layers'): Promise<ArrayLike<number>> {
  return (await decodeMaps(read(`truth/${name}.${map}.tif`)))[0]!.values;
}

for (const group of groups) {
  // The model's own terraces carry the currents of 9 to 15 layers, so there layers can be checked.
  const modelled = group.name.startsWith('model-');
  test(`outside: ${group.name}, usable share within 0.02 of the truth${modelled ? ', layers right on 95 % of it' : ''} [known truth]`, async () => {
    const recipe = createRecipe({ stack: { biasV: 4 }, ...(modelled ? { barrier: { referenceLayers: 11 } } : {}) });
    const sample = await readSample(group, names.filter((name) => name.startsWith(`${group.name}.`)).map(read), recipe.scan, sha256);
    const { ledger, barrier } = evaluate(sample, recipe);
    const codes = ledger.codes.data;
    assert.equal(ledger.footprintPixels, codes.length);
    assert.equal(ledger.rows.reduce((sum, row) => sum + row.pixels, 0), codes.length);
    assert.ok(codes.every((code) => code >= 1 && code <= 12));

    const wanted = await truth(group.name, 'truth');
    assert.equal(wanted.length, codes.length);
    let usable = 0;
    for (let i = 0; i < codes.length; i++) if (wanted[i] === 1) usable++;
    assert.ok(Math.abs(ledger.usable.share - usable / codes.length) <= 0.02, `${ledger.usable.share} for ${usable / codes.length}`);

    if (!modelled) return;
    const layers = await truth(group.name, 'layers');
    let right = 0;
    let judged = 0;
    for (let i = 0; i < codes.length; i++) {
      if (codes[i] !== 1) continue;
      judged++;
      if (barrier!.layers!.data[i] === layers[i]) right++;
    }
    assert.ok(right >= 0.95 * judged, `layers right on ${right} of ${judged} usable pixels`);
  });
}
