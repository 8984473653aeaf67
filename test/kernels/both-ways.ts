import assert from 'node:assert/strict';
import { readFile } from 'node:fs/promises';
import { join } from 'node:path';
import { ensureKernels, kernelsFile } from '../../src/cli/setup/kernels.mjs';
import { projectRoot } from '../../src/cli/setup/set-up.mjs';
import { compileKernels, installKernels, removeKernels } from '../../src/kernels/installed.ts';
import type { Random } from '../../src/stats/random.ts';

ensureKernels(projectRoot, () => {});
const compiled = await compileKernels(await readFile(join(projectRoot, kernelsFile)));

/** What plain TypeScript and what the kernel make of the same input; a kernel that leaves it to the plain TypeScript fails. */
export function bothWays<T, K>(plain: () => T, kernel: () => K | undefined): { plain: T; kernel: K } {
  removeKernels();
  const ofPlain = plain();
  installKernels(compiled);
  try {
    const ofKernel = kernel();
    assert.ok(ofKernel !== undefined, 'the kernel did not run');
    return { plain: ofPlain, kernel: ofKernel };
  } finally {
    removeKernels();
  }
}

/** Equal to the bit: −0 is not 0; NaN is NaN. */
export function assertSame(actual: ArrayLike<number>, expected: ArrayLike<number>, what: string): void {
  assert.equal(actual.length, expected.length, what);
  for (let i = 0; i < actual.length; i++) if (!Object.is(actual[i], expected[i])) assert.fail(`${what}: ${actual[i]} instead of ${expected[i]} at ${i}`);
}

/** Single pixels, single rows and columns, widths on both sides of 8 and 16. */
export const shapes: readonly (readonly [columns: number, rows: number])[] = [
  [1, 1], [1, 7], [7, 1], [1, 128], [128, 1], [8, 3], [9, 5], [15, 4], [16, 16], [17, 16], [33, 40], [100, 71], [3, 300], [300, 3], [257, 129],
];

/** Shares of set pixels: none, few, about where regions of 4- and 8-connectivity join up, nearly all, all. */
export const shares = [0, 0.02, 0.3, 0.41, 0.59, 0.98, 1] as const;

/** A mask with that share of non-zero pixels, not all of them 1. */
export function randomMask(random: Random, pixels: number, share: number): Uint8Array {
  return Uint8Array.from({ length: pixels }, () => (random.uniform() < share ? (random.uniform() < 0.9 ? 1 : 200) : 0));
}

/** Normal numbers with ties, both zeros, and a share of NaN. */
export function randomMap(random: Random, pixels: number, missing: number): Float32Array {
  return Float32Array.from({ length: pixels }, () => {
    const kind = random.uniform();
    if (kind < missing) return Number.NaN;
    const value = random.normal();
    return kind > 0.9 ? 0 : kind > 0.8 ? -0 : kind > 0.6 ? Math.round(value) : value;
  });
}
