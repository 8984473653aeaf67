/** Compiles the kernels (src/kernels/assembly) when they changed. Plain Node; the compiler is one of the installed packages. */
import { spawnSync } from 'node:child_process';
import { createHash } from 'node:crypto';
import { existsSync, readFileSync, readdirSync, renameSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { SetUpError } from './set-up-error.mjs';

/** Where the compiled module lies, from the project's folder. */
export const kernelsFile = 'src/kernels/kernels.wasm';
const sources = 'src/kernels/assembly';
const stamp = 'node_modules/.evenglow-kernels';
const compiler = 'node_modules/assemblyscript/bin/asc.js';

/** 65536 pages are all that an address reaches; how much is asked for is the caller's decision (src/kernels/installed.ts). */
const options = ['--runtime', 'stub', '--enable', 'simd', '-O3', '--converge', '--noAssert', '--initialMemory', '16', '--maximumMemory', '65536'];

/**
 * Makes sure that the compiled kernels are those of the sources. Does nothing when they are, nor where the project's folder cannot be written:
 * Evenglow computes the same without them, more slowly.
 * @param {string} root the project's folder
 * @param {(line: string) => void} say where progress goes
 * @throws {SetUpError} when the sources do not compile
 */
export function ensureKernels(root, say) {
  const wanted = stampOf(root);
  if (existsSync(join(root, kernelsFile)) && readOr(join(root, stamp)) === wanted) return;
  // A name of its own, then a rename: two commands at once must not read each other's half.
  const draft = `${kernelsFile.replace('.wasm', '')}.${process.pid}.wasm`;
  try {
    writeFileSync(join(root, draft), '');
  } catch {
    return;
  }
  try {
    say('Compiling kernels (once, some seconds) …');
    const done = spawnSync(process.execPath, [compiler, `${sources}/index.ts`, '--outFile', draft, ...options], { cwd: root, encoding: 'utf8' });
    if (done.error || done.status !== 0) throw new SetUpError(`The kernels in ${sources} do not compile:\n${done.error?.message ?? done.stderr}`);
    renameSync(join(root, draft), join(root, kernelsFile));
    writeFileSync(join(root, stamp), wanted);
  } finally {
    rmSync(join(root, draft), { force: true });
  }
}

/**
 * What the compiled module depends on: sources, options, compiler.
 * @param {string} root
 */
function stampOf(root) {
  const hash = createHash('sha256').update(options.join(' '));
  for (const name of readdirSync(join(root, sources)).sort()) if (name.endsWith('.ts')) hash.update(`\0${name}\0`).update(readFileSync(join(root, sources, name)));
  hash.update(readOr(join(root, 'node_modules/assemblyscript/package.json')));
  return `${hash.digest('hex')}\n`;
}

/** @param {string} file */
function readOr(file) {
  try {
    return readFileSync(file, 'utf8');
  } catch {
    return '';
  }
}
