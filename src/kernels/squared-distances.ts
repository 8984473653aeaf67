import { withKernels } from './installed.ts';

/** Steps along a column are held in 16 bits. */
const mostRows = 65534;

/** As `squaredDistance` of grid/; undefined where no kernel can. The mask must be columns × rows. */
export function squaredDistances(mask: Uint8Array, columns: number, rows: number, pitchX: number, pitchY: number, outsideIsBackground: boolean): Float32Array | undefined {
  if (rows > mostRows) return undefined;
  const pixels = mask.length;
  const sizes = [pixels, 2 * pixels, 8 * columns, 8 * (columns + 1), 4 * columns, 4 * pixels, rows];
  return withKernels(sizes, (kernels, [at, stepsAt, heightAt, boundsAt, centresAt, resultAt, filledAt]) => {
    const { buffer } = kernels.memory;
    new Uint8Array(buffer, at, pixels).set(mask);
    kernels.squaredDistances(
      at!, columns, rows, (pitchY / pitchX) ** 2, pitchX * pitchX, outsideIsBackground ? 1 : 0, stepsAt!, heightAt!, boundsAt!, centresAt!, resultAt!, filledAt!,
    );
    const result = new Float32Array(pixels);
    const filled = new Uint8Array(buffer, filledAt, rows);
    for (let row = filled.indexOf(1); row >= 0; row = filled.indexOf(1, row)) {
      const next = filled.indexOf(0, row);
      const end = next < 0 ? rows : next;
      result.set(new Float32Array(buffer, resultAt! + 4 * row * columns, (end - row) * columns), row * columns);
      row = end;
    }
    return result;
  });
}
