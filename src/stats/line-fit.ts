/** Straight line through points, ordinary least squares. */

export interface LineFit {
  readonly slope: number;
  readonly slopeSe: number;
  readonly intercept: number;
  readonly interceptSe: number;
  /** √(Σr²/(n−2)). */
  readonly residualSd: number;
  readonly rSquared: number;
  readonly points: number;
}

/**
 * Fits y = intercept + slope·x with all deviations taken from the means. Pairs with a NaN are left
 * out. NaN everywhere for fewer than two different x; errors are NaN for exactly two points.
 * Throws a RangeError for unequal lengths.
 */
export function lineFit(x: ArrayLike<number>, y: ArrayLike<number>): LineFit {
  if (x.length !== y.length) throw new RangeError(`a line needs as many x as y, got ${x.length} and ${y.length}`);
  let points = 0;
  let meanX = 0;
  let meanY = 0;
  for (let k = 0; k < x.length; k++) {
    if (Number.isNaN(x[k]! + y[k]!)) continue;
    points += 1;
    meanX += (x[k]! - meanX) / points;
    meanY += (y[k]! - meanY) / points;
  }
  let xx = 0;
  let xy = 0;
  let yy = 0;
  for (let k = 0; k < x.length; k++) {
    if (Number.isNaN(x[k]! + y[k]!)) continue;
    const dx = x[k]! - meanX;
    const dy = y[k]! - meanY;
    xx += dx * dx;
    xy += dx * dy;
    yy += dy * dy;
  }
  const slope = xx > 0 ? xy / xx : Number.NaN;
  let squares = 0;
  for (let k = 0; k < x.length; k++) {
    if (Number.isNaN(x[k]! + y[k]!)) continue;
    squares += (y[k]! - meanY - slope * (x[k]! - meanX)) ** 2;
  }
  const residualSd = points > 2 ? Math.sqrt(squares / (points - 2)) : Number.NaN;
  return {
    slope,
    slopeSe: residualSd / Math.sqrt(xx),
    intercept: meanY - slope * meanX,
    interceptSe: residualSd * Math.sqrt(1 / points + (meanX * meanX) / xx),
    residualSd,
    rSquared: 1 - squares / yy,
    points,
  };
}
