import { withKernels } from './installed.ts';

/** As `nearestAdmitted` of flaws/; undefined where no kernel can. */
export function nearestByKernel(use: Uint8Array, columns: number, rows: number, withinPx: number): Int32Array | undefined {
  const pixels = use.length;
  return withKernels([pixels, 4 * pixels, 4 * pixels], (kernels, [at, nearestAt, queueAt]) => {
    const { buffer } = kernels.memory;
    new Uint8Array(buffer, at, pixels).set(use);
    kernels.nearestAdmitted(at!, columns, rows, nearestAt!, queueAt!, withinPx);
    return new Int32Array(buffer, nearestAt, pixels).slice();
  });
}
