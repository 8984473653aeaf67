/** One sample, three ways: in this process, behind the page's worker, by the command line. The map of causes is the same to the last byte. */
import assert from 'node:assert/strict';
import { spawnSync } from 'node:child_process';
import { existsSync, readFileSync } from 'node:fs';
import { basename, join, resolve } from 'node:path';
import { after, before, describe, test } from 'node:test';
import type { Page } from 'playwright-core';
import { projectRoot } from '../../src/cli/setup/set-up.mjs';
import { expectedOf, refusalOf } from './expected.ts';
import { scanPair } from './scan-files.ts';
import { ServedApp, areaOf, drop, plainText, rowOf, skip } from './served-app.ts';
import type { Visit } from './served-app.ts';

// Browsers take no path with dots in it.
const shared = `${resolve(projectRoot, '../shared')}/`;
const scene = (name: string): readonly string[] => ['current.tif', 'height.tif', 'json'].map((ending) => `${shared}scenes/${name}.${ending}`);

describe('the same in process, in the worker and by the command line', { skip, timeout: 240_000 }, () => {
  let app: ServedApp;
  let visit: Visit;
  let page: Page;

  before(async () => {
    app = await ServedApp.start();
    visit = await app.open();
    page = visit.page;
  });
  after(async () => { await app?.stop(); });

  /** causes.tif of a sample in the page's tray, from its worker. */
  async function causesInPage(name: string): Promise<Buffer> {
    await areaOf(rowOf(page, name));
    const base64 = await page.evaluate<string>(`(async () => {
      const { session } = document.querySelector('eg-app');
      const { id } = session.state.samples.find((sample) => sample.name === ${JSON.stringify(name)});
      return (await session.compute.resultFile(id, 'causes.tif')).reduce((text, byte) => text + String.fromCharCode(byte), '');
    })().then(btoa)`);
    return Buffer.from(base64, 'base64');
  }

  function causesByCommand(name: string, paths: readonly string[], ...more: readonly string[]): Buffer {
    const out = join(app.folder, `out-${name}`);
    const done = spawnSync(process.execPath, [`${projectRoot}src/cli/evenglow.mjs`, 'appraise', ...paths, '--out', out, ...more], { encoding: 'utf8' });
    assert.equal(done.status, 0, done.stderr);
    return readFileSync(join(out, name, 'causes.tif'));
  }

  async function assertSame(name: string, paths: readonly string[]): Promise<void> {
    await drop(page, paths);
    const { causes } = await expectedOf(paths);
    assert.ok(causes.length > 10_000);
    assert.ok(causesByCommand(name, paths).equals(causes), `${name}: command line and in process`);
    assert.ok((await causesInPage(name)).equals(causes), `${name}: worker and in process`);
  }

  test('an invented sample', async () => {
    await assertSame('small', scanPair(app.folder, 'small', 192, 'quarry-07'));
  });

  for (const name of ['base-3', 'wear-7']) {
    test(`scene ${name}`, { skip: existsSync(scene(name)[0]!) ? false : 'the scenes are not here' }, async () => {
      await assertSame(name, scene(name));
    });
  }

  const lone = [
    { path: `${shared}data/current-map/GO_cafm.tif`, answers: { 'scan.channel': 'current', 'scan.currentUnit': 'relative', 'scan.widthUm': '0.015' } },
    { path: `${shared}data/topography-x3p/sample-land_um_f32.tif`, answers: { 'scan.channel': 'height', 'scan.heightUnit': 'um', 'scan.widthUm': '2368.44' } },
  ];
  for (const { path, answers } of lone) {
    const name = basename(path, '.tif');
    test(`${name}, which states nothing: asked, answered, appraised`, { skip: existsSync(path) ? false : 'the file is not here' }, async () => {
      assert.equal((await refusalOf([path]))?.code, 'statements-missing');
      await drop(page, [path]);
      const row = rowOf(page, name);
      await row.getByText(`These files do not state whether ${basename(path)} is a height or a current, its unit and the size of the map.`).waitFor();
      for (const [field, value] of Object.entries(answers)) {
        const control = row.locator(`[id="${field}"]`);
        await (field === 'scan.widthUm' ? control.fill(value) : control.selectOption(value));
      }
      await row.getByRole('button', { name: 'Appraise' }).click();
      const scan = Object.fromEntries(Object.entries(answers).map(([field, value]) => [field.slice('scan.'.length), field === 'scan.widthUm' ? Number(value) : value]));
      const expected = await expectedOf([path], { scan });
      assert.equal(await areaOf(row), expected.area);
      assert.ok((await causesInPage(name)).equals(expected.causes));
      assert.ok(causesByCommand(name, [path], ...Object.entries(answers).flatMap(([field, value]) => ['--set', `${field}=${value}`])).equals(expected.causes));
      await row.locator('div.usable').click();
      assert.ok(plainText(await page.getByRole('heading', { level: 1 }).textContent()).startsWith(`${expected.area} of `));
      await page.getByRole('button', { name: /^Tray/ }).click();
    });
  }

  test('without a complaint', () => {
    assert.deepEqual(visit.troubles, []);
  });
});
