import { withKernels } from './installed.ts';

/** As `greyOpening` of grid/, half widths in pixels; undefined where no kernel can. */
export function openedMap(values: Float32Array, columns: number, rows: number, halfX: number, halfY: number): Float32Array | undefined {
  const bytes = 4 * values.length;
  const sizes = [bytes, bytes, 4 * (columns + 2 * halfX + 16), 4 * (2 * halfY + 1) * columns, 4 * columns];
  return withKernels(sizes, (kernels, [at, otherAt, lineAt, backAt, aheadAt]) => {
    const held = new Float32Array(kernels.memory.buffer, at, values.length);
    held.set(values);
    kernels.greyOpening(at!, otherAt!, columns, rows, halfX, halfY, lineAt!, backAt!, aheadAt!);
    return held.slice();
  });
}
