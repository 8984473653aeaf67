/** Bundles the command line once per change of its source, because loading some two hundred TypeScript files takes longer than most of the work. Plain Node. */
import { createHash } from 'node:crypto';
import { existsSync, mkdirSync, readdirSync, renameSync, rmSync, statSync } from 'node:fs';
import { join } from 'node:path';
import { pathToFileURL } from 'node:url';

/** @type {Readonly<Record<string, string>>} */
const entries = { main: 'src/cli/main.ts', thread: 'src/cli/thread-work.ts' };

/**
 * Address of an entry of the command line: bundled, or where that cannot be made, the TypeScript itself with a loader for it.
 * @param {string} root the project's folder, ending in a separator
 * @param {'main' | 'thread'} name
 * @returns {Promise<string>}
 */
export async function entryOf(root, name) {
  try {
    const folder = join(root, 'node_modules', '.evenglow', stampOf(root));
    if (!existsSync(folder)) await bundle(root, folder);
    return pathToFileURL(join(folder, `${name}.mjs`)).href;
  } catch {
    // A read-only folder, say: slower to start, otherwise the same.
    const { register } = await import('tsx/esm/api');
    register({ tsconfig: `${root}tsconfig.json` });
    return pathToFileURL(join(root, /** @type {string} */ (entries[name]))).href;
  }
}

/** @param {string} root @param {string} folder */
async function bundle(root, folder) {
  const { build } = await import('esbuild');
  const parent = join(root, 'node_modules', '.evenglow');
  const made = `${folder}.${process.pid}`;
  mkdirSync(parent, { recursive: true });
  await build({
    absWorkingDir: root, entryPoints: entries, outdir: made, outExtension: { '.js': '.mjs' },
    bundle: true, splitting: true, format: 'esm', platform: 'node', target: 'node20', logLevel: 'silent',
    // Packages written for require() still ask for it.
    banner: { js: "import { createRequire as createRequireForPackages } from 'node:module'; const require = createRequireForPackages(import.meta.url);" },
  });
  try {
    renameSync(made, folder);
  } catch (error) {
    // Another start was faster.
    rmSync(made, { recursive: true, force: true });
    if (!existsSync(folder)) throw error;
  }
  for (const old of readdirSync(parent)) if (join(parent, old) !== folder && !old.includes('.')) rmSync(join(parent, old), { recursive: true, force: true });
}

/** Name for the state of the sources: paths, sizes and times of change of all files that could be in the bundle, and the packages'. @param {string} root */
function stampOf(root) {
  const hash = createHash('sha256');
  for (const folder of ['src', 'workers']) {
    for (const name of readdirSync(join(root, folder), { recursive: true }).map(String).sort()) {
      if (!name.endsWith('.ts')) continue;
      const { mtimeMs, size } = statSync(join(root, folder, name));
      hash.update(`${folder}/${name} ${mtimeMs} ${size}\n`);
    }
  }
  const lock = statSync(join(root, 'package-lock.json'));
  return hash.update(`${lock.mtimeMs} ${lock.size} ${process.version}`).digest('hex').slice(0, 24);
}
