/** Picks the ground by hand, or leaves it to be found automatically. Undo: step. */
import { recipeOf, withSpots } from '../recipe.ts';
import type { Spot } from '../recipe.ts';
import type { Action } from '../session.ts';
import { pushRecipe } from './push-recipe.ts';

/** Replaces all spots (none: automatic ground) and appraises anew. Without a difference nothing happens. */
export const pickSpots: Action<[id: string, spots: readonly Spot[], label: string], Promise<void>> = {
  undo: 'step',
  async run(session, id, spots, label) {
    const sample = session.sample(id);
    if (sample !== undefined) await session.do(pushRecipe, id, withSpots(recipeOf(sample), spots), label);
  },
};
