/** Changes one value of a sample's recipe. Undo: step. */
import { recipeOf, withValue } from '../recipe.ts';
import type { RecipeValue } from '../recipe.ts';
import type { Action } from '../session.ts';
import { pushRecipe } from './push-recipe.ts';

/** Sets the value at a path (undefined: back to the default) and appraises anew. Without a difference nothing happens. */
export const changeRecipe: Action<[id: string, path: string, value: RecipeValue | undefined, label: string], Promise<void>> = {
  undo: 'step',
  async run(session, id, path, value, label) {
    const sample = session.sample(id);
    if (sample !== undefined) await session.do(pushRecipe, id, withValue(recipeOf(sample), path, value), label);
  },
};
