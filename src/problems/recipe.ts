/** Sentences about recipes and their values. `path` starts with `recipe.`. */
export const recipeSentences = {
  'recipe-value': (d: { path: string; reason: string }) => `${d.path}: ${d.reason}${d.reason.endsWith('?') ? '' : '.'}`,
  'recipe-setting': (d: { setting: string }) => `--set ${d.setting}: write it as path=value, for example --set stack.biasV=4; "evenglow recipe" lists the paths.`,
  'recipe-not-json': (d: { file: string; reason: string }) => `${d.file} is not valid JSON (${d.reason}); start from the output of "evenglow recipe".`,
  'recipe-format': (d: { file: string; found: string }) => `${d.file} is not an Evenglow recipe (its format is ${d.found}, expected "evenglow-recipe").`,
  'recipe-newer': (d: { file: string; found: number; known: number }) =>
    `${d.file} was written for recipe version ${d.found}, this program knows versions up to ${d.known}; update Evenglow to open it.`,
};
