/**
 * `npm test`: sets a fresh clone up, then checks types and lint, builds, and runs all tests in Node and in
 * Chromium. The last line is the sum of everything. `npm test -- grid` runs only test files with "grid" in their path.
 */
import { fork, spawnSync } from 'node:child_process';
import { readdirSync } from 'node:fs';
import { join, relative } from 'node:path';
import { projectRoot, say, setUp } from '../../src/cli/setup/set-up.mjs';
import { addTotals, exitCode, lastLine, noTotals } from './totals.mjs';

const graceMs = 5000;

setUp().then(all).catch((error) => {
  say(error && error.stack ? error.stack : String(error));
  process.stdout.write(`${lastLine({ passed: 0, failed: 1, skipped: 0 })}\n`);
  process.exit(1);
});

async function all() {
  const wanted = process.argv.slice(2);
  const files = testFiles().filter((file) => wanted.length === 0 || wanted.some((part) => relative(projectRoot, file).includes(part)));
  const inBrowser = files.filter((file) => /[\\/]test[\\/]browser[\\/]/.test(file));
  const inNode = files.filter((file) => !inBrowser.includes(file));

  const parts = [];
  const browser = await findOrInstallBrowser();
  if (typeof browser !== 'string') parts.push(browser);
  const env = typeof browser === 'string' ? { ...process.env, CHROME_PATH: browser } : process.env;

  if (wanted.length === 0) {
    parts.push(check('types', 'test/run/types.mjs', []));
    parts.push(check('lint', 'node_modules/oxlint/bin/oxlint', []));
  }
  parts.push(check('build', 'node_modules/vite/bin/vite.js', ['build', 'web', '--logLevel', 'warn']));
  const tests = [];
  if (inNode.length > 0) tests.push(await runFiles('Node', 'test/run/node-tests.mjs', inNode, env));
  if (inBrowser.length > 0 && typeof browser === 'string') tests.push(await runFiles('browser', 'test/run/browser-tests.mjs', inBrowser, env));
  const { passed, failed } = addTotals(tests);
  if (passed + failed === 0) {
    process.stdout.write('\nFAILED no test ran\n');
    tests.push({ passed: 0, failed: 1, skipped: 0 });
  }

  const totals = addTotals([...parts, ...tests]);
  process.exitCode = exitCode(totals);
  process.stdout.write(`\n${lastLine(totals)}\n`);
}

/** Its path, or one failure when there is none: the browser tests could not run then. */
async function findOrInstallBrowser() {
  const { ensureBrowser } = await import('../../src/cli/setup/browser.mjs');
  try {
    return ensureBrowser(say);
  } catch (error) {
    process.stdout.write(`\nFAILED browser\n  ${/** @type {Error} */ (error).message}\n`);
    return { passed: 0, failed: 1, skipped: 0 };
  }
}

/** All test files, by full path. */
function testFiles() {
  const folder = join(projectRoot, 'test');
  return readdirSync(folder, { recursive: true })
    .map(String)
    .filter((name) => name.endsWith('.test.ts'))
    .sort()
    .map((name) => join(folder, name));
}

/**
 * A program that is one check: it passes with exit code 0.
 * @param {string} name
 * @param {string} script below the project's folder
 * @param {readonly string[]} args
 */
function check(name, script, args) {
  const start = Date.now();
  const done = spawnSync(process.execPath, [join(projectRoot, script), ...args], { cwd: projectRoot, stdio: ['ignore', 'inherit', 'inherit'] });
  const passed = done.status === 0;
  process.stdout.write(passed ? `${name}: good, ${since(start)}\n` : `\nFAILED ${name} (its messages stand above)\n`);
  return { passed: passed ? 1 : 0, failed: passed ? 0 : 1, skipped: 0 };
}

/**
 * Runs test files in a child process, which sends its totals. A child that ends without them is one failure.
 * @param {string} name
 * @param {string} script
 * @param {readonly string[]} files
 * @param {NodeJS.ProcessEnv} env
 * @returns {Promise<import('./totals.mjs').Totals>}
 */
function runFiles(name, script, files, env) {
  const start = Date.now();
  return new Promise((resolve) => {
    /** @type {import('./totals.mjs').Totals | undefined} */
    let totals;
    const child = fork(join(projectRoot, script), [...files], { cwd: projectRoot, env, execArgv: ['--import', import.meta.resolve('tsx')], stdio: ['ignore', 'ignore', 1, 'ipc'] });
    child.on('message', (message) => {
      totals = /** @type {import('./totals.mjs').Totals} */ (message);
      // All it had to say has been said; a handle that it left open must not hold up the rest.
      setTimeout(() => child.kill(), graceMs).unref();
    });
    child.on('exit', (code) => {
      if (totals) {
        process.stdout.write(`${name} tests: ${lastLine(totals)} in ${files.length} ${files.length === 1 ? 'file' : 'files'}, ${since(start)}\n`);
      } else {
        process.stdout.write(`\nFAILED ${name} tests: their runner ended with code ${code} before it could count\n`);
      }
      resolve(totals ?? { ...noTotals(), failed: 1 });
    });
  });
}

/** @param {number} start */
function since(start) {
  return `${((Date.now() - start) / 1000).toFixed(1)} s`;
}
