/** Recipes from outside: JSON text, `path=value` settings, older versions. */
import { z } from 'zod';
import { Problem } from '../problems/problem.ts';
import { nearestWord } from '../schema/nearest-word.ts';
import { reasonOf } from '../schema/reason.ts';
import type { Recipe } from './recipe.ts';
import { recipeFormat, recipeSchema, recipeVersion } from './recipe.ts';

/** A recipe before defaults are filled in. */
export type RecipeInput = z.input<typeof recipeSchema>;

/** The recipe with every default. */
export function defaultRecipe(): Recipe {
  return recipeSchema.parse({ format: recipeFormat, version: recipeVersion });
}

/**
 * Recipe from the text of a file.
 *
 * @param file name used in sentences.
 * @throws Problem `recipe-not-json`, `recipe-format`, `recipe-newer`, or `recipe-value` with the path of the first wrong value.
 */
export function parseRecipe(text: string, file: string): Recipe {
  return checkRecipe(recipeObject(text, file));
}

/** The JSON object of a recipe file, format and version checked, values not yet. */
export function recipeObject(text: string, file: string): Record<string, unknown> {
  let value: unknown;
  try {
    value = JSON.parse(text);
  } catch (error) {
    throw new Problem('recipe-not-json', { file, reason: error instanceof Error ? error.message : String(error) });
  }
  if (typeof value !== 'object' || value === null || Array.isArray(value)) throw new Problem('recipe-format', { file, found: Array.isArray(value) ? 'a list' : JSON.stringify(value) });
  const object = value as Record<string, unknown>;
  if (object['format'] !== recipeFormat) throw new Problem('recipe-format', { file, found: JSON.stringify(object['format']) ?? 'missing' });
  const version = object['version'];
  if (typeof version === 'number' && version > recipeVersion) throw new Problem('recipe-newer', { file, found: version, known: recipeVersion });
  return object;
}

/** Checks every value and fills defaults. @throws Problem `recipe-value`. */
export function checkRecipe(value: unknown): Recipe {
  const result = recipeSchema.safeParse(value);
  if (result.success) return result.data;
  throw problemOf(result.error, value);
}

/**
 * Applies `path=value` settings to a recipe object, in order. Values are JSON where they parse as JSON, else words; `none` removes the
 * value so that its default applies.
 *
 * @throws Problem `recipe-setting` when a setting has no `=` or its path leads through something that is not a section.
 */
export function applySettings(object: Record<string, unknown>, settings: readonly string[]): Record<string, unknown> {
  // A recipe is plain JSON, so a JSON round trip is a deep copy.
  const out = JSON.parse(JSON.stringify(object)) as Record<string, unknown>;
  for (const setting of settings) {
    const equals = setting.indexOf('=');
    const path = setting.slice(0, Math.max(0, equals)).trim();
    if (equals < 1 || !/^[A-Za-z][A-Za-z0-9]*(\.[A-Za-z][A-Za-z0-9]*)*$/.test(path)) throw new Problem('recipe-setting', { setting });
    const keys = path.replace(/^recipe\./, '').split('.');
    const last = keys.pop()!;
    let at = out;
    for (const key of keys) {
      // Own properties only: a path like `constructor.x` must not walk into the prototype.
      if (!Object.hasOwn(at, key)) Object.defineProperty(at, key, { value: {}, enumerable: true, configurable: true, writable: true });
      const next = at[key];
      if (typeof next !== 'object' || next === null || Array.isArray(next)) throw new Problem('recipe-setting', { setting });
      at = next as Record<string, unknown>;
    }
    const word = setting.slice(equals + 1).trim();
    if (word === 'none') delete at[last];
    else Object.defineProperty(at, last, { value: parsedWord(word), enumerable: true, configurable: true, writable: true });
  }
  return out;
}

function parsedWord(word: string): unknown {
  try {
    return JSON.parse(word);
  } catch {
    return word;
  }
}

/** JSON Schema (draft 2020-12) of a recipe file. */
export function recipeJsonSchema(): object {
  return z.toJSONSchema(recipeSchema, { io: 'input' });
}

function problemOf(error: z.ZodError, value: unknown): Problem {
  const issue = error.issues[0]!;
  const keys = issue.code === 'unrecognized_keys' ? [...issue.path, issue.keys[0]!] : issue.path;
  const path = ['recipe', ...keys.map(String)].join('.');
  const found = JSON.stringify(keys.reduce<unknown>((at, key) => (typeof at === 'object' && at !== null ? (at as Record<PropertyKey, unknown>)[key] : undefined), value));
  const meant = issue.code === 'unrecognized_keys' ? meantBy(issue.path.map(String), issue.keys[0]!) : undefined;
  return new Problem('recipe-value', { path, reason: `${reasonOf(issue, found)}${meant === undefined ? '' : `; did you mean ${meant}?`}` });
}

interface JsonObject {
  readonly properties?: Readonly<Record<string, JsonObject>>;
}

/** A setting near the unknown key in its own section, or one of just that name elsewhere; undefined where there is neither. */
function meantBy(section: readonly string[], key: string): string | undefined {
  const whole = recipeJsonSchema() as JsonObject;
  const own = section.reduce<JsonObject | undefined>((at, name) => at?.properties?.[name], whole);
  const near = nearestWord(key, Object.keys(own?.properties ?? {}));
  if (near !== undefined) return near;
  const elsewhere = Object.entries(whole.properties ?? {}).find(([, { properties }]) => properties !== undefined && Object.hasOwn(properties, key));
  return elsewhere && `${elsewhere[0]}.${key}`;
}
