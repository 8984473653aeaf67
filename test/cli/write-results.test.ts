import assert from 'node:assert/strict';
import { mkdir, mkdtemp, readdir, readFile, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterEach, beforeEach, describe, it } from 'node:test';
import { folderName, folderNames } from '../../src/cli/folder-names.ts';
import { writeResults, writeTray } from '../../src/cli/write-results.ts';
import { failedTrayRow, rowFromVerdict } from '../../src/report/tray.ts';
import { verdictOf } from '../../src/report/verdict.ts';
import { createAppraisal, createHeightOnlyAppraisal } from '../fixtures/create-appraisal.ts';

const app = { name: 'Evenglow', version: '0.1.0' };
const everything = [
  'barrier.tif', 'causes.tif', 'conditioned.tif', 'current.tif', 'flaws.csv', 'flaws.tif', 'glow.tif', 'height.tif', 'layers.tif', 'ledger.csv', 'report.html', 'verdict.json',
];

describe('folder names', () => {
  it('keeps ordinary names and disarms the others', () => {
    assert.equal(folderName('flake 04 µm (2)'), 'flake 04 µm (2)');
    assert.equal(folderName('../../etc/passwd'), '___.._etc_passwd');
    assert.equal(folderName('C:\\x'), 'C__x');
    for (const name of ['..', '.', '.hidden', 'end. ', '', 'a\u0000b', 'CON', 'nul.tif', 'Com1', 'tray.csv', 'compare.json', 'x\u202egpj', '\ud800']) {
      const safe = folderName(name);
      assert.doesNotMatch(safe, /^\.|[. ]$|[/\\:\u0000\u202e]|^$|^(con|nul|com1)(\.|$)|^tray|^compare|\p{Surrogate}/iu, name);
    }
    assert.equal(folderName('😀'.repeat(300)), '😀'.repeat(50));
    assert.equal(folderName('x'.repeat(200)), 'x'.repeat(200));
  });

  it('gives names that would fall together a number', () => {
    assert.deepEqual(folderNames(['a/b', 'a:b', 'A_B', 'a_b-2', 'c']), ['a_b', 'a_b-2', 'A_B-3', 'a_b-2-2', 'c']);
    assert.deepEqual(folderNames(['e\u0301', '\u00e9']), ['\u00e9', '\u00e9-2']);
  });
});

describe('writing results', () => {
  let directory = '';
  beforeEach(async () => {
    directory = await mkdtemp(join(tmpdir(), 'evenglow-'));
  });
  afterEach(() => rm(directory, { recursive: true, force: true }));

  it('writes every file of a sample and nothing beside it', async () => {
    const path = await writeResults(join(directory, 'out'), 'flake 04', createAppraisal(), app);
    assert.equal(path, join(directory, 'out', 'flake 04'));
    assert.deepEqual((await readdir(path)).sort(), everything);
    assert.deepEqual(await readdir(join(directory, 'out')), ['flake 04']);
    const verdict: unknown = JSON.parse(await readFile(join(path, 'verdict.json'), 'utf8'));
    assert.equal((verdict as { sample: string }).sample, 'flake 04');
  });

  it('writes only the kinds asked for', async () => {
    const path = await writeResults(directory, 'x', createAppraisal(), app, { only: new Set(['csv', 'json']) });
    assert.deepEqual((await readdir(path)).sort(), ['flaws.csv', 'ledger.csv', 'verdict.json']);
  });

  it('replaces an earlier folder whole, and a part left by an interruption', async () => {
    await writeResults(directory, 'x', createAppraisal(), app);
    await mkdir(join(directory, '.x.partial'));
    await writeFile(join(directory, '.x.partial', 'stray.txt'), 'left over');
    const path = await writeResults(directory, 'x', createHeightOnlyAppraisal(), app);
    assert.deepEqual((await readdir(path)).sort(), ['causes.tif', 'flaws.csv', 'flaws.tif', 'height.tif', 'ledger.csv', 'report.html', 'verdict.json']);
    assert.deepEqual(await readdir(directory), ['x']);
  });

  it('leaves the earlier folder and no part when it is aborted midway or a file cannot be made', async () => {
    await writeResults(directory, 'x', createAppraisal(), app, { only: new Set(['csv']) });
    const controller = new AbortController();
    const appraisal = createAppraisal();
    // The glow map is read late among the maps: abort from there.
    const ledger = { ...appraisal.ledger, get glow() { controller.abort(new Error('stopped')); return appraisal.ledger.glow; } };
    await assert.rejects(writeResults(directory, 'x', { ...appraisal, ledger }, app, { signal: controller.signal }), /stopped/);
    assert.deepEqual(await readdir(directory), ['x']);
    assert.deepEqual((await readdir(join(directory, 'x'))).sort(), ['flaws.csv', 'ledger.csv']);
    const broken = { ...appraisal.ledger, get glow(): never { throw new Error('no map'); } };
    await assert.rejects(writeResults(directory, 'y', { ...appraisal, ledger: broken }, app), /no map/);
    assert.deepEqual(await readdir(directory), ['x']);
  });

  it('gives the same bytes twice, timings apart', async () => {
    const [first, second] = await Promise.all(['a', 'b'].map((folder) => writeResults(directory, folder, createAppraisal(), app)));
    for (const file of everything) assert.deepEqual(await readFile(join(first ?? '', file)), await readFile(join(second ?? '', file)), file);
  });

  it('writes the tray files beside the folders', async () => {
    const rows = [rowFromVerdict(verdictOf(createAppraisal(), app), 'flake 04'), failedTrayRow('bad', { code: 'file-unrecognised', message: 'bad is not a format Evenglow reads.' })];
    await writeTray(directory, rows, app);
    assert.deepEqual((await readdir(directory)).sort(), ['tray.csv', 'tray.html', 'tray.jsonl']);
    assert.equal((await readFile(join(directory, 'tray.jsonl'), 'utf8')).trimEnd().split('\n').length, 2);
    await writeTray(directory, rows, app, { only: new Set(['csv']) });
    assert.deepEqual((await readdir(directory)).sort(), ['tray.csv', 'tray.html', 'tray.jsonl']);
  });
});
