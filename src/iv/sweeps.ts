/** The ways up and down of a sweep. */

/**
 * For every point whether the bias is rising (+1) or falling (−1); 0 throughout where it never moves.
 * A turn counts when the bias comes back by more than a fiftieth of its whole range, so that a bias
 * that was measured with noise does not turn at every point.
 */
export function sweepDirections(biasV: Float64Array): Int8Array {
  const n = biasV.length;
  const directions = new Int8Array(n);
  if (n === 0) return directions;
  let low = biasV[0]!;
  let high = biasV[0]!;
  for (const bias of biasV) {
    low = Math.min(low, bias);
    high = Math.max(high, bias);
  }
  const turn = (high - low) / 50;
  let direction: -1 | 0 | 1 = 0;
  let extreme = 0;
  for (let k = 1; k < n; k++) {
    if (direction === 0) {
      if (Math.abs(biasV[k]! - biasV[0]!) > turn) {
        direction = biasV[k]! > biasV[0]! ? 1 : -1;
        directions.fill(direction, 0, k + 1);
        extreme = k;
      }
      continue;
    }
    if ((biasV[k]! - biasV[extreme]!) * direction >= 0) extreme = k;
    else if ((biasV[extreme]! - biasV[k]!) * direction > turn) {
      direction = direction === 1 ? -1 : 1;
      directions.fill(direction, extreme + 1, k + 1);
      extreme = k;
    }
    directions[k] = direction;
  }
  return directions;
}
