/** Runs that are cancelled, and a computation that is lost in the middle of one. */
import assert from 'node:assert/strict';
import { after, before, describe, test } from 'node:test';
import type { Page } from 'playwright-core';
import { expectedOf } from './expected.ts';
import { scanPair } from './scan-files.ts';
import { ServedApp, areaOf, drop, rowOf, skip, until } from './served-app.ts';
import type { Visit } from './served-app.ts';

/** Large enough for a run to be met in its middle. */
const side = 512;

/** Keeps hold of the page's workers. */
const holdWorkers = `
  globalThis.workersHeld = [];
  const Original = Worker;
  globalThis.Worker = class extends Original { constructor(...given) { super(...given); workersHeld.push(this); } };
`;
/**
 * When the sample "late" has come to its third stage: ends all workers, and tells the page as the browser tells of one that failed. Asked for in the
 * page, because stages pass faster than one can ask from outside.
 */
const killInTime = `(() => {
  const { session } = document.querySelector('eg-app');
  session.addEventListener('change', function look() {
    const late = session.state.samples.find(({ name }) => name === 'late');
    if (late?.status !== 'working' || !(late.progress?.done >= 2)) return;
    session.removeEventListener('change', look);
    globalThis.killedAt = late.progress.stage;
    for (const worker of workersHeld.splice(0)) {
      worker.terminate();
      worker.dispatchEvent(new ErrorEvent('error', { message: 'lost on purpose', cancelable: true }));
    }
  });
})()`;

describe('interruptions', { skip, timeout: 240_000 }, () => {
  let app: ServedApp;
  let visit: Visit;
  let page: Page;
  let paths: readonly string[];

  before(async () => {
    app = await ServedApp.start();
    visit = await app.open(holdWorkers);
    page = visit.page;
    paths = scanPair(app.folder, 'long', side);
  });
  after(async () => { await app?.stop(); });

  test('a run is cancelled, says so, and can be started again', async () => {
    await drop(page, paths);
    const row = rowOf(page, 'long');
    await row.getByRole('button', { name: 'Cancel' }).click();
    await row.getByText('Cancelled.').waitFor();
    assert.equal(await row.locator('.big').count(), 0);
    assert.deepEqual(visit.troubles, []);
  });

  test('a worker that dies in the middle of a run is replaced, and the run repeated', async () => {
    await page.evaluate(killInTime);
    await rowOf(page, 'long').getByRole('button', { name: 'Appraise' }).click();
    const late = scanPair(app.folder, 'late', side, 'quarry-16');
    await drop(page, late);
    await page.getByText('The computation stopped unexpectedly and was started again.').first().waitFor();
    assert.match(await page.evaluate<string>('killedAt'), /^(flaws|barrier|sheet|ledger)$/);
    assert.equal(await areaOf(rowOf(page, 'late')), (await expectedOf(late)).area);
    assert.equal(await areaOf(rowOf(page, 'long')), (await expectedOf(paths)).area);
  });

  test('all else goes on: the invented samples come, and what was open is still looked at', async () => {
    await until(page, `document.querySelector('eg-app').session.state.samples.every((sample) => sample.status === 'ready')`);
    assert.equal(await page.locator('eg-tray-row .big').count(), 8);
    await rowOf(page, 'long').getByRole('button', { name: /long$/ }).click();
    await page.getByRole('heading', { level: 1 }).waitFor();
    await page.locator('eg-map-stage canvas').hover();
    await page.locator('eg-readout').getByText(/^(usable|bubble|residue|wrinkle|short|open|thin|thick)$/).waitFor();
    assert.deepEqual(visit.troubles, []);
  });
});
