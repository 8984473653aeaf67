/** How many layers lie between neighbouring terraces of a map. */

/** How near to a whole multiple of the model's step a measured step must be. */
const nearness = 0.12;
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
