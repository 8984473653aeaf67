/**
 * Runs test files under node:test, two processes at a time; child of all.mjs, which gets the totals
 * as a message and shows what is written to stderr.
 */
import { run } from 'node:test';
import { relative } from 'node:path';
import { fileURLToPath } from 'node:url';
import { describeFailure } from './failure.mjs';
import { noTotals } from './totals.mjs';

const processes = 2;
const fileLimitMs = 5 * 60 * 1000;
const slowMs = 5000;

const root = fileURLToPath(new URL('../../', import.meta.url));
const files = process.argv.slice(2);
const totals = noTotals();
/** Names of the tests that enclose the one at hand, by depth. @type {string[]} */
const names = [];
/** What each file printed, kept for files that fail. @type {Map<string, string>} */
const printed = new Map();
/** @type {Set<string>} */
const failedFiles = new Set();
/** @type {Map<string, number>} */
const seconds = new Map();

const stream = run({ files, concurrency: processes, timeout: fileLimitMs });
stream.on('test:start', (data) => {
  names[data.nesting] = data.name;
});
stream.on('test:pass', (data) => {
  if (isFile(data)) return fail(data, 'The file holds no tests.');
  count(data);
});
stream.on('test:fail', (data) => {
  /** @type {{ failureType?: string, cause?: unknown }} */
  const error = data.details.error;
  if (data.todo !== undefined) {
    totals.skipped++;
    return;
  }
  if (error.failureType === 'subtestsFailed') {
    // Said by its subtests already; a suite is no test, a test with subtests is one.
    if (!isSuite(data)) totals.failed++;
    return;
  }
  fail(data, describeFailure(error, root));
});
stream.on('test:stdout', keep);
stream.on('test:stderr', keep);
// What a file did after its tests had ended is only said here.
stream.on('test:diagnostic', (data) => {
  if (data.file !== undefined && /^(Error|Warning)/.test(data.message)) keep({ file: data.file, message: `${data.message}\n` });
});
stream.on('end', () => {
  for (const file of failedFiles) {
    const text = printed.get(file)?.trim();
    if (text) process.stderr.write(`\n${shown(file)} printed:\n${text}\n`);
  }
  for (const [file, ms] of seconds) {
    if (ms > slowMs) process.stderr.write(`slow: ${shown(file)} ${(ms / 1000).toFixed(1)} s\n`);
  }
  process.send?.(totals);
  process.disconnect?.();
});
stream.resume();

/** @typedef {{ name: string, nesting: number, file?: string, skip?: unknown, todo?: unknown, details: { duration_ms: number } }} Event */

/** @param {Event} data */
function count(data) {
  const file = data.file ?? '';
  if (data.nesting === 0) seconds.set(file, (seconds.get(file) ?? 0) + data.details.duration_ms);
  if (isSuite(data)) return;
  if (data.skip !== undefined || data.todo !== undefined) totals.skipped++;
  else totals.passed++;
}

/**
 * @param {Event} data
 * @param {string} message
 */
function fail(data, message) {
  totals.failed++;
  const file = data.file ?? data.name;
  failedFiles.add(file);
  const title = isFile(data) ? shown(file) : [...names.slice(0, data.nesting), data.name].join(' › ');
  process.stderr.write(`\nFAILED ${title}\n  in ${shown(file)}\n${indent(message)}\n`);
}

/** node:test reports a file that holds no test, or dies outside its tests, as a test named after the file. @param {Event} data */
function isFile(data) {
  return data.nesting === 0 && files.some((file) => file === data.name || shown(file) === data.name);
}

/** @param {Event} data */
function isSuite(data) {
  return /** @type {{ type?: string }} */ (data.details).type === 'suite';
}

/** @param {{ file?: string, message: string }} data */
function keep(data) {
  const file = data.file ?? '';
  printed.set(file, (printed.get(file) ?? '') + data.message);
}

/** @param {string} file */
function shown(file) {
  return relative(root, file);
}

/** @param {string} text */
function indent(text) {
  return text.replace(/^/gm, '  ');
}
