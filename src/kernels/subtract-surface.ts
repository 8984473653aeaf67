import { withKernels } from './installed.ts';

/**
 * `values` less the surface Σ byRow[r, n] · byColumn[c, n] over n < terms, in that order; NaN stays NaN. Undefined where no kernel can.
 *
 * @param byRow rows × terms; @param byColumn columns × terms.
 */
export function withoutSurface(values: Float32Array, columns: number, rows: number, terms: number, byRow: Float64Array, byColumn: Float64Array): Float32Array | undefined {
  return withKernels([4 * values.length, 8 * byRow.length, 8 * byColumn.length], (kernels, [at, rowAt, columnAt]) => {
    const { buffer } = kernels.memory;
    const held = new Float32Array(buffer, at, values.length);
    held.set(values);
    new Float64Array(buffer, rowAt, byRow.length).set(byRow);
    // By term first, so that neighbouring columns lie side by side.
    const turned = new Float64Array(buffer, columnAt, byColumn.length);
    for (let c = 0, k = 0; c < columns; c++) for (let n = 0; n < terms; n++) turned[n * columns + c] = byColumn[k++]!;
    kernels.subtractSurface(at!, columns, rows, terms, rowAt!, columnAt!);
    return held.slice();
  });
}
