/** What a sidecar `S.json` or a manifest's row states about a sample; both have the same keys. */
import { reasonOf } from '../schema/reason.ts';
import { z } from 'zod';
import { notice, Problem } from '../problems/problem.ts';
import type { Notice } from '../problems/problem.ts';
import { optionalChoiceField, optionalNumberField, optionalWordField } from '../schema/fields.ts';
import type { InputFile } from './input.ts';
import { currentUnits, heightUnits } from './recipe.ts';
import { textOf } from './text.ts';

const fileField = (title: string) => z.string().min(1).max(255).optional().meta({ title, description: 'File name; "#2" behind it picks the second map in it.' });

/** One schema for both doors. Lengths are full widths, pixel edge to pixel edge. */
const statedSchema = z.object({
  sample: optionalWordField({ title: 'Sample', description: 'Name of the sample.', absent: 'taken from the file name' }),
  height: fileField('Height map'),
  current: fileField('Current map'),
  iv: fileField('I–V curves'),
  outlines: fileField('Outlines'),
  widthUm: optionalNumberField({ above: 0, max: 1e6 }, { title: 'Width', unit: 'µm', description: 'Full width of the map.', absent: 'taken from the file or the recipe' }),
  heightUm: optionalNumberField({ above: 0, max: 1e6 }, { title: 'Height', unit: 'µm', description: 'Full height of the map.', absent: 'square pixels' }),
  heightUnit: optionalChoiceField(heightUnits, { title: 'Height unit', description: 'Unit of the height values.', absent: 'taken from the file or the recipe' }),
  currentUnit: optionalChoiceField(currentUnits, { title: 'Current unit', description: 'Unit of the current values.', absent: 'taken from the file or the recipe' }),
  biasV: optionalNumberField({ min: -100, max: 100 }, { title: 'Bias', unit: 'V', description: 'Bias of the current maps whose name does not say it.', absent: 'taken from the file name or the recipe' }),
  surface: optionalChoiceField(['barrier', 'stack'], { title: 'Surface', description: 'What was scanned.', absent: 'taken from the recipe' }),
  role: optionalWordField({ title: 'Role', description: '"height" or "current" gives the role of a lone map; other words are remarks.', absent: 'taken from the file name or the recipe' }),
});

/** Statements about one sample, checked. */
export type Stated = z.output<typeof statedSchema>;
export type StatedKey = keyof Stated;
export const statedKeys = Object.keys(statedSchema.shape) as StatedKey[];

/** Numbers among the keys; a manifest's cells are turned into numbers for these. */
export const statedNumbers: readonly StatedKey[] = ['widthUm', 'heightUm', 'biasV'];

/**
 * Checks an object of statements; unknown keys are left out.
 * `place(key)` names the spot in sentences ("widthUm" or "line 3, widthUm"). Throws `sidecar-value`.
 */
export function checkStated(file: string, value: Readonly<Record<string, unknown>>, place: (key: string) => string): Stated {
  const known = Object.fromEntries(Object.entries(value).filter(([key]) => statedKeys.includes(key as StatedKey)));
  const result = statedSchema.safeParse(known);
  if (result.success) return result.data;
  const issue = result.error.issues[0]!;
  const key = String(issue.path[0] ?? '');
  const shown = JSON.stringify(value[key]);
  const reason = reasonOf(issue, shown);
  throw new Problem('sidecar-value', { file, place: place(key), reason });
}

/**
 * Reads a sidecar. A JSON with none of our keys gives no statements and a remark, one with some of them a
 * remark about the others. Throws `sidecar-not-json` and `sidecar-value`.
 */
export function readSidecar(file: InputFile): { stated: Stated; warnings: Notice[] } {
  let value: unknown;
  try {
    value = JSON.parse(textOf(file.bytes));
  } catch (error) {
    throw new Problem('sidecar-not-json', { file: file.name, reason: error instanceof Error ? error.message.slice(0, 120) : 'unreadable' });
  }
  const ignored = { stated: {}, warnings: [notice('sidecar-ignored', { file: file.name })] };
  if (typeof value !== 'object' || value === null || Array.isArray(value)) return ignored;
  const object = value as Record<string, unknown>;
  const unknown = Object.keys(object).filter((key) => !statedKeys.includes(key as StatedKey));
  if (unknown.length === Object.keys(object).length) return ignored;
  const stated = checkStated(file.name, object, (key) => key);
  return { stated, warnings: unknown.length === 0 ? [] : [unknownKeys(file.name, unknown)] };
}

/** The remark about keys or columns that nobody reads. */
export function unknownKeys(file: string, keys: readonly string[]): Notice {
  return notice('sidecar-unknown-key', { file, keys: keys.slice(0, 8).map((key) => JSON.stringify(key.slice(0, 40))).join(', '), known: statedKeys.join(', ') });
}

/** One set of statements from two sources; throws `sidecar-disagreement` where both state a key and differ. */
export function mergeStated(sample: string, first: { by: string; stated: Stated }, second: { by: string; stated: Stated }): Stated {
  for (const key of statedKeys) {
    const a = first.stated[key];
    const b = second.stated[key];
    if (a !== undefined && b !== undefined && a !== b && key !== 'sample') {
      throw new Problem('sidecar-disagreement', { sample, key, first: first.by, firstValue: String(a), second: second.by, secondValue: String(b) });
    }
  }
  return { ...first.stated, ...second.stated };
}
