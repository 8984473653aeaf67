/** Makes a fresh clone ready. Imported by the start scripts; run by itself it only sets up. Plain Node, no packages. */
import { realpathSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { nodeTooOld } from './node-version.mjs';

/** The project's folder, whatever the current one is. */
export const projectRoot = fileURLToPath(new URL('../../../', import.meta.url));

/**
 * Checks Node's version, installs missing packages and compiles the kernels; ends the process with a sentence and code 1 when it cannot.
 * Progress goes to stderr.
 */
export async function setUp() {
  const tooOld = nodeTooOld(process.versions.node);
  if (tooOld) stop(tooOld);
  // Loaded only now: an older Node could not even parse it.
  const { ensurePackages } = await import('./packages.mjs');
  const { ensureKernels } = await import('./kernels.mjs');
  try {
    ensurePackages(projectRoot, say);
    ensureKernels(projectRoot, say);
  } catch (error) {
    if (/** @type {Error} */ (error).name !== 'SetUpError') throw error;
    stop(/** @type {Error} */ (error).message);
  }
}

/** @param {string} line */
export function say(line) {
  process.stderr.write(line + '\n');
}

/**
 * @param {string} sentence
 * @returns {never}
 */
function stop(sentence) {
  say(sentence);
  process.exit(1);
}

if (process.argv[1] && realpathSync(process.argv[1]) === fileURLToPath(import.meta.url)) setUp();
