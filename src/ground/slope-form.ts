/** A form from differences between points, which a step spoils only where it is crossed. */
import { solveBand } from '../stats/cholesky.ts';
import { madScale } from '../stats/mad.ts';
import { medianInPlace } from '../stats/median.ts';

/**
 * Coefficients of u^p·v^q, u and v from −1 to 1, by least squares on differences with Tukey's biweight, which leaves out the few that
 * cross a step (Beaton & Tukey, Technometrics 16, 147, 1974; constant 4.685 by Holland & Welsch, Commun. Stat. A6, 813, 1977).
 */
export function slopeForm(values: Float32Array, columns: number, rows: number, powers: readonly (readonly [number, number])[]): Float64Array {
  const n = powers.length;
  const { differences, basis } = takeDifferences(values, columns, rows, powers);
  const count = differences.length;
  let form: Float64Array = new Float64Array(n);
  const sizes = new Float64Array(count);
  const residual = differences.slice();
  const weights = new Float64Array(count).fill(1);
  const normal = new Float64Array(n * n);
  const right = new Float64Array(n);
  for (let round = 0; round < 15; round++) {
    normal.fill(0);
    right.fill(0);
    for (let e = 0; e < count; e++) if (weights[e] !== 0) addEquation(basis, e * n, n, weights[e]!, differences[e]!, normal, right);
    const next = solveBand(normal, n - 1, right.slice());
    // Too few differences to tell: the form found so far is kept.
    if (next.some(Number.isNaN)) break;
    form = next;
    for (let e = 0; e < count; e++) residual[e] = differences[e]! - valueOf(form, basis, e * n);
    for (let e = 0; e < count; e++) sizes[e] = Math.abs(residual[e]!);
    weigh(residual, 4.685 * Math.max(1e-12, madScale * medianInPlace(sizes)), weights);
  }
  return form;
}

/** Differences between points a thirty-second of the map apart along both axes, and by how much each u^p·v^q differs between them. */
function takeDifferences(values: Float32Array, columns: number, rows: number, powers: readonly (readonly [number, number])[]): { differences: Float64Array; basis: Float64Array } {
  const n = powers.length;
  const lagC = Math.max(2, Math.round(columns / 32));
  const lagR = Math.max(2, Math.round(rows / 32));
  const step = Math.max(1, Math.floor(Math.sqrt((columns * rows) / 8000)));
  const most = 2 * Math.ceil(columns / step) * Math.ceil(rows / step);
  const differences = new Float64Array(most);
  const basis = new Float64Array(most * n);
  // Powers along the axes, by power: each is needed again and again.
  const [along, down] = [axisPowers(columns, powers.map(([p]) => p)), axisPowers(rows, powers.map(([, q]) => q))];
  let count = 0;
  const add = (r0: number, c0: number, r1: number, c1: number): void => {
    const difference = values[r1 * columns + c1]! - values[r0 * columns + c0]!;
    if (Number.isNaN(difference)) return;
    differences[count] = difference;
    for (let k = 0; k < n; k++) basis[count * n + k] = along[k]![c1]! * down[k]![r1]! - along[k]![c0]! * down[k]![r0]!;
    count++;
  };
  for (let r = step >> 1; r < rows; r += step) {
    for (let c = step >> 1; c < columns; c += step) {
      if (c + lagC < columns) add(r, c, r, c + lagC);
      if (r + lagR < rows) add(r, c, r + lagR, c);
    }
  }
  return { differences: differences.slice(0, count), basis };
}

/** For each exponent its power of every pixel's place, from −1 to 1 along the axis. */
function axisPowers(length: number, exponents: readonly number[]): Float64Array[] {
  return exponents.map((exponent) => {
    const out = new Float64Array(length);
    for (let i = 0; i < length; i++) out[i] = ((2 * i) / (length - 1) - 1) ** exponent;
    return out;
  });
}

function addEquation(basis: Float64Array, at: number, n: number, weight: number, value: number, normal: Float64Array, right: Float64Array): void {
  for (let i = 0; i < n; i++) {
    const weighted = weight * basis[at + i]!;
    right[i]! += weighted * value;
    for (let j = 0; j <= i; j++) normal[i * n + (i - j)]! += weighted * basis[at + j]!;
  }
}

function valueOf(form: Float64Array, basis: Float64Array, at: number): number {
  let sum = 0;
  for (let i = 0; i < form.length; i++) sum += form[i]! * basis[at + i]!;
  return sum;
}

function weigh(residual: Float64Array, reach: number, weights: Float64Array): void {
  for (let e = 0; e < weights.length; e++) {
    const d = residual[e]!;
    weights[e] = Math.abs(d) < reach ? (1 - (d / reach) ** 2) ** 2 : 0;
  }
}
