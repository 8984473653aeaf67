/** What a person says about files that do not say it themselves. Undo: step, one for all values together. */
import { recipeOf, withValue } from '../recipe.ts';
import type { RecipeValue } from '../recipe.ts';
import type { Action } from '../session.ts';
import { pushRecipe } from './push-recipe.ts';
import { retry } from './retry.ts';

/** Values by path of the recipe (`scan.widthUm`); the same for all named samples. Appraises them. */
export const answer: Action<[ids: readonly string[], values: Readonly<Record<string, RecipeValue>>, label: string], Promise<void>> = {
  undo: 'step',
  async run(session, ids, values, label) {
    await Promise.all(ids.map(async (id) => {
      const sample = session.sample(id);
      if (sample === undefined) return;
      const before = recipeOf(sample);
      const recipe = Object.entries(values).reduce((so, [path, value]) => withValue(so, path, value), before);
      await (recipe === before ? session.do(retry, id) : session.do(pushRecipe, id, recipe, label));
    }));
  },
};
