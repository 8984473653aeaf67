/** Thresholds under a held handle, ground picked by hand and the method page, with the real computation behind them. */
import assert from 'node:assert/strict';
import { join } from 'node:path';
import { after, before, describe, test } from 'node:test';
import type { Locator, Page } from 'playwright-core';
import { expectedOf } from './expected.ts';
import { scanPair } from './scan-files.ts';
import { ServedApp, drop, plainText, rowOf, skip } from './served-app.ts';
import type { Visit } from './served-app.ts';

describe('thresholds and ground by hand', { skip, timeout: 240_000 }, () => {
  let app: ServedApp;
  let visit: Visit;
  let page: Page;
  let paths: readonly string[];

  before(async () => {
    app = await ServedApp.start();
    visit = await app.open();
    page = visit.page;
    paths = scanPair(join(app.folder, 'thresholds'), 'flake-t', 192);
    await drop(page, paths);
    await rowOf(page, 'flake-t').locator('.big').waitFor();
    await rowOf(page, 'flake-t').getByRole('button', { name: /flake-t$/ }).press('Enter');
  });
  after(async () => { await app?.stop(); });

  const undoButton = (label: string | RegExp): Locator => page.getByRole('button', { name: typeof label === 'string' ? `Undo: ${label}` : label });
  const idle = async (): Promise<void> => { await page.locator('eg-sample-place eg-progress-line').waitFor({ state: 'detached' }); };
  const ledger = async (): Promise<readonly (string | null)[]> => Promise.all((await page.locator('eg-sample-place eg-ledger-bar li button').all()).map((button) => button.getAttribute('aria-label')));
  const changed = async (from: readonly (string | null)[]): Promise<readonly (string | null)[]> => {
    for (const end = Date.now() + 20_000; Date.now() < end; await page.waitForTimeout(20)) {
      const now = await ledger();
      if (JSON.stringify(now) !== JSON.stringify(from)) return now;
    }
    throw new Error('the areas did not change');
  };

  test('a knob says what a height means against the noise of this map, as the stage used it', async () => {
    await page.locator('eg-chapter-flaws summary').first().click();
    const { summary } = await expectedOf(paths);
    const { heightNoiseNm, heightRuledBy } = summary.thresholds!;
    const words = plainText(await page.locator('eg-chapter-flaws eg-knob .meaning').first().textContent());
    assert.ok(words.startsWith(`= ${(0.8 / heightNoiseNm!).toFixed(1)} × this map’s noise (`), words);
    assert.equal(words.includes('this limit rules here'), heightRuledBy === 'height');
  });

  test('areas and map follow the handle while it is held; letting go is one step, and undo brings all back', async () => {
    const before = await ledger();
    const slider = page.getByRole('slider', { name: 'Height above ground, slider' });
    await slider.scrollIntoViewIfNeeded();
    const { x, y, width, height } = (await slider.boundingBox())!;
    const picture = (): Promise<Buffer> => page.locator('eg-map-stage').screenshot();
    const shown = await picture();
    await page.mouse.move(x + 0.393 * width, y + height / 2);
    await page.mouse.down();
    await page.mouse.move(x + 0.95 * width, y + height / 2, { steps: 10 });
    const held = await changed(before);
    assert.notDeepEqual(held, before);
    await page.waitForTimeout(400);
    assert.ok(!(await picture()).equals(shown), 'the map shows what the handle would lead to');
    assert.equal(await undoButton(/^Undo$/).isDisabled(), true, 'no step yet');
    await page.mouse.up();
    await undoButton(/^Undo: height above ground/).waitFor();
    await idle();
    await undoButton(/^Undo: height above ground/).click();
    await page.getByRole('button', { name: /^Redo: height above ground/ }).waitFor();
    await idle();
    assert.deepEqual(await ledger(), before);
    assert.equal(await undoButton(/^Undo$/).isDisabled(), true, 'it was one step');
  });

  test('spots clicked on the map level by hand, and give way to the automatic ground', async () => {
    await page.locator('eg-chapter-flaws summary').first().click();
    await page.locator('eg-chapter-ground summary').first().click();
    await page.getByRole('button', { name: 'whole' }).click();
    await page.getByRole('button', { name: 'pick ground by hand' }).click();
    const { width, height } = (await page.locator('eg-map-stage').boundingBox())!;
    for (const [u, v] of [[0.2, 0.3], [0.8, 0.35], [0.45, 0.75]] as const) await page.locator('eg-map-stage').click({ position: { x: u * width, y: v * height } });
    await page.getByRole('button', { name: 'level by these 3' }).click();
    await undoButton('ground by 3 spots').waitFor();
    await idle();
    const places = await page.locator('eg-chapter-ground ol li').allTextContents();
    assert.equal(places.length, 3);
    await page.locator('eg-chapter-ground').getByText('fitted to 3 spots picked by hand').waitFor();
    await page.getByRole('button', { name: 'back to automatic' }).click();
    await undoButton('automatic ground').waitFor();
    await idle();
    await page.locator('eg-chapter-ground').getByText('fitted to ground found automatically').waitFor();
  });

  test('the method page opens at the topic of a knob and leads back to where one was; its script is loaded only then', async () => {
    const isMethod = (address: string): boolean => address.includes('method');
    assert.equal(visit.asked.filter(isMethod).length, 0);
    await page.getByRole('button', { name: 'Tip wear: how this is done' }).click();
    await page.getByRole('heading', { name: 'How ground and flaws are found' }).waitFor();
    assert.equal(visit.asked.filter(isMethod).length, 1);
    assert.equal(await page.evaluate<string>('document.querySelector("eg-app").shadowRoot.querySelector("eg-method-place").shadowRoot.activeElement.id'), 'wear');
    await page.getByRole('button', { name: 'back to the sample' }).first().click();
    await page.getByRole('button', { name: 'pick ground by hand' }).waitFor();
  });

  test('has complained of nothing', () => {
    assert.deepEqual(visit.troubles, []);
  });
});
