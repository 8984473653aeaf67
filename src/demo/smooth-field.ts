import type { Random } from '../stats/random.ts';

/**
 * Smooth random field of about unit variance: normal deviates on a coarse lattice, joined by cubic B-splines (de Boor 1978), which have no kinks
 * that a levelling could mistake for structure.
 *
 * @param cells lattice cells across the wider side; the structure is about a cell wide whatever the pixel count.
 */
export function smoothField(random: Random, columns: number, rows: number, cells: number): Float32Array {
  const cell = Math.max(columns, rows) / cells;
  const latticeColumns = Math.ceil(columns / cell) + 4;
  const latticeRows = Math.ceil(rows / cell) + 4;
  const lattice = Float64Array.from({ length: latticeColumns * latticeRows }, () => random.normal());
  const out = new Float32Array(columns * rows);
  // A cubic B-spline of white noise has variance (151/315)² in two dimensions.
  const scale = 315 / 151;
  const wx = new Float64Array(4);
  const wy = new Float64Array(4);
  for (let r = 0; r < rows; r++) {
    const y = (r + 0.5) / cell;
    const r0 = Math.floor(y);
    weights(y - r0, wy);
    for (let c = 0; c < columns; c++) {
      const x = (c + 0.5) / cell;
      const c0 = Math.floor(x);
      weights(x - c0, wx);
      let sum = 0;
      for (let j = 0; j < 4; j++) {
        const row = (r0 + j) * latticeColumns + c0;
        sum += wy[j]! * (wx[0]! * lattice[row]! + wx[1]! * lattice[row + 1]! + wx[2]! * lattice[row + 2]! + wx[3]! * lattice[row + 3]!);
      }
      out[r * columns + c] = scale * sum;
    }
  }
  return out;
}

function weights(t: number, into: Float64Array): void {
  const u = 1 - t;
  into[0] = (u * u * u) / 6;
  into[1] = (3 * t * t * t - 6 * t * t + 4) / 6;
  into[2] = (3 * u * u * u - 6 * u * u + 4) / 6;
  into[3] = (t * t * t) / 6;
}
