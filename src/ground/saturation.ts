/**
 * Level at which an amplifier clips: the largest value, when far more pixels sit within a ten-thousandth of it than the
 * next hundredth of the range would lead one to expect (a smooth distribution puts about one in a hundred there).
 *
 * @param values current times the bias's sign; NaN missing.
 * @returns the clipping level, or undefined when the map does not show one.
 */
export function findSaturation(values: Float32Array): number | undefined {
  let top = Number.NEGATIVE_INFINITY;
  for (const value of values) if (value > top) top = value;
  if (!(top > 0) || !Number.isFinite(top)) return undefined;
  let at = 0;
  let near = 0;
  for (const value of values) {
    if (value >= top * (1 - 1e-4)) at++;
    else if (value >= top * (1 - 1e-2)) near++;
  }
  return at >= 6 && at > 0.2 * near ? top : undefined;
}
