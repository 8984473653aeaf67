/** What a curve shows before tunnelling sets in: the amplifier's offset and noise, and an ohmic part. */
import { leastSquares } from '../stats/least-squares.ts';
import type { LeastSquares } from '../stats/least-squares.ts';

export interface LowBias {
  /** Current at zero bias, A. */
  readonly offsetA: number;
  /** Conductance of the ohmic part, S, with its standard error; absent where the stretch does not begin near zero bias. */
  readonly ohmic?: { readonly conductanceS: number; readonly seS: number };
  /** Standard deviation of the noise about that line, A. */
  readonly noiseA: number;
  readonly points: number;
  /** Magnitude of the bias up to which the line was taken, V. */
  readonly toBiasV: number;
  /** The line at any bias, A. `direction` is +1 where the bias rises, −1 where it falls: their difference is the displacement current. */
  readonly at: (biasV: number, direction: number) => number;
  /** What one standard deviation of each independent error of the line does to it there, A: its variance is the sum of the squares. */
  readonly errorsAt: (biasV: number, direction: number) => readonly number[];
}

/** A shorter stretch tells no noise from a slope. */
const leastPoints = 8;
const usualPoints = 12;
/** Least share of the range of bias: over less of it, noise in proportion to the current looks just like a constant one. */
const leastSpan = 0.1;
/** The ohmic part is asked for where the stretch begins below this share of the largest bias. */
const nearZero = 0.25;
/** Upper part of the stretch that is left out of the final line: there tunnelling begins to rise out of the noise. */
const trimmed = 0.25;
/** Standard errors at which the lowest points count as curved; few points scatter their own error widely. */
const curvedErrors = 6;

/**
 * Fits offset + conductance·V + displacement·direction to the points of lowest |V|, as many as follow
 * that line: the stretch grows until four points in a row lie outside it on one side. Undefined when
 * the lowest points are curved (the current rises from the start) or rise without passing near zero bias.
 *
 * @param direction +1 where the bias rises, −1 where it falls, as `sweepDirections`.
 */
export function lowBiasOf(biasV: Float64Array, currentA: Float64Array, direction: Int8Array): LowBias | undefined {
  const order = Array.from(biasV.keys()).sort((a, b) => Math.abs(biasV[a]!) - Math.abs(biasV[b]!) || a - b);
  const size = (k: number): number => Math.abs(biasV[order[k]!]!);
  const n = order.length;
  if (n < leastPoints) return undefined;
  const top = size(n - 1);
  const within = order.findIndex((_, k) => size(k) - size(0) >= leastSpan * (top - size(0)));
  let count = Math.max(leastPoints, Math.min(usualPoints, Math.floor(n / 5)), within + 1);
  const zero = size(0) <= nearZero * top;
  const fitTo = (k: number): Line => lineThrough(order.slice(0, k), biasV, currentA, direction, zero);
  if (isCurved(order.slice(0, count), biasV, currentA)) return undefined;

  let line = fitTo(count);
  while (count < n) {
    const bound = line.sd * (2.5 + 10 / count);
    const outside = order.slice(count, count + 4).map((i) => (currentA[i]! - line.at(biasV[i]!, direction[i]!)) * Math.sign(biasV[i]!));
    if (outside.every((value) => value > bound) || outside.every((value) => value < -bound)) break;
    count = Math.min(n, count + Math.max(1, Math.floor(count / 20)));
    line = fitTo(count);
  }
  if (count < n) {
    const limit = size(0) + (1 - trimmed) * (size(count - 1) - size(0));
    count = Math.max(order.findIndex((_, k) => size(k) > limit), Math.min(leastPoints, count));
  }
  if (!zero && !isFlat(order.slice(0, count), biasV, currentA)) return undefined;
  line = fitTo(count);
  return {
    offsetA: line.at(0, 0), noiseA: line.sd > 0 ? line.sd : quantum(currentA) / Math.sqrt(12), points: count, toBiasV: size(count - 1),
    ...(line.ohmic === undefined ? {} : { ohmic: line.ohmic }), at: line.at, errorsAt: line.errorsAt,
  };
}

interface Line extends Pick<LowBias, 'at' | 'errorsAt' | 'ohmic'> {
  readonly sd: number;
}

function lineThrough(points: readonly number[], biasV: Float64Array, currentA: Float64Array, direction: Int8Array, sloped: boolean): Line {
  const rising = points.filter((i) => direction[i] === 1).length;
  const falling = points.filter((i) => direction[i] === -1).length;
  const scale = Math.max(...points.map((i) => Math.abs(biasV[i]!))) || 1;
  const terms: ((bias: number, way: number) => number)[] = [() => 1];
  if (sloped) terms.push((bias) => bias / scale);
  if (Math.min(rising, falling) >= leastPoints / 2) terms.push((_, way) => way);
  const fitOf = (chosen: typeof terms): LeastSquares =>
    leastSquares(chosen.map((term) => points.map((i) => term(biasV[i]!, direction[i]!))), points.map((i) => currentA[i]!), true);
  let used = terms;
  let fit = fitOf(terms);
  // A sweep that dwells on one bias determines no slope.
  if (Number.isNaN(fit.coefficients[0]!)) {
    used = terms.slice(0, 1);
    fit = fitOf(used);
  }
  const p = used.length;
  return {
    sd: fit.residualSd,
    at: (bias, way) => used.reduce((sum, term, k) => sum + fit.coefficients[k]! * term(bias, way), 0),
    errorsAt: (bias, way) => used.map((_, j) => used.reduce((sum, term, k) => sum + fit.residualSd * fit.covarianceRoot[k * p + j]! * term(bias, way), 0)),
    ...(sloped && p > 1 ? { ohmic: { conductanceS: fit.coefficients[1]! / scale, seS: fit.standardErrors[1]! / scale } } : {}),
  };
}

/** Whether a cubic part (tunnelling is odd in the bias) is seen beyond its error. */
function isCurved(points: readonly number[], biasV: Float64Array, currentA: Float64Array): boolean {
  const scale = Math.max(...points.map((i) => Math.abs(biasV[i]!))) || 1;
  const u = points.map((i) => biasV[i]! / scale);
  const fit = leastSquares([u.map(() => 1), u, u.map((v) => v * v * Math.sign(v))], points.map((i) => currentA[i]!), true);
  return Math.abs(fit.coefficients[2]!) > curvedErrors * fit.standardErrors[2]!;
}

function isFlat(points: readonly number[], biasV: Float64Array, currentA: Float64Array): boolean {
  const fit = leastSquares([points.map(() => 1), points.map((i) => Math.abs(biasV[i]!))], points.map((i) => currentA[i]!), true);
  return Math.abs(fit.coefficients[1]!) < 2.5 * fit.standardErrors[1]!;
}

/** Smallest magnitude that the file writes: where the floor shows no noise at all, its digits are the noise. */
function quantum(currentA: Float64Array): number {
  let least = Number.POSITIVE_INFINITY;
  for (const value of currentA) if (value !== 0) least = Math.min(least, Math.abs(value));
  return least < Number.POSITIVE_INFINITY ? least : 0;
}
