/** How the page is built; run as `vite build web`. */
import { defineConfig } from 'vite';
import type { Plugin } from 'vite';

/** The TIFF reader names Node modules that it uses only in Node; in the page and its workers they are empty. */
function withoutNodeModules(): Plugin {
  const empty = '\0empty';
  return {
    name: 'without-node-modules',
    enforce: 'pre',
    resolveId: (id) => (/^(node:)?(fs|http|https|url)$/.test(id) ? empty : null),
    load: (id) => (id === empty ? 'export default {};' : null),
  };
}

export default defineConfig({
  base: './',
  plugins: [withoutNodeModules()],
  worker: { format: 'es', plugins: () => [withoutNodeModules()] },
  build: {
    outDir: '../dist',
    emptyOutDir: true,
    target: 'es2022',
    // A small .wasm would otherwise become a data: address, which the page's policy refuses.
    assetsInlineLimit: 0,
    modulePreload: { polyfill: false },
  },
});
