/**
 * Development-server plugin of the browser tests: turns TypeScript into JavaScript file by file, and
 * bundles the packages that are imported by name once, in memory, so that CommonJS ones work too.
 */
import { join } from 'node:path';
import { build, transform } from 'esbuild';
import { readGraph } from '../architecture/graph.ts';

const packagesPath = '/packages-for-tests/';
const forBrowsers = /^(src|workers|web|test\/browser)\//;
const notForBrowsers = /^(src\/cli\/|web\/vite\.config\.ts$)/;

/**
 * @param {string} root the project's folder
 * @returns {import('@web/test-runner').TestRunnerPlugin}
 */
export function browserModules(root) {
  /** Bundled text by address. @type {Map<string, string>} */
  let bundled = new Map();
  /** Address by the name imported. @type {Map<string, string>} */
  let addresses = new Map();
  return {
    name: 'browser-modules',
    async serverStart() {
      const names = packagesUsed(root);
      addresses = new Map(names.map((name, index) => [name, `${packagesPath}${entryName(index)}.js`]));
      bundled = await bundlePackages(root, names);
    },
    resolveImport({ source }) {
      return addresses.get(source);
    },
    resolveMimeType(context) {
      return context.path.endsWith('.ts') ? 'js' : undefined;
    },
    serve(context) {
      const body = bundled.get(context.path);
      return body === undefined ? undefined : { body, type: 'js' };
    },
    async transform(context) {
      if (!context.path.endsWith('.ts') || typeof context.body !== 'string') return undefined;
      return { body: await toJavaScript(context.body, context.path), transformCache: true };
    },
  };
}

/**
 * @param {string} body TypeScript
 * @param {string} path
 */
async function toJavaScript(body, path) {
  try {
    const { code } = await transform(body, {
      loader: 'ts',
      target: 'es2022',
      sourcefile: path,
      sourcemap: 'inline',
      tsconfigRaw: { compilerOptions: { useDefineForClassFields: false, verbatimModuleSyntax: true } },
    });
    return code;
  } catch (error) {
    // An answer without a body would only read "failed to fetch" in the browser.
    return `throw new SyntaxError(${JSON.stringify(String(error))});`;
  }
}

/**
 * Names of the packages that our files import for the browser. A file that does not parse names none and
 * a package that is not there is left out: the tests that need them will say so, and the others run.
 * @param {string} root
 */
function packagesUsed(root) {
  const graph = readGraph(root, true);
  const names = [...graph.values()]
    .filter((source) => forBrowsers.test(source.path) && !notForBrowsers.test(source.path))
    .flatMap((source) => source.links)
    .filter((link) => link.outside && link.kind !== 'type')
    .map((link) => link.to);
  return [...new Set(names)].filter(isInstalled).sort();
}

/** @param {string} name */
function isInstalled(name) {
  try {
    return Boolean(import.meta.resolve(name));
  } catch {
    return false;
  }
}

/**
 * @param {string} root
 * @param {readonly string[]} names
 */
async function bundlePackages(root, names) {
  const { outputFiles } = await build({
    absWorkingDir: root,
    entryPoints: names.map((name, index) => ({ in: name, out: entryName(index) })),
    outdir: join(root, packagesPath),
    bundle: true,
    splitting: true,
    write: false,
    format: 'esm',
    platform: 'browser',
    target: 'es2022',
    logLevel: 'error',
    plugins: [emptyNodeModules],
  });
  return new Map(outputFiles.map((file) => [file.path.slice(root.replace(/[\\/]$/, '').length).replaceAll('\\', '/'), file.text]));
}

/** The TIFF reader names Node modules that it uses only in Node. @type {import('esbuild').Plugin} */
const emptyNodeModules = {
  name: 'empty-node-modules',
  setup(bundle) {
    bundle.onResolve({ filter: /^(node:)?(fs|http|https|url)$/ }, (asked) => ({ path: asked.path, namespace: 'empty' }));
    bundle.onLoad({ filter: /./, namespace: 'empty' }, () => ({ contents: 'module.exports = {};' }));
  },
};

/** @param {number} index */
function entryName(index) {
  return `package-${index}`;
}
