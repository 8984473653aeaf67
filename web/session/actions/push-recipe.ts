/** Adds one step to a sample's recipe. Undo: step. */
import type { RecipeData } from '../../../workers/api.ts';
import { recipeOf } from '../recipe.ts';
import type { Action } from '../session.ts';
import { appraise } from './appraise.ts';
import { beforeChange } from './before-change.ts';

/** Steps that were undone are cut. Appraises with the new recipe; nothing happens when it is the one in force. */
export const pushRecipe: Action<[id: string, recipe: RecipeData, label: string], Promise<void>> = {
  undo: 'step',
  async run(session, id, recipe, label) {
    const current = session.sample(id);
    if (current === undefined || recipe === recipeOf(current)) return;
    session.updateSample(id, (sample) => ({
      ...beforeChange(sample), history: [...sample.history.slice(0, sample.at + 1), { recipe, label }], at: sample.at + 1,
    }));
    await session.do(appraise, id);
  },
};
