/**
 * Level at which an amplifier clips: the largest value, when far more pixels sit within a ten-thousandth of it than the
 * next hundredth of the range would lead one to expect (a smooth distribution puts about one in a hundred there).
 *
 * @param values current times the bias's sign; NaN missing.
 * @returns the clipping level, or undefined when the map does not show one.
 */
export function findSaturation(values: Float32Array): number | undefined {
  const top = largestOf(values);
  if (!(top > 0) || !Number.isFinite(top)) return undefined;
  const at = countFrom(values, top * (1 - 1e-4));
  const near = countFrom(values, top * (1 - 1e-2)) - at;
  return at >= 6 && at > 0.2 * near ? top : undefined;
}

function largestOf(values: Float32Array): number {
  let top = Number.NEGATIVE_INFINITY;
  for (let i = 0; i < values.length; i++) if (values[i]! > top) top = values[i]!;
  return top;
}

function countFrom(values: Float32Array, least: number): number {
  let count = 0;
  for (let i = 0; i < values.length; i++) if (values[i]! >= least) count++;
  return count;
}
