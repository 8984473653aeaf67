/** The project's own import graph keeps the rules, and the checker is known to notice a breach of each. */
import assert from 'node:assert/strict';
import { readFileSync } from 'node:fs';
import { describe, test } from 'node:test';
import { fileURLToPath } from 'node:url';
import { graphOf, readGraph } from './graph.ts';
import { importsOf } from './imports-of.ts';
import { breaches } from './rules.ts';
import type { Declared } from './rules.ts';

const root = fileURLToPath(new URL('../../', import.meta.url));
const declared: Declared = { dependencies: ['lit', 'comlink', 'ndarray', 'zod'], devDependencies: ['vite', '@types/node'] };

describe('the import graph of this project', () => {
  const graph = readGraph(root);

  test('holds the files that are there', () => {
    assert.ok(graph.has('src/grid/maps.ts') && graph.has('web/main.ts') && graph.has('src/cli/evenglow.mjs'));
    assert.ok(graph.get('src/recipe/recipe.ts')?.links.some((link) => link.to === 'src/ground/recipe.ts'));
  });

  test('keeps every rule', () => {
    const { dependencies, devDependencies } = JSON.parse(readFileSync(`${root}package.json`, 'utf8')) as Record<'dependencies' | 'devDependencies', Record<string, string>>;
    assert.deepEqual(breaches(graph, { dependencies: Object.keys(dependencies), devDependencies: Object.keys(devDependencies) }), []);
  });
});

describe('reading imports', () => {
  test('finds every form and tells their kinds apart', () => {
    const text = [
      `import a, { type B } from './value.ts';`,
      `import type { C } from './type.ts';`,
      `import './effect.ts';`,
      `export { d } from './again.ts';`,
      `export type { E } from './type-again.ts';`,
      `export * from './all.ts';`,
      `let f: import('./inline.ts').F;`,
      `const g = () => import('./lazy.ts');`,
      `const h = new Worker(new URL('./x.worker.ts', import.meta.url), { type: 'module' });`,
    ].join('\n');
    assert.deepEqual(importsOf('a.ts', text).found.map(({ target, kind }) => `${kind} ${target}`), [
      'value ./value.ts', 'type ./type.ts', 'value ./effect.ts', 'value ./again.ts', 'type ./type-again.ts',
      'value ./all.ts', 'type ./inline.ts', 'lazy ./lazy.ts', 'url ./x.worker.ts',
    ]);
  });

  test('is not misled by comments and texts', () => {
    const text = `// import './no.ts'\n/* import './no.ts' */ const a = "import './no.ts'"; const b = \`import('./no.ts')\`; const c = /import '.\\/no'/;`;
    assert.deepEqual(importsOf('a.ts', text), { found: [], unreadable: [] });
  });

  test('reports a target that is computed', () => {
    assert.deepEqual(importsOf('a.ts', `import(name + '.ts');`).unreadable, [`import(name + '.ts')`]);
  });
});

describe('the checker notices', () => {
  const cases: readonly (readonly [title: string, files: Readonly<Record<string, string>>, expected: readonly string[]])[] = [
    ['nothing in a good graph', {
      'src/problems/read.ts': `export const readSentences = {};`,
      'src/problems/catalogue.ts': `import { readSentences } from './read.ts'; export const all = readSentences;`,
      'src/grid/maps.ts': `import type { NdArray } from 'ndarray'; import '../problems/catalogue.ts';`,
      'src/read/recipe.ts': `import '../grid/maps.ts';`,
      'src/ledger/ledger.ts': `import '../read/recipe.ts';`,
      'src/recipe/recipe.ts': `import '../read/recipe.ts';`,
      'src/evaluate/evaluate.ts': `import '../recipe/recipe.ts'; import '../ledger/ledger.ts';`,
      'src/cli/main.ts': `import 'node:fs'; import '../evaluate/evaluate.ts'; import '../../workers/compute.ts';`,
      'workers/api.ts': `import type { A } from '../src/evaluate/evaluate.ts';`,
      'workers/compute.ts': `import '../src/evaluate/evaluate.ts'; import './api.ts';`,
      'workers/a.worker.ts': `import 'comlink'; import './compute.ts';`,
      'workers/client.ts': `import 'comlink'; import type { B } from './api.ts'; new Worker(new URL('./a.worker.ts', import.meta.url));`,
      'web/main.ts': `import { html } from 'lit'; import 'lit/directives/map.js'; import '../workers/client.ts'; import './look.css';`,
      'test/grid/maps.test.ts': `import 'node:test'; import '../../src/grid/maps.ts'; new URL(name + '.png', import.meta.url);`,
    }, []],
    ['a base folder that imports a stage', { 'src/grid/a.ts': `import '../read/b.ts';` },
      ['src/grid/a.ts imports src/read/b.ts: a base folder imports only problems, schema, grid, stats']],
    ['a kernel that imports a base folder, by type alone', { 'src/kernels/a.ts': `import type { B } from '../grid/b.ts';`, 'src/stats/c.ts': `import '../kernels/a.ts';` },
      ['src/kernels/a.ts imports src/grid/b.ts: kernels import nothing of src']],
    ['a stage that imports a later one, by type alone', { 'src/ground/a.ts': `import type { B } from '../ledger/b.ts';` },
      ['src/ground/a.ts imports src/ledger/b.ts: ground comes before ledger']],
    ['a stage that imports what lies above', { 'src/report/a.ts': `export type { R } from '../evaluate/b.ts';` },
      ['src/report/a.ts imports src/evaluate/b.ts: report comes before evaluate']],
    ['a recipe that takes more than a section', { 'src/recipe/recipe.ts': `import '../ground/wear.ts';` },
      ['src/recipe/recipe.ts imports src/ground/wear.ts: recipe takes only recipe.ts from a stage']],
    ['a sentence file with an import', { 'src/problems/read.ts': `import './problem.ts';` },
      ['src/problems/read.ts imports src/problems/problem.ts: a file of sentences imports nothing']],
    ['a Node module in the science, lazily too', { 'src/read/a.ts': `import('node:fs');` },
      ['src/read/a.ts imports node:fs: only src/cli imports Node modules']],
    ['a worker in the science', { 'src/read/a.ts': `let w: import('../../workers/api.ts').Api;` },
      ['src/read/a.ts imports workers/api.ts: src without src/cli imports only src']],
    ['the page in a command', { 'src/cli/a.ts': `import '../../web/main.ts';`, 'web/main.ts': `` },
      ['src/cli/a.ts imports web/main.ts: src imports neither web nor test']],
    ['science in the page, by type alone', { 'web/a.ts': `import type { A } from '../src/grid/maps.ts';` },
      ['web/a.ts imports src/grid/maps.ts: web imports only web, workers/client.ts and workers/api.ts']],
    ['a worker started by the page itself', { 'web/a.ts': `new Worker(new URL('../workers/a.worker.ts', import.meta.url));` },
      ['web/a.ts imports workers/a.worker.ts: web imports only web, workers/client.ts and workers/api.ts']],
    ['a package that the page must not have', { 'web/a.ts': `import { z } from 'zod';` },
      ['web/a.ts imports zod: web imports no packages but lit and comlink']],
    ['the array library reaching the page through others', {
      'web/a.ts': `import '../workers/client.ts';`,
      'workers/client.ts': `import '../src/grid/maps.ts';`,
      'src/grid/maps.ts': `import ndarray from 'ndarray';`,
    }, ['the page loads ndarray, which belongs into a worker: web/a.ts → workers/client.ts → src/grid/maps.ts → ndarray']],
    ['the page in a worker', { 'workers/a.ts': `import '../web/a.ts';`, 'web/a.ts': `` },
      ['workers/a.ts imports web/a.ts: workers import only workers and src without src/cli']],
    ['the wire inside the computation', { 'workers/compute.ts': `import 'comlink';` },
      ['workers/compute.ts imports comlink: only the wire between page and worker uses comlink']],
    ['a Node module in a browser test', { 'test/browser/a.test.ts': `import 'node:test';` },
      ['test/browser/a.test.ts imports node:test: a browser has no Node modules']],
    ['a package that nobody declared', { 'src/read/a.ts': `import 'left-pad';`, 'test/a.test.ts': `import '@some/thing/deep.js';` },
      ['src/read/a.ts imports left-pad: it is no dependency in package.json', 'test/a.test.ts imports @some/thing/deep.js: package.json does not name this package']],
    ['a circle, types included', {
      'src/grid/a.ts': `import './b.ts';`, 'src/grid/b.ts': `import type { C } from './c.ts';`, 'src/grid/c.ts': `import './a.ts';`,
    }, ['imports run in a circle: src/grid/a.ts → src/grid/b.ts → src/grid/c.ts → src/grid/a.ts']],
    ['a folder whose name says nothing', { 'test/helpers/a.ts': `` }, ['test/helpers/a.ts lies in a folder called helpers, which says nothing']],
    ['a folder that the design does not know', { 'src/extra/a.ts': `` }, ['src/extra/a.ts lies in no folder of the design']],
    ['a file that is too long', { 'web/look.css': 'a{}\n'.repeat(301), 'src/grid/a.ts': '\n'.repeat(300) }, ['web/look.css has 301 lines, more than 300']],
    ['an import that it cannot read', { 'src/read/a.ts': `import(x);` }, ['src/read/a.ts hides what it imports: import(x)']],
  ];
  for (const [title, files, expected] of cases) {
    test(title, () => assert.deepEqual(breaches(graphOf(files), declared), expected));
  }
});
