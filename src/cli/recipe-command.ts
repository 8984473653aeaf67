import { defaultRecipe, recipeJsonSchema } from '../recipe/parse-recipe.ts';
import { Problem } from '../problems/problem.ts';
import type { Command } from './command.ts';
import { exitCodes } from './command.ts';

/** `evenglow recipe`: the default recipe, or its JSON Schema. */
export const recipeCommand: Command = {
  name: 'recipe',
  summary: 'Prints the default recipe, or the JSON Schema of recipes.',
  usage: ['evenglow recipe [--schema]'],
  options: { schema: { type: 'boolean' } },
  optionText: { '--schema': 'print the JSON Schema instead: every path with its range, unit, default and meaning' },
  notes: ['Values that are absent from the default recipe (scan.widthUm, stack.biasV …) are taken from the files, measured or proposed; the schema says which.'],
  async run({ values, positionals }, output) {
    if (positionals.length > 0) throw new Problem('command-surplus', { command: 'recipe', surplus: positionals[0]! });
    output.out(`${JSON.stringify(values['schema'] === true ? recipeJsonSchema() : defaultRecipe(), null, 2)}\n`);
    return exitCodes.good;
  },
};
