import type { Recipe } from '../recipe/recipe.ts';
import type { Appraised } from '../report/appraised.ts';

/** One sample carried through the whole chain: everything a verdict, a report or a picture is made from. Remarks are in the order of the chain. */
export interface Appraisal extends Appraised {
  readonly recipe: Recipe;
}
