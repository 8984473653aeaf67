/** What a person does with the app, from the first look to a changed threshold. */
import assert from 'node:assert/strict';
import { mkdirSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { after, before, describe, test } from 'node:test';
import type { Locator, Page } from 'playwright-core';
import { demoSamples } from '../../src/demo/demo-samples.ts';
import { expectedOf } from './expected.ts';
import { scanPair, silentPair } from './scan-files.ts';
import { ServedApp, areaOf, drop, plainText, rowOf, skip, until } from './served-app.ts';
import type { Visit } from './served-app.ts';

describe('the app', { skip, timeout: 240_000 }, () => {
  let app: ServedApp;
  let visit: Visit;
  let page: Page;

  before(async () => {
    app = await ServedApp.start();
    visit = await app.open();
    page = visit.page;
  });
  after(async () => { await app?.stop(); });

  /** The verdict, the ledger's numbers, and the steps of the recipe in the Sample place. */
  const heading = (): Locator => page.getByRole('heading', { level: 1 });
  const ledger = async (): Promise<readonly (string | null)[]> => Promise.all((await page.locator('eg-sample-place eg-ledger-bar li button').all()).map((button) => button.getAttribute('aria-label')));
  const toTray = async (): Promise<void> => { await page.getByRole('button', { name: /^Tray/ }).click(); };

  test('opens on six invented samples, each appraised', async () => {
    for (const { name } of demoSamples) {
      const row = rowOf(page, name);
      assert.match(await areaOf(row), /^\d[\d.]* µm²$/, name);
      assert.match(plainText(await row.locator('article').textContent()), /invented.*95 %: [\d.]+–[\d.]+ µm².*µm² is usable/, name);
    }
    assert.equal(await page.locator('eg-tray-row').count(), 6);
  });

  test('computes with the compiled kernels, served as what they are', async () => {
    const kernels = visit.asked.filter((url) => url.endsWith('.wasm'));
    assert.ok(kernels.length >= 1 && kernels.every((url) => url.startsWith(app.address)), kernels.join());
    const answer = await page.request.get(kernels[0]!);
    assert.equal(answer.headers()['content-type'], 'application/wasm');
    await until(page, `document.querySelector('eg-app').session.compute.facts().then((facts) => facts.kernels)`);
  });

  test('appraises a height and a current map that are dropped on it', async () => {
    const paths = scanPair(app.folder, 'flake-a', 160);
    await drop(page, paths);
    assert.equal(await areaOf(rowOf(page, 'flake-a')), (await expectedOf(paths)).area);
  });

  test('asks for what files do not state, and appraises by the answer', async () => {
    const paths = silentPair(app.folder, 'silent', 128);
    await drop(page, paths);
    const form = rowOf(page, 'silent').getByRole('form');
    const field = (path: string): Locator => form.locator(`[id="${path}"]`);
    await form.waitFor();
    await form.getByRole('button', { name: 'Appraise' }).click();
    assert.equal(await field('scan.heightUnit').getAttribute('aria-invalid'), 'true');
    await field('scan.heightUnit').selectOption('nm');
    await field('scan.currentUnit').selectOption('A');
    await field('scan.biasV').fill('4,5');
    await form.getByRole('button', { name: 'Appraise' }).click();
    const expected = await expectedOf(paths, { scan: { heightUnit: 'nm', currentUnit: 'A', biasV: 4.5 } });
    assert.equal(await areaOf(rowOf(page, 'silent')), expected.area);
  });

  test('moves the ledger by a threshold, says the effect in µm², and goes back and forth', async () => {
    await rowOf(page, 'flake-a').getByRole('button', { name: /flake-a$/ }).press('Enter');
    const paths = ['current', 'height'].map((quantity) => join(app.folder, `flake-a.${quantity}.tif`));
    const [narrow, wide] = [await expectedOf(paths), await expectedOf(paths, { band: { factor: 10 } })];
    await heading().getByText(narrow.area).waitFor();
    const before = await ledger();
    await page.locator('eg-chapter-glow summary').first().click();
    const knob = page.locator('eg-knob').filter({ has: page.getByText('Band factor', { exact: true }) }).getByRole('textbox');
    await knob.fill('10');
    await knob.press('Enter');
    await heading().getByText(wide.area).waitFor();
    const after = await ledger();
    assert.notDeepEqual(after, before);
    const gained = wide.summary.usable.areaUm2 - narrow.summary.usable.areaUm2;
    assert.ok(gained > 0.1, `the wide band returns ${gained} µm²`);
    assert.equal(plainText(await page.locator('eg-chapter-glow .effect').textContent()), `This returned ${gained.toPrecision(3)} µm².`);
    await page.getByRole('button', { name: /^Undo: / }).click();
    await heading().getByText(narrow.area).waitFor();
    assert.deepEqual(await ledger(), before);
    await page.getByRole('button', { name: /^Redo: / }).click();
    await heading().getByText(wide.area).waitFor();
    assert.deepEqual(await ledger(), after);
    await page.locator('eg-map-stage canvas').focus();
    await page.keyboard.press('Control+z');
    await heading().getByText(narrow.area).waitFor();
    assert.deepEqual(await ledger(), before);
  });

  test('shows one cause alone by the keyboard', async () => {
    const all = await stillMap();
    const buttons = page.getByRole('list', { name: /^Ledger/ }).getByRole('button');
    await buttons.first().focus();
    await page.keyboard.press('ArrowRight');
    await page.keyboard.press('Enter');
    assert.equal(await buttons.nth(1).getAttribute('aria-pressed'), 'true');
    const alone = await stillMap(all);
    await page.keyboard.press('Escape');
    assert.equal(await page.locator('eg-sample-place eg-ledger-bar [aria-pressed="true"]').count(), 0);
    assert.ok((await stillMap(alone)).equals(all), 'the map is as it was');
    await page.keyboard.press('r');
    await page.getByText('raw current, as in the file').waitFor();
    await page.keyboard.press('r');
    await toTray();
  });

  test('takes a folder, dropped or chosen, without what lies deeper', async () => {
    const dropped = join(app.folder, 'dropped');
    scanPair(dropped, 'in-dropped', 128);
    scanPair(join(dropped, 'deeper'), 'too-deep', 128);
    writeFileSync(join(dropped, '.hidden'), 'of the system');
    await drop(page, [dropped]);
    await areaOf(rowOf(page, 'in-dropped'));
    const chosen = join(app.folder, 'chosen');
    scanPair(chosen, 'in-chosen', 128);
    mkdirSync(join(chosen, 'deeper'));
    writeFileSync(join(chosen, 'deeper', 'note.txt'), 'left alone');
    await page.locator('#folder').setInputFiles(chosen);
    await areaOf(rowOf(page, 'in-chosen'));
    assert.equal(await rowOf(page, 'too-deep').count(), 0);
    assert.equal(await page.locator('eg-notices li').count(), 0);
  });

  test('judges by the area that a device needs', async () => {
    await page.getByRole('textbox', { name: 'A device needs' }).fill('1000');
    await page.keyboard.press('Enter');
    await rowOf(page, 'flake-a').getByText('Too little').waitFor();
  });

  test('has complained of nothing and asked nobody else', () => {
    assert.deepEqual(visit.troubles, []);
    assert.deepEqual(visit.asked.filter((url) => !url.startsWith(app.address)), []);
  });

  /** A picture of the map when it no longer changes; one that differs from `other`, where that is given. */
  async function stillMap(other?: Buffer): Promise<Buffer> {
    const stage = page.locator('eg-map-stage');
    let last = await stage.screenshot();
    for (let tries = 0; tries < 40; tries++) {
      await page.waitForTimeout(150);
      const now = await stage.screenshot();
      if (now.equals(last) && !(other && now.equals(other))) return now;
      last = now;
    }
    throw new Error('the map did not come to rest');
  }
});
