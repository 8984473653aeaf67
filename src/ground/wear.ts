/** Slow loss of conductance along the slow axis, as a tip does when it wears. */
import { generalisedLeastSquares } from '../stats/generalised-least-squares.ts';
import type { GeneralisedFit } from '../stats/generalised-least-squares.ts';
import { patchesOf } from './wear-patches.ts';
import type { PatchMean } from './wear-patches.ts';

/** Trend of the log current on the terraces along the slow axis, whatever its cause. */
export interface Drift {
  /** Decades lost from first to last line (positive = a loss); NaN where the map cannot tell. */
  readonly decades: number;
  /** Standard error from the barrier's own slow variation. */
  readonly seDecades: number;
}

/** A smaller loss, or any gain, is not put down to the tip, decades. */
export const leastWearDecades = 0.2;
/** A loss is told from the slow variation of the barrier when it is this many of its standard errors (two: the barrier alone shows more in one map of forty). */
const leastErrors = 2;
/** Forward and return scan must show the same loss to this part of it, and at least to within `agreeDecades`. */
const agreeShare = 0.25;
const agreeDecades = 0.05;
/**
 * Correlation lengths of the slow variation that are tried, in units of the map's longer side. What varies over more than a sixth of the map looks
 * like a trend in it and cannot be measured from it.
 */
const lengths = [0.05, 0.1, 0.15] as const;
/** Share of the variation that does not run on from one block to the next. */
const nugget = 0.1;
/** Fewer blocks than this per map leave no error to trust. */
const leastBlocks = 12;
/** Patches whose levels differ by less are of one terrace: less than a layer of any likely barrier, more than the levels' errors, decades. */
const sameLevelDecades = 0.35;

/**
 * Fits log current = level of the terrace + trend along the slow axis + slow variation by generalised least squares. The slow variation is a random field
 * of which length and strength are found from the map by restricted likelihood (universal kriging; Matheron, Cah. Cent. Morphol. Math.
 * Fontainebleau 1, 1969). Levels are free, so terraces explain none of the trend, and neighbouring patches share the field, so a map cut into stripes along
 * the fast axis still tells: the jump at a border is read where the border is. Patches are fitted apart at first; those that then
 * lie at one level are taken as one terrace, which says more of the trend between them.
 *
 * A real variation that differs from column to column enlarges the standard error; wear, being common to a whole line, does not. What this cannot
 * tell from wear is a barrier that changes from the first line to the last over the whole width. The trend is straight in decades: a
 * map says too little of a curve's shape.
 *
 * @param log10 log10 of the current, NaN missing; @param use admits uncensored ground; @param aspect height over width of the map in metres.
 */
export function findDrift(log10: Float32Array, columns: number, rows: number, use: (index: number) => boolean, slowUp: boolean, aspect = rows / columns): Drift {
  const { means, patches } = patchesOf(log10, columns, rows, use, aspect);
  const apart = likeliestFit(means, patches);
  if (!apart) return { decades: Number.NaN, seDecades: Number.NaN };
  const terraces = terracesOf(apart.coefficients.subarray(1));
  const joined = likeliestFit(means.map((mean) => ({ ...mean, patch: terraces.of[mean.patch]! })), terraces.count);
  const { coefficients, standardErrors } = joined ?? apart;
  // The slope is per unit of the longer side, y downwards.
  const height = Math.min(1, aspect);
  return { decades: (slowUp ? height : -height) * coefficients[0]!, seDecades: height * standardErrors[0]! };
}

/**
 * Whether a loss is told from real structure: large enough, well above what the barrier's own variation makes, and on the return scan, where there
 * is one, the same. Both directions measure a line at nearly the same time through the same tip, so what differs between them is contact.
 */
export function isWear({ decades, seDecades }: Drift, returned?: Drift): boolean {
  if (!(decades >= leastWearDecades && decades >= leastErrors * seDecades)) return false;
  return !returned || Number.isNaN(returned.decades) || Math.abs(returned.decades - decades) <= Math.max(agreeDecades, agreeShare * decades);
}

/** Decades to add to every row's log current to undo a loss that grows evenly from the first line. */
export function wearPerRow(decades: number, rows: number, slowUp: boolean): Float64Array {
  return Float64Array.from({ length: rows }, (_, r) => (decades * (slowUp ? rows - 1 - r : r)) / Math.max(1, rows - 1));
}

/** The fit of the likeliest correlation length; its first coefficient is the trend, then one level per patch. */
function likeliestFit(means: readonly PatchMean[], patches: number): GeneralisedFit | undefined {
  const n = means.length;
  const p = patches + 1;
  if (patches === 0 || n < p + leastBlocks) return undefined;
  const design = new Float64Array(n * p);
  const values = new Float64Array(n);
  for (const [i, { y, log10, patch }] of means.entries()) {
    design[i * p] = y - 0.5;
    design[i * p + 1 + patch] = 1;
    values[i] = log10;
  }
  let best: GeneralisedFit | undefined;
  for (const length of lengths) {
    const fit = generalisedLeastSquares(correlationOf(means, length), design, values);
    if (fit && (!best || fit.logLikelihood > best.logLikelihood)) best = fit;
  }
  return best;
}

/** Gaussian correlation exp(−d²/ℓ²) of the slow variation between blocks. */
function correlationOf(means: readonly PatchMean[], length: number): Float64Array {
  const n = means.length;
  const out = new Float64Array(n * n);
  for (const [i, here] of means.entries()) {
    for (let j = 0; j < i; j++) {
      const there = means[j]!;
      out[i * n + j] = (1 - nugget) * Math.exp(-((here.x - there.x) ** 2 + (here.y - there.y) ** 2) / length ** 2);
    }
    out[i * n + i] = 1;
  }
  return out;
}

/** Numbers the levels by terrace: a gap in their order starts the next. */
function terracesOf(levels: Float64Array): { of: Uint32Array; count: number } {
  const of = new Uint32Array(levels.length);
  const order = Array.from(levels.keys()).sort((a, b) => levels[a]! - levels[b]!);
  let count = 0;
  for (const [k, patch] of order.entries()) {
    if (k === 0 || levels[patch]! - levels[order[k - 1]!]! > sameLevelDecades) count++;
    of[patch] = count - 1;
  }
  return { of, count };
}
