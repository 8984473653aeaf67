/** Correcting flaws by hand as a person does, with the real computation behind it. */
import assert from 'node:assert/strict';
import { join } from 'node:path';
import { after, before, describe, test } from 'node:test';
import type { Locator, Page } from 'playwright-core';
import { expectedOf } from './expected.ts';
import { scanPair } from './scan-files.ts';
import { ServedApp, drop, plainText, rowOf, skip } from './served-app.ts';
import type { Visit } from './served-app.ts';

describe('corrections by hand', { skip, timeout: 240_000 }, () => {
  let app: ServedApp;
  let visit: Visit;
  let page: Page;
  let paths: readonly string[];

  before(async () => {
    app = await ServedApp.start();
    visit = await app.open();
    page = visit.page;
    paths = scanPair(join(app.folder, 'by-hand'), 'flake-h', 192);
    await drop(page, paths);
    await rowOf(page, 'flake-h').locator('.big').waitFor();
    await rowOf(page, 'flake-h').getByRole('button', { name: /flake-h$/ }).press('Enter');
    await page.locator('eg-chapter-flaws summary').first().click();
  });
  after(async () => { await app?.stop(); });

  const finding = async (): Promise<string> => plainText(await page.locator('eg-chapter-flaws .finding').textContent());
  const stage = (): Locator => page.locator('eg-map-stage');
  const tools = (): Locator => page.locator('eg-hand-tools');
  const undoButton = (label: string): Locator => page.getByRole('button', { name: `Undo: ${label}`, exact: true });
  const idle = async (): Promise<void> => { await page.locator('eg-sample-place eg-progress-line').waitFor({ state: 'detached' }); };
  const ledger = async (): Promise<readonly (string | null)[]> => Promise.all((await page.locator('eg-sample-place eg-ledger-bar li button').all()).map((button) => button.getAttribute('aria-label')));

  test('a flaw picked in the list is set to another class; the ledger follows, and undo brings both back', async () => {
    const { summary } = await expectedOf(paths);
    const largest = [...summary.flaws].sort((a, b) => b.areaUm2 - a.areaUm2)[0]!;
    const [as, was] = largest.cause === 'residue' ? ['bubble', 'residue'] as const : ['residue', largest.cause] as const;
    const [before, bookedBefore] = [await finding(), await ledger()];
    await page.locator('eg-flaw-table tbody button').first().click();
    const classes = tools().getByRole('group', { name: `Flaw ${largest.flaw} is`, exact: true });
    assert.equal(await classes.getByRole('button', { name: was }).getAttribute('aria-pressed'), 'true');
    await classes.getByRole('button', { name: as }).click();
    await undoButton(`flaw set to ${as}`).waitFor();
    await idle();
    // The same correction computed here.
    const [xUm, yUm] = largest.insideUm!;
    const expected = await expectedOf(paths, { corrections: [{ kind: 'reclassify', xUm: Math.round(xUm * 1e4) / 1e4, yUm: Math.round(yUm * 1e4) / 1e4, cause: as }] });
    const booked = expected.summary.ledger.find(({ cause }) => cause === as)!;
    assert.ok(booked.areaUm2 > (summary.ledger.find(({ cause }) => cause === as)?.areaUm2 ?? 0) + 0.9 * largest.areaUm2);
    await page.getByRole('button', { name: new RegExp(`^${as}, ${booked.areaUm2.toPrecision(3)}\\s`) }).waitFor();
    assert.equal(await classes.getByRole('button', { name: as }).getAttribute('aria-pressed'), 'true');
    assert.match(plainText(await tools().locator('.reason').textContent()), new RegExp(`^set by hand: ${as}$`));
    assert.notEqual(await finding(), before);
    await undoButton(`flaw set to ${as}`).click();
    await page.getByRole('button', { name: `Redo: flaw set to ${as}` }).waitFor();
    await idle();
    assert.deepEqual(await ledger(), bookedBefore);
    assert.equal(await finding(), before);
  });

  test('the brush paints under the mouse, and a flaw drawn there is in the list and can be dismissed', async () => {
    // The whole map stays in the middle whatever size the stage takes; the flaw of before had been brought there.
    await page.getByRole('button', { name: 'whole' }).click();
    await tools().getByRole('button', { name: 'brush' }).click();
    await page.getByText('Painting residue').waitFor();
    const box = (await stage().boundingBox())!;
    await page.mouse.move(box.x + 0.4 * box.width, box.y + 0.5 * box.height);
    await page.mouse.down();
    await page.mouse.move(box.x + 0.6 * box.width, box.y + 0.5 * box.height, { steps: 12 });
    await page.mouse.up();
    await undoButton('residue painted').waitFor();
    await idle();
    assert.equal(plainText(await page.locator('eg-chapter-flaws .count').textContent()), '1 by hand');
    await page.keyboard.press('Escape');
    await page.getByText('Painting residue').waitFor({ state: 'detached' });
    // The ledger has one more label now, which may have moved the map.
    const { width, height } = (await stage().boundingBox())!;
    await stage().click({ position: { x: 0.5 * width, y: 0.5 * height } });
    await tools().getByText(/painted by hand/).waitFor();
    await tools().getByRole('region', { name: 'Selected flaw' }).getByRole('button', { name: 'no flaw' }).click();
    await undoButton('flaw dismissed').waitFor();
    await idle();
    await page.keyboard.press('Control+z');
    await idle();
    await undoButton('residue painted').waitFor();
    await page.keyboard.press('Control+z');
    await idle();
    assert.equal(plainText(await page.locator('eg-chapter-flaws .count').textContent()), 'all by default');
  });

  test('has complained of nothing', () => {
    assert.deepEqual(visit.troubles, []);
  });
});
