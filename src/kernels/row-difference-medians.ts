import { withKernels } from './installed.ts';

export interface RowMedians {
  /** By lag in the order given, then by row: how many differences were admitted, and their median where at least `least` were. */
  readonly counts: Int32Array;
  readonly medians: Float64Array;
}

/**
 * Medians of the differences between each row and the row `lag` before it, for every lag; undefined where no kernel can. Differences are taken at every
 * `step`-th column, starting at row modulo step, where `use` admits both pixels and they differ by no more than `limit`.
 */
export function rowDifferenceMedians(
  values: Float32Array, columns: number, rows: number, lags: readonly number[], step: number, limit: number, least: number, use: (index: number) => boolean,
): RowMedians | undefined {
  const sizes = [4 * values.length, 8 * rows * lags.length, 4 * rows * lags.length, 8 * (columns + 1), 8 * (columns + 1)];
  return withKernels(sizes, (kernels, [at, mediansAt, countsAt, firstAt, secondAt]) => {
    const { buffer } = kernels.memory;
    const admitted = new Float32Array(buffer, at, values.length);
    for (let i = 0; i < admitted.length; i++) admitted[i] = use(i) ? values[i]! : Number.NaN;
    const counts = new Int32Array(buffer, countsAt, rows * lags.length).fill(0);
    for (const [k, lag] of lags.entries()) {
      kernels.rowDifferenceMedians(at!, columns, rows, lag, step, limit, least, mediansAt! + 8 * k * rows, countsAt! + 4 * k * rows, firstAt!, secondAt!);
    }
    return { counts: counts.slice(), medians: new Float64Array(buffer, mediansAt, rows * lags.length).slice() };
  });
}
