/**
 * Runs browser test files in Chromium; child of all.mjs, which gets the totals as a message and shows
 * what is written to stderr (stdout is the test server's own chatter). CHROME_PATH names the browser.
 */
import { relative } from 'node:path';
import { startTestRunner } from '@web/test-runner';
import { chromeLauncher } from '@web/test-runner-chrome';
import { projectRoot } from '../../src/cli/setup/set-up.mjs';
import { browserModules } from './browser-modules.mjs';
import { noTotals } from './totals.mjs';

const totals = noTotals();
const quiet = ['--disable-quic', '--no-first-run', '--disable-background-networking', '--disable-component-update', '--disable-sync', '--disable-dev-shm-usage'];
// Chromium's sandbox does not start as root; everywhere else it stays on.
const args = process.getuid?.() === 0 ? [...quiet, '--no-sandbox'] : quiet;

const runner = await startTestRunner({
  readCliArgs: false,
  readFileConfig: false,
  autoExitProcess: false,
  config: {
    files: process.argv.slice(2),
    rootDir: projectRoot,
    browsers: [chromeLauncher({ launchOptions: { executablePath: process.env['CHROME_PATH'] ?? '', args } })],
    plugins: [browserModules(projectRoot)],
    reporters: [],
    staticLogging: true,
    concurrency: 2,
    testsFinishTimeout: 5 * 60 * 1000,
    testFramework: { config: { timeout: '20000' } },
  },
});
if (!runner) throw new Error('the browser test runner did not start');
runner.on('finished', () => {
  runner.stop();
});
runner.on('stopped', () => {
  for (const session of runner.sessions.all()) report(session);
  process.send?.(totals);
  process.disconnect?.();
});

/** @param {import('@web/test-runner').TestSession} session */
function report(session) {
  const file = relative(projectRoot, session.testFile ?? '');
  const before = totals.passed + totals.failed + totals.skipped;
  if (session.testResults) walk(session.testResults, [], file);
  for (const error of session.errors) fail(file, file, `${error.message}\n${error.stack ?? ''}`);
  if (!session.passed) for (const line of session.logs) process.stderr.write(`${file} logged: ${line.map(String).join(' ')}\n`);
  for (const missing of session.request404s) process.stderr.write(`${file} asked for ${missing}, which is not there.\n`);
  if (totals.passed + totals.failed + totals.skipped === before) fail(file, file, 'The file holds no tests, or did not load.');
}

/**
 * @param {import('@web/test-runner').TestSuiteResult} suite
 * @param {readonly string[]} names of the suites around it
 * @param {string} file
 */
function walk(suite, names, file) {
  for (const test of suite.tests) {
    if (test.skipped) totals.skipped++;
    else if (test.passed) totals.passed++;
    else fail([...names, test.name].join(' › '), file, described(test.error));
  }
  for (const inner of suite.suites) walk(inner, [...names, inner.name], file);
}

/** @param {import('@web/test-runner').TestResultError | undefined} error */
function described(error) {
  if (!error) return 'It failed without a message.';
  const values = error.expected !== undefined || error.actual !== undefined ? [`expected ${error.expected}`, `got ${error.actual}`] : [];
  const own = (error.stack ?? '').split('\n').filter((line) => /\/(test|src|web|workers)\//.test(line)).slice(0, 6);
  return [error.message, ...values, ...own.map((line) => line.trim())].join('\n');
}

/**
 * @param {string} title
 * @param {string} file
 * @param {string} message
 */
function fail(title, file, message) {
  totals.failed++;
  process.stderr.write(`\nFAILED ${title}\n  in ${file} (browser)\n${message.trim().replace(/^/gm, '  ')}\n`);
}
