/** The app as a person gets it: built, served by our own server under its own policy, in a real Chromium. */
import { mkdtempSync, rmSync } from 'node:fs';
import type { Server } from 'node:http';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { chromium } from 'playwright-core';
import type { Browser, Locator, Page } from 'playwright-core';
import { build } from 'vite';
import { listenFrom, pageServer } from '../../src/cli/serve/serve.ts';
import { findBrowser } from '../../src/cli/setup/browser.mjs';
import { projectRoot } from '../../src/cli/setup/set-up.mjs';

/** A busy machine with one worker takes its time over the invented samples. */
const patienceMs = 45_000;

const executablePath = findBrowser(process.env, process.platform);

/** For the options of a suite: what there is to say where no browser is. */
export const skip: string | false = executablePath ? false : 'no Chromium here; npm test installs one where it can';

export interface Visit {
  readonly page: Page;
  /** Console errors and warnings, uncaught errors, failed requests and answers of 400 and above. */
  readonly troubles: string[];
  /** Every address that was asked for. */
  readonly asked: string[];
}

export class ServedApp {
  /** An empty folder for files to drop. */
  readonly folder: string;
  readonly address: string;
  private readonly server: Server;
  private readonly browser: Browser;
  private readonly top: string;

  private constructor(top: string, server: Server, address: string, browser: Browser) {
    this.top = top;
    this.folder = mkdtempSync(join(top, 'files-'));
    this.server = server;
    this.address = address;
    this.browser = browser;
  }

  /** Builds the page into a folder of its own, serves it on a free port and starts the browser. */
  static async start(): Promise<ServedApp> {
    const top = mkdtempSync(join(tmpdir(), 'evenglow-e2e-'));
    const dist = join(top, 'dist');
    await build({ root: `${projectRoot}web`, logLevel: 'error', build: { outDir: dist } });
    const server = pageServer(dist);
    const address = await listenFrom(server, '127.0.0.1', 0, () => {});
    const args = process.getuid?.() === 0 ? ['--no-sandbox', '--disable-dev-shm-usage'] : ['--disable-dev-shm-usage'];
    return new ServedApp(top, server, address, await chromium.launch({ executablePath: executablePath ?? '', args }));
  }

  /** @param before script that runs in the page before its own. */
  async open(before?: string): Promise<Visit> {
    const page = await this.newPage();
    return this.goTo(page, before);
  }

  /** The same with the browser's record of the given categories, which `stopTrace` ends and gives as JSON. */
  async trace(categories: readonly string[], before?: string): Promise<Visit & { readonly stopTrace: () => Promise<string> }> {
    const page = await this.newPage();
    await this.browser.startTracing(page, { categories: [...categories] });
    return { ...await this.goTo(page, before), stopTrace: async () => (await this.browser.stopTracing()).toString() };
  }

  private async newPage(): Promise<Page> {
    const page = await this.browser.newPage({ viewport: { width: 1440, height: 900 }, colorScheme: 'dark' });
    page.setDefaultTimeout(patienceMs);
    return page;
  }

  private async goTo(page: Page, before: string | undefined): Promise<Visit> {
    const troubles: string[] = [];
    const asked: string[] = [];
    page.on('console', (message) => { if (['error', 'warning'].includes(message.type())) troubles.push(message.text()); });
    page.on('pageerror', (error) => troubles.push(error.message));
    page.on('requestfailed', (failed) => troubles.push(`${failed.url()} failed`));
    page.on('response', (response) => { if (response.status() >= 400) troubles.push(`${response.url()} ${response.status()}`); });
    page.on('request', (request) => asked.push(request.url()));
    if (before !== undefined) await page.addInitScript(before);
    await page.goto(this.address);
    return { page, troubles, asked };
  }

  async stop(): Promise<void> {
    await this.browser.close();
    this.server.close().closeAllConnections();
    rmSync(this.top, { recursive: true });
  }
}

/** Drops files and folders of the disk on the page as the system's file manager does: once the page has said that it would take them. */
export async function drop(page: Page, paths: readonly string[]): Promise<void> {
  const devTools = await page.context().newCDPSession(page);
  const data = { items: [], files: [...paths], dragOperationsMask: 1 };
  const drag = (type: 'dragEnter' | 'dragOver' | 'drop'): Promise<unknown> => devTools.send('Input.dispatchDragEvent', { type, x: 700, y: 500, data });
  const cover = page.getByText('Drop to appraise');
  await drag('dragEnter');
  for (const end = Date.now() + patienceMs; !(await cover.isVisible()) && Date.now() < end; await page.waitForTimeout(50)) await drag('dragOver');
  // A busy page may answer one dragOver too late, and the browser then refuses the drop and ends the drag: a person takes the files up again.
  for (const end = Date.now() + patienceMs; (await cover.isVisible()) && Date.now() < end; await page.waitForTimeout(500)) {
    await drag('dragEnter');
    for (let n = 0; n < 3; n++) {
      await drag('dragOver');
      await page.waitForTimeout(50);
    }
    await drag('drop');
  }
  await cover.waitFor({ state: 'hidden' });
  await devTools.detach();
}

/** When an expression is true in the page. The browser tool's own way repeats it inside the page, where the policy forbids to evaluate text. */
export async function until(page: Page, expression: string): Promise<void> {
  for (const end = Date.now() + patienceMs; !(await page.evaluate<boolean>(expression)); await page.waitForTimeout(50)) {
    if (Date.now() > end) throw new Error(`it did not come true: ${expression}`);
  }
}

/** The row of a sample in the tray. */
export function rowOf(page: Page, name: string): Locator {
  return page.locator('eg-tray-row').filter({ has: page.getByRole('button', { name: new RegExp(`(^|· )${name}$`) }) });
}

/** Texts are compared without the page's no-break spaces. */
export function plainText(text: string | null): string {
  return (text ?? '').replace(/\s+/g, ' ').trim();
}

/** The area that a sample's row shows, once there is one. */
export async function areaOf(row: Locator): Promise<string> {
  return plainText(await row.locator('.big').textContent());
}
