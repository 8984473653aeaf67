/** How far single points of a Fowler–Nordheim plot scatter, told from neighbours, before any line is known. */
import { median } from '../stats/median.ts';

export interface PointNoise {
  /** Constant part, A. */
  readonly constantA: number;
  /** Proportional part: standard deviation of ln I. */
  readonly share: number;
}

/** Median of a squared standard normal number. */
const medianSquare = 0.454936423119572;

/**
 * The noise of a current is taken as √(constant² + (share·I)²). Every point is compared with the line
 * between its two neighbours, which a smooth curve follows closely. `constantA` is taken as given (from
 * the stretch before tunnelling); without it both parts are fitted to the squared differences by
 * maximum likelihood, and the constant one is kept only when it is worth two units of likelihood.
 *
 * @param x abscissa in rising or falling order; equal neighbours (up and down) are compared too.
 * @param y ln(I/V²).
 */
export function pointNoise(x: Float64Array, y: Float64Array, currentA: Float64Array, constantA: number | undefined): PointNoise {
  const differences: { square: number; weight: number; currentA: number }[] = [];
  for (let k = 1; k + 1 < x.length; k++) {
    const width = x[k + 1]! - x[k - 1]!;
    const t = width === 0 ? 0.5 : (x[k]! - x[k - 1]!) / width;
    const difference = y[k]! - (1 - t) * y[k - 1]! - t * y[k + 1]!;
    differences.push({ square: difference ** 2, weight: 1 + t ** 2 + (1 - t) ** 2, currentA: currentA[k]! });
  }
  if (differences.length === 0) return { constantA: constantA ?? 0, share: 0 };
  if (constantA !== undefined) {
    const excess = differences.map((d) => d.square / d.weight / medianSquare - (constantA / d.currentA) ** 2);
    return { constantA, share: Math.sqrt(Math.max(0, median(excess))) };
  }
  const least = Math.min(...differences.map((d) => d.currentA));
  const alone = likelihood(0);
  let best = { corner: 0, ...alone };
  for (let step = 0; step <= 24; step++) {
    const corner = least * 10 ** (-1 + step / 8);
    const fit = likelihood(corner);
    if (fit.twice < best.twice) best = { corner, ...fit };
  }
  if (!(alone.twice - best.twice > 4)) best = { corner: 0, ...alone };
  return { constantA: best.corner * best.share, share: best.share };

  /** Minus twice the logarithm of the likelihood when both parts are equal at the current `corner`. */
  function likelihood(corner: number): { twice: number; share: number } {
    let squares = 0;
    let logs = 0;
    for (const d of differences) {
      const shape = d.weight * (1 + (corner / d.currentA) ** 2);
      squares += d.square / shape;
      logs += Math.log(shape);
    }
    const variance = squares / differences.length;
    return { twice: differences.length * Math.log(Math.max(variance, 1e-300)) + logs, share: Math.sqrt(variance) };
  }
}

/** Variance of ln I at a current; never 0, so that exact data can be weighted. */
export function variancesOf(noise: PointNoise, currentA: Float64Array): Float64Array {
  return currentA.map((current) => noise.share ** 2 + (noise.constantA / current) ** 2 + 1e-24);
}
