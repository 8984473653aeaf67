/** Installs the packages that package-lock.json names, when they are not there yet. Plain Node, no packages. */
import { spawnSync } from 'node:child_process';
import { createHash } from 'node:crypto';
import { existsSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { SetUpError } from './set-up-error.mjs';

const waitStepMs = 250;
const waitLimitMs = 15 * 60 * 1000;

/**
 * Makes sure that node_modules holds what package-lock.json names. Does nothing when it does.
 * Two commands started at once on a fresh clone install once: the second waits for the first.
 * @param {string} root the project's folder
 * @param {(line: string) => void} say where progress goes
 * @throws {SetUpError} when npm cannot install them
 */
export function ensurePackages(root, say) {
  if (packagesAreThere(root)) return;
  const release = takeTurn(root, say);
  try {
    if (packagesAreThere(root)) return;
    say('Installing packages (once, about half a minute) …');
    runNpm(root);
    writeStamp(root);
  } finally {
    release();
  }
}

/**
 * Whether node_modules matches package-lock.json: by our own stamp, or, after an installation
 * by hand, by npm's record of what it installed (which then gets the stamp).
 * @param {string} root
 */
export function packagesAreThere(root) {
  if (readOr(join(root, 'node_modules/.evenglow-stamp'), '') === stampOf(root)) return true;
  if (!lockIsInstalled(readOr(join(root, 'package-lock.json'), ''), readOr(join(root, 'node_modules/.package-lock.json'), ''))) return false;
  writeStamp(root);
  return true;
}

/**
 * Whether everything the lock names was installed in the same version. Optional packages are
 * left out: they are for other machines.
 * @param {string} lockText package-lock.json
 * @param {string} installedText node_modules/.package-lock.json, '' when missing
 */
export function lockIsInstalled(lockText, installedText) {
  if (lockText === '' || installedText === '') return false;
  /** @type {Record<string, { version?: string, optional?: boolean, link?: boolean }>} */
  const wanted = JSON.parse(lockText).packages;
  /** @type {Record<string, { version?: string }>} */
  const installed = JSON.parse(installedText).packages;
  return Object.entries(wanted).every(([path, entry]) => path === '' || entry.optional || installed[path]?.version === entry.version);
}

/**
 * What the stamp says: the lock's content, and the machine, since some packages carry binaries.
 * @param {string} root
 */
function stampOf(root) {
  const lock = createHash('sha256').update(readOr(join(root, 'package-lock.json'), '')).digest('hex');
  return `${lock} ${process.platform} ${process.arch}\n`;
}

/** @param {string} root */
function writeStamp(root) {
  writeFileSync(join(root, 'node_modules/.evenglow-stamp'), stampOf(root));
}

/** @param {string} root */
function runNpm(root) {
  // NODE_ENV=production or a user's `omit=dev` would leave the build tools out.
  const args = ['ci', '--include=dev', '--include=optional', '--no-audit', '--no-fund', '--loglevel=error'];
  const own = process.env['npm_execpath'];
  const byPath = own !== undefined && /npm-cli\.c?js$/.test(own) && existsSync(own);
  // npm's output goes to our stderr (2): stdout belongs to results.
  const done = byPath
    ? spawnSync(process.execPath, [own, ...args], { cwd: root, stdio: ['ignore', 2, 2], env: npmEnvironment() })
    : spawnSync('npm', args, { cwd: root, stdio: ['ignore', 2, 2], env: npmEnvironment(), shell: process.platform === 'win32' });
  if (done.error) throw new SetUpError(`npm could not be started (${done.error.message}); install npm, or run "npm ci" in ${root} yourself.`);
  if (done.status !== 0) throw new SetUpError(`npm could not install the packages (its message stands above); check the network connection and run "npm ci" in ${root} yourself.`);
}

/** The environment without what an outer `npx` or `npm` asked for itself, such as --package or --dry-run. */
function npmEnvironment() {
  const env = { ...process.env };
  for (const name of ['package', 'call', 'dry_run', 'global', 'location', 'workspace', 'workspaces', 'prefix', 'omit', 'only', 'production']) {
    delete env[`npm_config_${name}`];
  }
  return env;
}

/**
 * Waits until no other process installs into this folder, then takes the turn.
 * @param {string} root
 * @param {(line: string) => void} say
 * @returns {() => void} gives the turn back
 */
function takeTurn(root, say) {
  const file = join(tmpdir(), `evenglow-set-up-${createHash('sha256').update(root).digest('hex').slice(0, 16)}`);
  const until = Date.now() + waitLimitMs;
  for (let told = false; Date.now() < until; told = true) {
    try {
      writeFileSync(file, String(process.pid), { flag: 'wx' });
      return () => rmSync(file, { force: true });
    } catch (error) {
      if (/** @type {NodeJS.ErrnoException} */ (error).code !== 'EEXIST') return () => {};
    }
    if (!isRunning(Number(readOr(file, '')))) {
      rmSync(file, { force: true });
      continue;
    }
    if (!told) say('Another process is installing the packages; waiting for it …');
    Atomics.wait(new Int32Array(new SharedArrayBuffer(4)), 0, 0, waitStepMs);
  }
  throw new SetUpError(`Another process has been installing packages for a quarter of an hour; when none is, remove ${file} and try again.`);
}

/** @param {number} pid */
function isRunning(pid) {
  // An empty file: its writer has made it and not yet filled it. Taken for running.
  if (!Number.isInteger(pid) || pid <= 0) return true;
  try {
    process.kill(pid, 0);
    return true;
  } catch (error) {
    return /** @type {NodeJS.ErrnoException} */ (error).code === 'EPERM';
  }
}

/**
 * @param {string} file
 * @param {string} fallback
 */
function readOr(file, fallback) {
  try {
    return readFileSync(file, 'utf8');
  } catch {
    return fallback;
  }
}
