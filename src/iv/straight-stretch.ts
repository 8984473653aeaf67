/**
 * The straight part of a Fowler–Nordheim plot, found without a person.
 *
 * Rule: the longest stretch of neighbouring points that begins at the highest bias and shows no
 * curvature beyond its noise. High bias, because the formula is that of a triangular barrier: towards
 * low bias the barrier becomes a trapezoid, and leakage and the amplifier's floor flatten the plot.
 * No curvature means: a parabola through the stretch bends by less than 2.5 of its standard errors, or
 * changes the slope by less than 2 % from end to end, which no measured curve tells from a line.
 * A stretch that ends because of curvature gives up its lowest tenth, where the bend was already
 * growing unseen. A lower upper end is taken when that makes the slope at least twice as certain: then
 * the top is bent (series resistance, beginning breakdown).
 */

export interface Stretch {
  /** First (highest bias) and last point. */
  readonly first: number;
  readonly last: number;
  /** Change of slope from end to end over the slope, where a bend is seen beyond 2.5 standard errors (then below 2 %); else 0. */
  readonly bend: number;
}

/** Fewer points show no curvature beyond their noise. */
export const leastForCurvature = 6;
const seenErrors = 2.5;
const harmlessBend = 0.02;
const givenUp = 0.1;
const gainInformation = 4;
/** Residual variance over that of neighbours beyond which a stretch is no line, whatever its parabola says. */
const largestMisfit = 10;
/** Root mean square deviation from a line below which a misfit is none, in ln I. */
const harmlessMisfit = 0.01;
const topsTried = 40;

/**
 * @param x 1/V, rising.
 * @param y ln(I/V²).
 * @param variance of y, above 0.
 * @returns undefined for fewer than three points or a single bias; below six points all of them, as no curvature can be told.
 */
export function straightStretch(x: Float64Array, y: Float64Array, variance: Float64Array): Stretch | undefined {
  const n = x.length;
  if (n < 3 || !(x[n - 1]! > x[0]!)) return undefined;
  if (n < leastForCurvature) return { first: 0, last: n - 1, bend: 0 };
  const sums = momentSums(x, y, variance);
  const smallest = variance.reduce((least, value) => Math.min(least, value), Number.POSITIVE_INFINITY);
  const atTop = longestFrom(0, 0);
  let best = atTop;
  const step = Math.max(1, Math.ceil((n * 0.6) / topsTried));
  for (let first = step; first <= Math.min(n - leastForCurvature, Math.floor(n * 0.6)); first += step) {
    best = longestFrom(first, (best === atTop ? gainInformation : 1) * (best?.information ?? 0)) ?? best;
  }
  if (best === undefined) return undefined;
  const { first, last, bend } = best;
  if (last === n - 1) return { first, last, bend };
  return { first, last: Math.max(first + leastForCurvature - 1, last - Math.ceil(givenUp * (last - first + 1))), bend };

  /** The longest straight stretch from `first` on that knows its slope with more than this information; 1/variance of the slope. */
  function longestFrom(first: number, least: number): (Stretch & { information: number }) | undefined {
    for (let last = n - 1; last >= first + leastForCurvature - 1; last--) {
      const { slope, slopeChange, errors, misfit, information } = parabola(sums, first, last);
      // Fewer points know less.
      if (!(information > least)) return undefined;
      const seen = Math.abs(errors) >= seenErrors;
      const bend = Math.abs(slopeChange / slope);
      if (seen && !(bend < harmlessBend)) continue;
      if (misfit > largestMisfit && misfit * smallest > harmlessMisfit ** 2) continue;
      return { first, last, bend: seen ? bend : 0, information };
    }
    return undefined;
  }
}

/** Running sums of w·u^k and w·v·u^k from the start; u and v are x and y about their middle, u within ±1. */
interface MomentSums {
  readonly u: readonly Float64Array[];
  readonly v: readonly Float64Array[];
  readonly square: Float64Array;
  readonly half: number;
  readonly points: Float64Array;
}

function momentSums(x: Float64Array, y: Float64Array, variance: Float64Array): MomentSums {
  const n = x.length;
  const centre = (x[0]! + x[n - 1]!) / 2;
  const half = (x[n - 1]! - x[0]!) / 2;
  const level = y.reduce((sum, value) => sum + value / n, 0);
  const sums = (length: number): Float64Array[] => Array.from({ length }, () => new Float64Array(n + 1));
  const u = sums(5);
  const v = sums(3);
  const square = new Float64Array(n + 1);
  const points = x.map((value) => (value - centre) / half);
  for (let k = 0; k < n; k++) {
    const height = y[k]! - level;
    let weight = 1 / variance[k]!;
    square[k + 1] = square[k]! + weight * height ** 2;
    for (let power = 0; power < 5; power++) {
      u[power]![k + 1] = u[power]![k]! + weight;
      if (power < 3) v[power]![k + 1] = v[power]![k]! + weight * height;
      weight *= points[k]!;
    }
  }
  return { u, v, square, half, points };
}

/** Weighted parabola through the points first…last from the sums. */
function parabola(sums: MomentSums, first: number, last: number) {
  const of = (values: Float64Array): number => values[last + 1]! - values[first]!;
  const w = of(sums.u[0]!);
  const [r1, r2, r3, r4] = sums.u.slice(1).map((values) => of(values) / w) as [number, number, number, number];
  const [v0, v1, v2] = sums.v.map((values) => of(values) / w) as [number, number, number];
  const m2 = r2 - r1 ** 2;
  const m3 = r3 - 3 * r1 * r2 + 2 * r1 ** 3;
  const m4 = r4 - 4 * r1 * r3 + 6 * r1 ** 2 * r2 - 3 * r1 ** 4;
  const c1 = v1 - r1 * v0;
  const c2 = v2 - 2 * r1 * v1 + r1 ** 2 * v0 - m2 * v0;
  const total = of(sums.square) / w - v0 ** 2;
  const slope = c1 / m2;
  // The part of the square that neither constant nor slope can show.
  const d = m4 - m2 ** 2 - m3 ** 2 / m2;
  const curvature = (c2 - m3 * slope) / d;
  const count = last - first + 1;
  const leftOfLine = Math.max(total - slope * c1, 0);
  const left = Math.max(leftOfLine - curvature ** 2 * d, 1e-16 * total);
  const errors = curvature / Math.sqrt(left / (count - 3) / d);
  return {
    slope: slope / sums.half,
    slopeChange: (2 * curvature * (sums.points[last]! - sums.points[first]!)) / sums.half,
    errors, misfit: (leftOfLine * w) / (count - 2),
    information: w * m2 * sums.half ** 2,
  };
}
