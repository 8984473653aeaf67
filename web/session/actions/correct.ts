/** Corrections of flaws by hand. Undo: step. */
import type { Correction } from '../../../workers/api.ts';
import { recipeOf, withCorrection, withoutCorrection } from '../recipe.ts';
import type { Action } from '../session.ts';
import { pushRecipe } from './push-recipe.ts';

/** Adds a correction behind those that are there and appraises anew. */
export const correct: Action<[id: string, correction: Correction, label: string], Promise<void>> = {
  undo: 'step',
  async run(session, id, correction, label) {
    const sample = session.sample(id);
    if (sample !== undefined) await session.do(pushRecipe, id, withCorrection(recipeOf(sample), correction), label);
  },
};

/** Takes one correction out by its place in the list, wherever it stands in the history. */
export const takeOutCorrection: Action<[id: string, index: number, label: string], Promise<void>> = {
  undo: 'step',
  async run(session, id, index, label) {
    const sample = session.sample(id);
    if (sample !== undefined) await session.do(pushRecipe, id, withoutCorrection(recipeOf(sample), index), label);
  },
};
