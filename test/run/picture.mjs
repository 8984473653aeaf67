/**
 * Makes the README's picture: `node test/run/picture.mjs` writes web/picture.png, the Sample place of an invented sample at 1440 × 900
 * in the dark theme, from the page as it is built now. Run it after a change of the look and commit the picture. CHROME_PATH names the browser.
 */
import { mkdtempSync, rmSync, statSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { decode, encode } from 'fast-png';
import { chromium } from 'playwright-core';
import { register } from 'tsx/esm/api';
import { build } from 'vite';
import { ensureBrowser } from '../../src/cli/setup/browser.mjs';
import { projectRoot, say } from '../../src/cli/setup/set-up.mjs';

const sample = 'quarry-07';
const picture = `${projectRoot}web/picture.png`;
const mostBytes = 300_000;

register();
const { listenFrom, pageServer } = await import('../../src/cli/serve/serve.ts');
const dist = mkdtempSync(join(tmpdir(), 'evenglow-picture-'));
const args = process.getuid?.() === 0 ? ['--no-sandbox', '--disable-dev-shm-usage'] : [];
const browser = await chromium.launch({ executablePath: ensureBrowser(say), args });
await build({ root: `${projectRoot}web`, logLevel: 'error', build: { outDir: dist } });
const server = pageServer(dist);
try {
  const page = await browser.newPage({ viewport: { width: 1440, height: 900 }, colorScheme: 'dark' });
  await page.goto(await listenFrom(server, '127.0.0.1', 0, say));
  await page.getByRole('button', { name: new RegExp(`${sample}$`) }).click({ timeout: 120_000 });
  // With values under the cursor and the flaws opened, the picture shows what the place is for.
  await page.locator('eg-chapter-flaws summary').click();
  const map = page.locator('eg-map-stage');
  await map.waitFor();
  const box = await map.boundingBox();
  if (!box) throw new Error('the map is not on the page');
  await page.mouse.move(box.x + 0.46 * box.width, box.y + 0.5 * box.height);
  await page.locator('eg-readout').getByText('nm').first().waitFor();
  await page.waitForTimeout(1500);
  writeFileSync(picture, smaller(await page.screenshot()));
  const bytes = statSync(picture).size;
  say(`web/picture.png: ${bytes} bytes`);
  if (bytes > mostBytes) throw new Error(`the picture has ${bytes} bytes, more than the ${mostBytes} that a README should load`);
} finally {
  await browser.close();
  server.close().closeAllConnections();
  rmSync(dist, { recursive: true });
}

/**
 * The same picture in steps of four per colour, which nobody sees and which halves the file: the map's noise packs badly.
 * @param {Uint8Array} png
 */
function smaller(png) {
  const { width, height, channels, data } = decode(png);
  const rgb = new Uint8Array(width * height * 3);
  for (let i = 0; i < width * height; i++) {
    for (let c = 0; c < 3; c++) rgb[3 * i + c] = Math.min(255, 4 * Math.round((data[channels * i + c] ?? 0) / 4));
  }
  return encode({ width, height, data: rgb, channels: 3, depth: 8 }, { zlib: { level: 9 } });
}
