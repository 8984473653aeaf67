/** Compiling kernels: when they are, when they are not, and what a mistake in them leads to. */
import assert from 'node:assert/strict';
import { existsSync, mkdirSync, mkdtempSync, readFileSync, readdirSync, rmSync, statSync, symlinkSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { after, before, test } from 'node:test';
import { ensureKernels, kernelsFile } from '../../../src/cli/setup/kernels.mjs';
import { projectRoot } from '../../../src/cli/setup/set-up.mjs';

let root = '';
let said: string[] = [];
before(() => {
  root = mkdtempSync(join(tmpdir(), 'evenglow-test-'));
  mkdirSync(join(root, 'src/kernels/assembly'), { recursive: true });
  mkdirSync(join(root, 'node_modules'));
  symlinkSync(join(projectRoot, 'node_modules/assemblyscript'), join(root, 'node_modules/assemblyscript'), 'junction');
});
after(() => rmSync(root, { recursive: true, force: true }));

const source = (text: string): void => writeFileSync(join(root, 'src/kernels/assembly/index.ts'), text);
const ensure = (): void => {
  said = [];
  ensureKernels(root, (line) => said.push(line));
};
async function answer(): Promise<number> {
  const { WebAssembly } = globalThis as unknown as { WebAssembly: { instantiate(bytes: Uint8Array): Promise<{ instance: { exports: { answer(): number } } }> } };
  return (await WebAssembly.instantiate(readFileSync(join(root, kernelsFile)))).instance.exports.answer();
}

test('are compiled once, again when a source changes or the result is gone, and a mistake is a sentence that leaves the last result', async () => {
  source('export function answer(): i32 { return 1; }');
  ensure();
  assert.equal(await answer(), 1);
  assert.equal(said.length, 1);

  const { mtimeMs } = statSync(join(root, kernelsFile));
  ensure();
  assert.deepEqual([said.length, statSync(join(root, kernelsFile)).mtimeMs], [0, mtimeMs]);

  source('export function answer(): i32 { return 2; }');
  ensure();
  assert.equal(await answer(), 2);

  rmSync(join(root, kernelsFile));
  ensure();
  assert.ok(existsSync(join(root, kernelsFile)));

  source('export function answer(): i32 { return nothing; }');
  assert.throws(ensure, { name: 'SetUpError', message: /src\/kernels\/assembly do not compile:[^]*nothing/ });
  assert.equal(await answer(), 2);
  assert.deepEqual(readdirSync(join(root, 'src/kernels')).sort(), ['assembly', 'kernels.wasm']);
});
