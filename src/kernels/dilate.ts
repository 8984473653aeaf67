import { withKernels } from './installed.ts';

/** As `dilate` of flaws/; undefined where no kernel can. */
export function dilateByKernel(mask: Uint8Array, columns: number, rows: number, radius: number): Uint8Array | undefined {
  const pixels = mask.length;
  return withKernels([pixels, pixels, pixels], (kernels, [at, alongAt, outAt]) => {
    const { buffer } = kernels.memory;
    new Uint8Array(buffer, at, pixels).set(mask);
    kernels.dilate(at!, columns, rows, radius, alongAt!, outAt!);
    return new Uint8Array(buffer, outAt, pixels).slice();
  });
}
