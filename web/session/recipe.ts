/** Sparse recipes: plain JSON that holds only what differs from the defaults. */
import type { Correction, RecipeData } from '../../workers/api.ts';
import type { SampleState } from './state.ts';

export type RecipeValue = number | string | boolean;

/** The recipe in which everything is by default; the computation checks format and version. */
export const emptyRecipe: RecipeData = { format: 'evenglow-recipe', version: 1 };

/**
 * The recipe with one value set, or taken out when `value` is undefined; an emptied section goes too. `path` reads
 * `band.factor`. Gives the same object back when nothing changes. Throws RangeError for a path that has no dot.
 */
export function withValue(recipe: RecipeData, path: string, value: RecipeValue | undefined): RecipeData {
  const dot = path.indexOf('.');
  if (dot < 1 || dot === path.length - 1) throw new RangeError(`"${path}" is not a recipe's path such as band.factor.`);
  const name = path.slice(0, dot);
  const key = path.slice(dot + 1);
  const section = sectionOf(recipe, name);
  if (section[key] === value) return recipe;
  const { [key]: _before, ...others } = section;
  const changed = value === undefined ? others : { ...others, [key]: value };
  const { [name]: _section, ...rest } = recipe;
  return Object.keys(changed).length === 0 ? rest : { ...rest, [name]: changed };
}

/** The value at a path, undefined where the recipe leaves it to the default. */
export function valueAt(recipe: RecipeData, path: string): unknown {
  const [name = '', ...key] = path.split('.');
  return sectionOf(recipe, name)[key.join('.')];
}

/** The corrections by hand, in order; the computation checks them. */
export function correctionsOf(recipe: RecipeData): readonly Correction[] {
  const list = recipe['corrections'];
  return Array.isArray(list) ? (list as readonly Correction[]) : [];
}

/** The recipe with a correction behind those that are there. */
export function withCorrection(recipe: RecipeData, correction: Correction): RecipeData {
  return { ...recipe, corrections: [...correctionsOf(recipe), correction] };
}

/** The recipe without the correction at a place of the list; the same object when there is none. */
export function withoutCorrection(recipe: RecipeData, index: number): RecipeData {
  const before = correctionsOf(recipe);
  if (before[index] === undefined) return recipe;
  const { corrections: _before, ...rest } = recipe;
  return before.length === 1 ? rest : { ...rest, corrections: before.filter((_, i) => i !== index) };
}

/** A place of bare ground that a person picked, µm from the map's lower-left corner. */
export interface Spot {
  readonly xUm: number;
  readonly yUm: number;
}

/** The spots of ground picked by hand; the computation checks them. */
export function spotsOf(recipe: RecipeData): readonly Spot[] {
  const list = sectionOf(recipe, 'ground')['spots'];
  return Array.isArray(list) ? (list as readonly Spot[]) : [];
}

/** The recipe with these spots, or with the ground found automatically when there are none; the same object when nothing changes. */
export function withSpots(recipe: RecipeData, spots: readonly Spot[]): RecipeData {
  if (JSON.stringify(spotsOf(recipe)) === JSON.stringify(spots)) return recipe;
  const { spots: _before, ...others } = sectionOf(recipe, 'ground');
  const changed = spots.length === 0 ? others : { ...others, spots };
  const { ground: _section, ...rest } = recipe;
  return Object.keys(changed).length === 0 ? rest : { ...rest, ground: changed };
}

/** The recipe that a sample stands at. */
export function recipeOf(sample: SampleState): RecipeData {
  return sample.history[sample.at]?.recipe ?? emptyRecipe;
}

function sectionOf(recipe: RecipeData, name: string): Readonly<Record<string, unknown>> {
  const section = recipe[name];
  return typeof section === 'object' && section !== null && !Array.isArray(section) ? (section as Readonly<Record<string, unknown>>) : {};
}
