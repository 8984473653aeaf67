/** Finds a Chromium for the browser tests, or installs one from the system's packages. Plain Node. */
import { spawnSync } from 'node:child_process';
import { accessSync, constants, statSync } from 'node:fs';
import { delimiter, join } from 'node:path';
import { SetUpError } from './set-up-error.mjs';

const commands = ['chromium', 'chromium-browser', 'google-chrome', 'google-chrome-stable', 'chrome', 'microsoft-edge'];

const usualPlaces = {
  linux: ['/usr/bin/chromium', '/usr/bin/chromium-browser', '/usr/bin/google-chrome', '/opt/google/chrome/chrome', '/snap/bin/chromium'],
  darwin: [
    '/Applications/Chromium.app/Contents/MacOS/Chromium',
    '/Applications/Google Chrome.app/Contents/MacOS/Google Chrome',
    '/Applications/Microsoft Edge.app/Contents/MacOS/Microsoft Edge',
  ],
  win32: [
    'C:\\Program Files\\Google\\Chrome\\Application\\chrome.exe',
    'C:\\Program Files (x86)\\Google\\Chrome\\Application\\chrome.exe',
    'C:\\Program Files (x86)\\Microsoft\\Edge\\Application\\msedge.exe',
  ],
};

/**
 * Path of an installed browser of the Chromium family: CHROME_PATH, else the search path, else the usual places.
 * @param {NodeJS.ProcessEnv} env
 * @param {string} platform as `process.platform` names it
 * @returns {string | undefined}
 * @throws {SetUpError} when CHROME_PATH names no program
 */
export function findBrowser(env, platform) {
  const given = env['CHROME_PATH'];
  if (given) {
    if (isProgram(given)) return given;
    throw new SetUpError(`CHROME_PATH is ${given}, where there is no program; point it at a Chromium or Chrome, or unset it.`);
  }
  const folders = (env['PATH'] ?? '').split(delimiter).filter(Boolean);
  const onPath = folders.flatMap((folder) => commands.map((command) => join(folder, command)));
  const usual = usualPlaces[/** @type {keyof typeof usualPlaces} */ (platform)] ?? [];
  return [...onPath, ...usual].find(isProgram);
}

/**
 * Path of a browser, installed with apt-get when there is none and this process may do that.
 * @param {(line: string) => void} say where progress goes
 * @returns {string}
 * @throws {SetUpError} when there is none and none can be installed
 */
export function ensureBrowser(say) {
  const found = findBrowser(process.env, process.platform);
  if (found) return found;
  const wayOut = 'install Chromium or Chrome, or set CHROME_PATH to one, and run the command again.';
  if (process.platform !== 'linux') throw new SetUpError(`The browser tests found no Chromium; ${wayOut}`);
  if (process.getuid?.() !== 0) throw new SetUpError(`The browser tests found no Chromium, and only root may install one; ${wayOut}`);
  say('Installing Chromium from the system’s packages (once) …');
  const env = { ...process.env, DEBIAN_FRONTEND: 'noninteractive' };
  for (const args of [['update'], ['install', '-y', '--no-install-recommends', 'chromium']]) {
    const done = spawnSync('apt-get', ['-qq', ...args], { env, stdio: ['ignore', 'ignore', 2] });
    if (done.error) throw new SetUpError(`The browser tests found no Chromium, and this system has no apt-get to install one; ${wayOut}`);
    if (done.status !== 0) throw new SetUpError(`The browser tests found no Chromium, and "apt-get ${args.join(' ')}" failed (its message stands above); ${wayOut}`);
  }
  const installed = findBrowser(process.env, process.platform);
  if (!installed) throw new SetUpError(`The package "chromium" of this system brought no browser; ${wayOut}`);
  return installed;
}

/** @param {string} file */
function isProgram(file) {
  try {
    accessSync(file, constants.X_OK);
    return statSync(file).isFile();
  } catch {
    return false;
  }
}
