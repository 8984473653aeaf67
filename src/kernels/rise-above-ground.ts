import { withKernels } from './installed.ts';

/** As `riseAboveGround` of flaws/ with windows of 2 × half + 1 pixels; undefined where no kernel can. */
export function riseOverGround(values: Float32Array, columns: number, rows: number, half: number, startM: number, rounds: number): Float32Array | undefined {
  const pixels = values.length;
  const corners = (columns + 1) * (rows + 1);
  return withKernels([4 * pixels, pixels, 8 * corners, 4 * corners, 4 * pixels], (kernels, [at, useAt, sumsAt, countsAt, riseAt]) => {
    const { buffer } = kernels.memory;
    new Float32Array(buffer, at, pixels).set(values);
    kernels.riseAboveGround(at!, useAt!, columns, rows, half, startM, rounds, sumsAt!, countsAt!, riseAt!);
    return new Float32Array(buffer, riseAt, pixels).slice();
  });
}
