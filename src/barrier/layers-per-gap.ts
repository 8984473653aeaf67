/** How many layers lie between neighbouring terraces of a map. */

/** More terraces than this and a missing one between all of them is too much of a coincidence. */
const mostRungs = 3;
/** How near to a whole multiple of the model's step a measured step must be. */
const nearness = 0.12;

/**
 * Layers per gap between terraces: 2 or 3 where the measured step is within 12 % of that many of the model's steps and at most three terraces
 * show, else 1. This is an assumption (a higher or heavier barrier than the recipe's looks the same), to be said wherever it is made.
 *
 * @param stepDecades measured, decades; @param rungs terraces seen; @param modelStepDecades absent without a model: then 1.
 */
export function layersPerGap(stepDecades: number, rungs: number, modelStepDecades: number | undefined): number {
  if (modelStepDecades === undefined || rungs > mostRungs) return 1;
  return [2, 3].find((layers) => Math.abs(stepDecades / (layers * modelStepDecades) - 1) <= nearness) ?? 1;
}
