/** The built page in Chromium, served as `npm start` serves it: it loads cleanly under its own policy. */
import assert from 'node:assert/strict';
import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import type { Server } from 'node:http';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { after, before, describe, test } from 'node:test';
import { chromium } from 'playwright-core';
import type { Browser, Page } from 'playwright-core';
import { build } from 'vite';
import { listenFrom, pageServer } from '../../../src/cli/serve/serve.ts';
import { findBrowser } from '../../../src/cli/setup/browser.mjs';
import { projectRoot } from '../../../src/cli/setup/set-up.mjs';

const executablePath = findBrowser(process.env, process.platform);

describe('the served page', { skip: executablePath ? false : 'no Chromium here; npm test installs one where it can' }, () => {
  const servers: Server[] = [];
  let browser: Browser;
  let folder = '';

  before(async () => {
    folder = mkdtempSync(join(tmpdir(), 'evenglow-test-'));
    browser = await chromium.launch({ executablePath: executablePath ?? '', args: process.getuid?.() === 0 ? ['--no-sandbox'] : [] });
  });
  after(async () => {
    await browser?.close();
    for (const server of servers) server.close().closeAllConnections();
    rmSync(folder, { recursive: true });
  });

  /** Opens `/` of a served folder and gathers what goes wrong and what is fetched. */
  async function open(served: string, colorScheme: 'dark' | 'light' = 'dark'): Promise<{ page: Page; troubles: string[]; asked: string[]; address: string }> {
    const server = pageServer(served);
    servers.push(server);
    const address = await listenFrom(server, '127.0.0.1', 0, () => {});
    const page = await browser.newPage({ colorScheme });
    const troubles: string[] = [];
    const asked: string[] = [];
    page.on('console', (message) => { if (['error', 'warning'].includes(message.type())) troubles.push(message.text()); });
    page.on('pageerror', (error) => troubles.push(error.message));
    page.on('requestfailed', (failed) => troubles.push(`${failed.url()} failed`));
    page.on('response', (response) => { if (response.status() >= 400) troubles.push(`${response.url()} ${response.status()}`); });
    page.on('request', (request) => asked.push(request.url()));
    await page.goto(address, { waitUntil: 'networkidle' });
    return { page, troubles, asked, address };
  }

  test('loads without a complaint, asks nobody else for anything, and shows its heading in both themes', async () => {
    const dist = join(folder, 'dist');
    await build({ root: `${projectRoot}web`, logLevel: 'error', build: { outDir: dist } });
    for (const [scheme, background] of [['dark', 'rgb(13, 18, 22)'], ['light', 'rgb(246, 247, 248)']] as const) {
      const { page, troubles, asked, address } = await open(dist, scheme);
      assert.equal(await page.getByRole('heading', { level: 1 }).textContent(), 'Evenglow');
      assert.equal(await page.evaluate('getComputedStyle(document.body).backgroundColor'), background);
      assert.deepEqual(troubles, []);
      assert.deepEqual(asked.filter((url) => !url.startsWith(address)), []);
      assert.ok(asked.length >= 3, 'page, style and script were asked for');
    }
  });

  test('may not make code from text, but its worker may', async () => {
    const site = join(folder, 'site');
    mkdirSync(join(site, 'assets'), { recursive: true });
    writeFileSync(join(site, 'index.html'), '<!doctype html><title>waiting</title><script type="module" src="./assets/main-1.js"></script><script>document.title = "inline ran"</script>');
    writeFileSync(join(site, 'assets/compute.worker-1.js'), `let said; try { said = new Function('return 6 * 7')(); } catch (error) { said = error.name; } postMessage(said);`);
    writeFileSync(join(site, 'assets/main-1.js'), `
      let here; try { here = new Function('return 1')(); } catch (error) { here = error.name; }
      const worker = new Worker(new URL('./compute.worker-1.js', import.meta.url), { type: 'module' });
      worker.onmessage = (event) => { document.title = 'page ' + here + ', worker ' + event.data; };`);
    const { page } = await open(site);
    // Asked from outside: the page's own policy lets no tool evaluate text in it again and again.
    for (let tries = 0; tries < 200 && (await page.title()) === 'waiting'; tries++) await page.waitForTimeout(50);
    assert.equal(await page.title(), 'page EvalError, worker 42');
  });
});
