/** How many layers lie between neighbouring terraces of a map. */
import type { LadderPeak } from '../ground/ladder.ts';
import { median } from '../stats/median.ts';

/** How near to a whole multiple of the model's step a measured step must be. */
const nearness = 0.12;
/** Part of the step within which a pixel counts to a terrace's height. */
const peakPart = 0.25;

export interface GapEvidence {
  /** Measured step, decades. */
  readonly stepDecades: number;
  /** Step of one layer by the model, decades; absent without a model. */
  readonly modelStepDecades?: number | undefined;
  /** Height that one gap adds, in layers; absent without a height map. */
  readonly heightLayers?: number | undefined;
}

/**
 * Layers per gap between terraces: 2 or 3 where both the current (within 12 % of that many of the model's steps) and the height (nearest to that
 * many layers) say so, else 1. The current alone does not decide: a barrier higher or heavier than the recipe's looks the same.
 */
export function layersPerGap({ stepDecades, modelStepDecades, heightLayers }: GapEvidence): number {
  if (modelStepDecades === undefined || heightLayers === undefined) return 1;
  return [2, 3].find((layers) => Math.abs(stepDecades / (layers * modelStepDecades) - 1) <= nearness && Math.round(heightLayers) === layers) ?? 1;
}

/**
 * Height that one gap of the ladder adds, metres: weighted least-squares slope of the terraces' median heights over their place on the ladder.
 *
 * @param levelled metres, NaN missing; @param log10 log10 current; @param use admits flawless ground. NaN with fewer than two terraces.
 */
export function heightPerGap(levelled: Float32Array, log10: Float32Array, peaks: readonly LadderPeak[], stepDecades: number, use: (index: number) => boolean): number {
  const points = peaks.map((peak) => {
    const heights = levelled.filter((value, i) => Math.abs(log10[i]! - peak.log10) < peakPart * stepDecades && use(i) && !Number.isNaN(value));
    return { rung: peak.rung, weight: heights.length, height: median(heights) };
  }).filter(({ weight }) => weight > 0);
  const total = points.reduce((sum, { weight }) => sum + weight, 0);
  const meanRung = points.reduce((sum, { weight, rung }) => sum + weight * rung, 0) / total;
  const meanHeight = points.reduce((sum, { weight, height }) => sum + weight * height, 0) / total;
  const spread = points.reduce((sum, { weight, rung }) => sum + weight * (rung - meanRung) ** 2, 0);
  return points.reduce((sum, { weight, rung, height }) => sum + weight * (rung - meanRung) * (height - meanHeight), 0) / spread;
}
