/** What a person typed into the import form: checked, and put into words for the history. */
import type { FieldInfo } from '../../workers/api.ts';
import { typedNumber } from '../sample/format.ts';

export type Typed = { readonly value: number | string } | { readonly complaint: string } | undefined;

/** The value of one field; undefined when it was left empty, which a required field complains about. A decimal comma is understood. */
export function readTyped(field: FieldInfo, text: string, required: boolean): Typed {
  const typed = text.trim();
  if (typed === '') return required ? { complaint: field.kind === 'choice' ? 'Choose one.' : 'Type a number.' } : undefined;
  if (field.kind !== 'number') return { value: typed };
  const value = typedNumber(typed);
  if (!Number.isFinite(value)) return { complaint: `“${typed}” is not a number.` };
  const unit = field.unit === undefined ? '' : ` ${field.unit}`;
  // A length of nothing is no length, whatever the field's range says.
  if (field.unit === 'µm' && value <= 0) return { complaint: 'It must be above 0.' };
  if (field.min !== undefined && value < field.min) return { complaint: `It must be at least ${field.min}${unit}.` };
  if (field.max !== undefined && value > field.max) return { complaint: `It must be at most ${field.max}${unit}.` };
  return { value };
}

const unitWords: Readonly<Record<string, string>> = { um: 'µm', uA: 'µA', angstrom: 'Å', relative: 'relative (scale unknown)' };

/** A choice as people write it. */
export function choiceWords(choice: string): string {
  return Object.hasOwn(unitWords, choice) ? unitWords[choice]! : choice;
}

/** "stated width 10 µm, height unit nm". */
export function statementLabel(fields: readonly FieldInfo[], values: Readonly<Record<string, number | string>>): string {
  const said = fields.filter(({ path }) => Object.hasOwn(values, path)).map(({ path, title, unit }) => {
    const value = values[path]!;
    return `${title.toLowerCase()} ${typeof value === 'string' ? choiceWords(value) : `${value}${unit === undefined ? '' : ` ${unit}`}`}`;
  });
  return `stated ${said.join(', ')}`;
}
