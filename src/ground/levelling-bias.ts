/** What levelling itself has taken from Sq, estimated from the levelled surface. */
import type { Grid } from '../grid/maps.ts';
import { correlationAt, productShares, varianceRemovedByMedian } from '../stats/levelled-variance.ts';
import type { CorrelationShape } from '../stats/levelled-variance.ts';
import { lineAutocorrelation } from './line-autocorrelation.ts';
import type { LineAutocorrelation } from './line-autocorrelation.ts';
import type { GroundSection } from './recipe.ts';

/** Fewer pixels or shorter lines allow no estimate. */
const leastPixels = 1000;
const leastPerLine = 32;
const leastLags = 4;
/** Structure of which levelling would take more cannot be told from form. */
const mostShare = 0.25;

export interface LevellingBias {
  /** Distance in metres at which the roughness's autocorrelation had fallen to 1/e before levelling. */
  readonly correlationM: number;
  readonly shape: CorrelationShape;
  /** Standard deviation of the correlated roughness before levelling, without pixel noise (inside terraces where they were given), metres. */
  readonly roughnessM: number;
  /** Shares of that roughness's variance that line offsets, and the form beyond them, took away. */
  readonly lineShare: number;
  readonly formShare: number;
  /** Variance taken away, m²: to be added to a Sq² measured on the levelled height. */
  readonly removedM2: number;
  /** Sq of the levelled height about the level of each terrace, noise included; absent where no terraces were given. */
  readonly sqInsideTerracesM?: number;
}

/** Why there is no estimate: too little ground; nothing but noise from pixel to pixel; structure too wide to be told from form. */
export type NoBias = 'little-ground' | 'no-correlation' | 'too-wide';

/** What was subtracted, and over which lengths (metres): the form over width × height, a line's offset from as much of it as counts. */
export interface Levelled {
  readonly order: number;
  readonly lines: boolean;
  readonly widthM: number;
  readonly heightM: number;
  readonly lineM: number;
  /** Share of the correlated roughness in the variance that the offsets see; the rest is noise from pixel to pixel. */
  readonly correlated: number;
}

/**
 * Estimates correlation length, roughness and what levelling took of its variance (`varianceRemoved`, Nečas, Klapetek & Valtr 2020).
 *
 * The autocorrelation of a levelled surface is itself too low, by about the share s that was taken: C(d) = σ²·(ρ(d) − s) for distances far
 * below the map's. σ and T are therefore fitted together with the s(T) that follows from T, to the part of C that falls from pixel 1 to about
 * 1/e². Distance 0 is left out because pixel noise is in it. Gaussian and exponential ρ are both tried and the closer one is taken.
 *
 * Taken for granted: normal roughness that is the same everywhere and in all directions; line offsets that act as medians of lines
 * (those from medians of differences between lines were measured to take 0.75 to 0.95 of what means take; medians take 0.80 to 0.97). Structure
 * as wide as the map is gone with the form and leaves no trace, so the estimate holds only for what is left, and from a share of about a fifth
 * on it is rather a lower bound.
 *
 * @param height levelled, row-major, metres, NaN missing. @param mask 1 where a pixel counts.
 * @param terraces numbers of terraces, −128 unknown: the estimate is then made inside them, because the levels of terraces are no roughness.
 */
export function levellingBias(height: Float32Array, grid: Grid, mask: Uint8Array, { order, lines }: Pick<GroundSection, 'order' | 'lines'>, terraces?: Int8Array): LevellingBias | NoBias {
  const along = lineAutocorrelation(height, grid, mask, terraces);
  if (along.pixels < leastPixels || along.pixelsPerLine < leastPerLine) return 'little-ground';
  const window = fallingPart(along);
  if (typeof window === 'string') return window;
  const { pitchXM } = grid;
  const extent = extentOf(mask, grid);
  const levelled: Levelled = { order, lines, ...extent, lineM: along.pixelsPerLine * pitchXM, correlated: Math.min(1, along.covariance[0]! / along.variance) };
  const fits = (['gaussian', 'exponential'] as const).map((shape) => fitShape(along, window, shape, levelled, pitchXM));
  const best = fits[0]!.misfit <= fits[1]!.misfit ? fits[0]! : fits[1]!;
  const taken = levelledShares(best.correlationM, levelled, best.shape);
  if (best.atLimit || taken.lines + taken.form > mostShare) return 'too-wide';
  return {
    correlationM: best.correlationM, shape: best.shape, roughnessM: Math.sqrt(best.variance),
    lineShare: taken.lines, formShare: taken.form, removedM2: best.variance * (taken.lines + taken.form),
    ...(terraces ? { sqInsideTerracesM: Math.sqrt(along.variance) } : {}),
  };
}

/**
 * Shares of the variance of roughness with correlation length `correlationM` that go with line offsets (as medians) and with the form. Both take the
 * level of every line, which counts as the lines'; without line offsets all is the form's.
 */
export function levelledShares(correlationM: number, { order, lines, widthM, heightM, lineM, correlated }: Levelled, shape: CorrelationShape): { lines: number; form: number } {
  const ratioX = correlationM / widthM;
  const ratioY = correlationM / heightM;
  const products = productShares(ratioX, ratioY, order, shape);
  const terms = order + 1;
  const sum = (from: number): number => products.subarray(from).reduce((total, share) => total + share, 0);
  if (!lines) return { lines: 0, form: sum(0) };
  // The offsets of lines leave a trend down the map to the form; without tilt in the form it stays.
  const trend = order === 0 ? productShares(ratioX, ratioY, 1, shape)[1]! : 0;
  return { lines: varianceRemovedByMedian(correlationM / lineM, shape, correlated) - trend, form: sum(terms) };
}

/** Number of distances from the first to where the autocovariance has fallen to 1/e² of its first value. */
function fallingPart({ lags, covariance, pairs, variance, pixelsPerLine }: LineAutocorrelation): number | NoBias {
  const first = covariance[0]!;
  // Uncorrelated noise gives products that scatter by variance/√pairs.
  if (!(first > (5 * variance) / Math.sqrt(pairs[0]!))) return 'no-correlation';
  for (let k = 1; k < lags.length; k++) {
    if (!(pairs[k]! > 0) || lags[k]! > pixelsPerLine / 2) break;
    if (covariance[k]! < first * Math.exp(-2)) return k + 1 >= leastLags ? k + 1 : Math.min(leastLags, lags.length);
  }
  return 'too-wide';
}

interface ShapeFit {
  readonly shape: CorrelationShape;
  readonly correlationM: number;
  readonly variance: number;
  readonly misfit: number;
  readonly atLimit: boolean;
}

/** Least squares in the variance for each correlation length; the best length on a logarithmic scale, refined by halving steps. */
function fitShape({ lags, covariance, pairs }: LineAutocorrelation, window: number, shape: CorrelationShape, levelled: Levelled, pitchM: number): ShapeFit {
  const at = (log: number): ShapeFit => {
    const correlationM = Math.exp(log);
    const taken = levelledShares(correlationM, levelled, shape);
    let [cross, norm, misfit] = [0, 0, 0];
    const expected = (k: number): number => correlationAt(shape, (lags[k]! * pitchM) / correlationM) - taken.lines - taken.form;
    for (let k = 0; k < window; k++) {
      // Distances at which the mask has no pair say nothing.
      if (pairs[k] === 0) continue;
      cross += pairs[k]! * covariance[k]! * expected(k);
      norm += pairs[k]! * expected(k) ** 2;
    }
    const variance = Math.max(0, cross / norm);
    for (let k = 0; k < window; k++) if (pairs[k]! > 0) misfit += pairs[k]! * (covariance[k]! - variance * expected(k)) ** 2;
    return { shape, correlationM, variance, misfit, atLimit: log >= high };
  };
  const low = Math.log(0.3 * pitchM);
  const high = Math.log(levelled.lineM / 3);
  const steps = 16;
  let step = (high - low) / steps;
  let best = at(low);
  for (let k = 1; k <= steps; k++) {
    const tried = at(low + k * step);
    if (tried.misfit < best.misfit) best = tried;
  }
  for (; step > 1e-3; step /= 2) {
    for (const log of [Math.log(best.correlationM) - step, Math.log(best.correlationM) + step]) {
      const tried = at(Math.min(high, log));
      if (tried.misfit < best.misfit) best = tried;
    }
  }
  return best;
}

/** Width and height of the rectangle around what counts. */
function extentOf(mask: Uint8Array, { columns, rows, pitchXM, pitchYM }: Grid): { widthM: number; heightM: number } {
  let [left, right, top, bottom] = [columns, -1, rows, -1];
  for (let r = 0; r < rows; r++) {
    const row = mask.subarray(r * columns, (r + 1) * columns);
    const from = row.indexOf(1);
    if (from < 0) continue;
    left = Math.min(left, from);
    right = Math.max(right, row.lastIndexOf(1));
    top = Math.min(top, r);
    bottom = r;
  }
  return { widthM: (right - left + 1) * pitchXM, heightM: (bottom - top + 1) * pitchYM };
}
