/** Least-squares planes over row-major maps. */

/** The plane of a map as a function of the pixel's index; NaN values are left out. Fewer than three values give NaN. */
export function fitPlane(values: ArrayLike<number>, columns: number): (index: number) => number {
  const rows = values.length / columns;
  // Coordinates about the middle keep the normal equations well conditioned.
  const x = (i: number): number => (i % columns) / columns - 0.5;
  const y = (i: number): number => Math.floor(i / columns) / rows - 0.5;
  const m = [[0, 0, 0, 0], [0, 0, 0, 0], [0, 0, 0, 0]];
  for (let i = 0; i < values.length; i++) {
    if (Number.isNaN(values[i]!)) continue;
    const basis = [1, x(i), y(i)];
    for (let a = 0; a < 3; a++) {
      for (let b = 0; b < 3; b++) m[a]![b]! += basis[a]! * basis[b]!;
      m[a]![3]! += basis[a]! * values[i]!;
    }
  }
  for (let a = 0; a < 3; a++) {
    for (let b = 0; b < 3; b++) {
      if (a === b) continue;
      const factor = m[b]![a]! / m[a]![a]!;
      for (let k = 0; k < 4; k++) m[b]![k]! -= factor * m[a]![k]!;
    }
  }
  const [offset, slopeX, slopeY] = [m[0]![3]! / m[0]![0]!, m[1]![3]! / m[1]![1]!, m[2]![3]! / m[2]![2]!];
  return (i) => offset + slopeX * x(i) + slopeY * y(i);
}

/** Root mean square of what the least-squares plane leaves; NaN values are left out. */
export function planeResidualRms(values: ArrayLike<number>, columns: number): number {
  const plane = fitPlane(values, columns);
  let [sum, count] = [0, 0];
  for (let i = 0; i < values.length; i++) {
    if (Number.isNaN(values[i]!)) continue;
    sum += (values[i]! - plane(i)) ** 2;
    count++;
  }
  return Math.sqrt(sum / count);
}
