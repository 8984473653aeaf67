/**
 * The kernels of this thread. Without any, the chain computes the same on its plain TypeScript, more slowly. This folder imports nothing of src,
 * so that everything may import it.
 */

/** A compiled `WebAssembly.Module`; the science's own library has no name for it. */
export type KernelModule = object;

/** What the module exports: addresses, counts and plain numbers. Each is described where it is written, in assembly/. */
export interface KernelExports {
  readonly memory: { readonly buffer: ArrayBuffer; grow(pages: number): number };
  findRuns(mask: number, columns: number, rows: number, reach: number, starts: number, ends: number, parents: number): number;
  numberRuns(starts: number, ends: number, parents: number, runs: number, pixels: number): number;
  squaredDistances(
    mask: number, columns: number, rows: number, ratio: number, unit: number, outside: number,
    steps: number, height: number, bounds: number, centres: number, result: number, filled: number,
  ): void;
  greyOpening(values: number, other: number, columns: number, rows: number, halfX: number, halfY: number, line: number, back: number, ahead: number): void;
  rowDifferenceMedians(
    values: number, columns: number, rows: number, lag: number, step: number, limit: number, least: number,
    medians: number, counts: number, first: number, second: number,
  ): void;
  riseAboveGround(
    values: number, use: number, columns: number, rows: number, half: number, startM: number, rounds: number, sums: number, counts: number, rise: number,
  ): void;
  nearestAdmitted(use: number, columns: number, rows: number, nearest: number, queue: number, within: number): void;
  dilate(mask: number, columns: number, rows: number, radius: number, along: number, out: number): void;
  subtractSurface(values: number, columns: number, rows: number, terms: number, byRow: number, byColumn: number): void;
  colourMap(
    data: number, columns: number, width: number, height: number, left: number, right: number, top: number, bottom: number,
    factor: number, from: number, perUnit: number, palette: number, missing: number, rgba: number,
  ): void;
}

declare const WebAssembly: {
  readonly compile: (bytes: Uint8Array) => Promise<KernelModule>;
  readonly Instance: new (module: KernelModule) => { readonly exports: unknown };
};

const pageBytes = 65536;
/** Below lies what the compiler may have put there. */
const firstAddress = 1024;
/** A call that needs more is left to the plain TypeScript: addresses stay far below 2 GiB and a large map does not need its memory twice. */
const mostBytes = 768 * 2 ** 20;
/** Memory of a module never shrinks: an instance that has grown beyond this is dropped after the call. */
const keptBytes = 64 * 2 ** 20;

let module: KernelModule | undefined;
/** Made at the first call, of the module that it names. */
let instance: { readonly of: KernelModule; readonly kernels: KernelExports } | undefined;

/** Compiles the content of kernels.wasm. Rejects where it is not WebAssembly, or the machine does not know a part of it. */
export function compileKernels(bytes: Uint8Array): Promise<KernelModule> {
  return WebAssembly.compile(bytes);
}

/**
 * From now on this thread computes with the kernels of `compiled` (see assembly/; built by the set-up). Results are the same to the bit
 * with and without.
 */
export function installKernels(compiled: KernelModule): void {
  module = compiled;
}

/** Back to plain TypeScript. */
export function removeKernels(): void {
  module = undefined;
}

/** Whether kernels are installed. */
export function kernelsInstalled(): boolean {
  return module !== undefined;
}

/**
 * Runs `work` with memory for parts of the given sizes in bytes, each at an address that 16 divides and with at least 32 bytes behind it; their content is
 * undefined. Views of the memory must be made inside `work` and not outlive it.
 *
 * @returns what `work` returns, or undefined when no kernels are installed or the memory is not to be had: then the plain TypeScript has to do it.
 */
export function withKernels<T>(sizes: readonly number[], work: (kernels: KernelExports, addresses: readonly number[]) => T): T | undefined {
  if (!module) return undefined;
  const addresses: number[] = [];
  let end = firstAddress;
  for (const size of sizes) {
    addresses.push(end);
    end += Math.ceil(size / 16) * 16 + 32;
  }
  if (end > mostBytes) return undefined;
  if (instance?.of !== module) instance = { of: module, kernels: new WebAssembly.Instance(module).exports as KernelExports };
  const { kernels } = instance;
  const { memory } = kernels;
  const missing = end - memory.buffer.byteLength;
  if (missing > 0) {
    try {
      memory.grow(Math.ceil(missing / pageBytes));
    } catch {
      return undefined;
    }
  }
  const result = work(kernels, addresses);
  if (memory.buffer.byteLength > keptBytes) instance = undefined;
  return result;
}
