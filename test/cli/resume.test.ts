/** `--resume` keeps results only while nothing that they come from has changed and every file asked for is there. */
import assert from 'node:assert/strict';
import { mkdtemp, readFile, readdir, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterEach, beforeEach, test } from 'node:test';
import { appraiseOne } from '../../src/cli/appraise-one.ts';
import type { AppraiseTask } from '../../src/cli/appraise-task.ts';
import { groupInputs } from '../../src/read/pairing.ts';
import { isFailed } from '../../src/report/tray.ts';
import { createRecipe } from '../fixtures/create-sample.ts';
import { createScene } from '../fixtures/create-scene.ts';

const size = 48;
const scene = createScene({ seed: 'resume', size });
const everything = ['barrier.tif', 'causes.tif', 'conditioned.tif', 'current.tif', 'flaws.csv', 'flaws.tif', 'glow.tif', 'height.tif', 'layers.tif', 'ledger.csv', 'report.html', 'verdict.json'];
const matrix = (values: Float32Array): string => Array.from({ length: size }, (_, r) => [...values.subarray(r * size, (r + 1) * size)].join(',')).join('\n');

let directory = '';
beforeEach(async () => {
  directory = await mkdtemp(join(tmpdir(), 'evenglow-resume-'));
  await writeFile(join(directory, 'h.csv'), matrix(scene.heightM));
  await writeFile(join(directory, 'i.csv'), matrix(scene.currentA));
});
afterEach(() => rm(directory, { recursive: true, force: true }));

/** Appraises the manifest's only sample with `--resume`. */
async function appraise(row: string, more: Partial<AppraiseTask> = {}) {
  const manifest = `sample,height,current,heightUnit,currentUnit,widthUm,biasV,surface\n${row}\n`;
  const { samples } = groupInputs([{ name: 'tray.csv', bytes: new TextEncoder().encode(manifest), explicit: true }, ...['h.csv', 'i.csv'].map((name) => ({ name }))]);
  const result = await appraiseOne({
    directory, group: samples[0]!, recipe: createRecipe(), out: join(directory, 'out'), folder: 'q', resume: true, app: { name: 'Evenglow', version: '0.1.0' }, ...more,
  });
  assert.ok(!isFailed(result.row), JSON.stringify(result.row));
  return { kept: result.kept, files: (await readdir(join(directory, 'out', 'q'))).sort() };
}
const row = 'q,h.csv,i.csv,m,A,0.96,5.9,barrier';

test('unchanged results are kept, a changed manifest row is appraised anew', async () => {
  assert.deepEqual(await appraise(row), { kept: false, files: everything });
  assert.equal((await appraise(row)).kept, true);
  assert.equal((await appraise(row.replace('barrier', 'stack'))).kept, false);
  assert.match(await readFile(join(directory, 'out', 'q', 'verdict.json'), 'utf8'), /carries an even current/);
  assert.equal((await appraise(row.replace('5.9', '5.5'))).kept, false);
  await writeFile(join(directory, 'i.csv'), matrix(scene.currentA.map((value) => value * 1.5)));
  assert.equal((await appraise(row.replace('5.9', '5.5'))).kept, false);
});

test('results that lack a file asked for are made again, those that have more are kept', async () => {
  assert.deepEqual(await appraise(row, { only: ['json'] }), { kept: false, files: ['verdict.json'] });
  assert.equal((await appraise(row, { only: ['json'] })).kept, true);
  assert.deepEqual(await appraise(row), { kept: false, files: everything });
  assert.deepEqual(await appraise(row, { only: ['json', 'csv'] }), { kept: true, files: everything });
  await rm(join(directory, 'out', 'q', 'glow.tif'));
  assert.deepEqual(await appraise(row), { kept: false, files: everything });
});
