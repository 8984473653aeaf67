import { readFile } from 'node:fs/promises';
import { join } from 'node:path';
import { compileKernels, installKernels } from '../kernels/installed.ts';
import { root } from './root.ts';

/** Installs the compiled kernels in this thread. Where there are none the plain TypeScript computes the same, more slowly. */
export async function loadKernels(): Promise<void> {
  try {
    installKernels(await compileKernels(await readFile(join(root, 'src/kernels/kernels.wasm'))));
  } catch {
    // No file, or a Node built without WebAssembly: nothing that the person could notice but the time.
  }
}
