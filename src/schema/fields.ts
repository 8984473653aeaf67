/**
 * Fields of a recipe section. One declaration gives the type, the parser with a path in its error,
 * the JSON Schema, the command line's `--set`, the reference text and, later, the form.
 */
import { z } from 'zod';

// The page runs under a policy without `unsafe-eval`; zod's compiled fast path would only probe and fail.
z.config({ jitless: true });

/** What a person needs to know about a field; travels as the schema's metadata. */
export interface FieldText {
  /** Short name shown beside the value, sentence case. */
  readonly title: string;
  /** One or two sentences: what it does and when to change it. */
  readonly description: string;
  /** Unit symbol of the value, absent for pure numbers. */
  readonly unit?: string;
  /** What is used when the field is absent, in words ("proposed from the map"). */
  readonly absent?: string;
}

interface NumberRange {
  readonly min?: number;
  readonly above?: number;
  readonly max?: number;
  readonly integer?: boolean;
}

function boundedNumber(range: NumberRange, text: FieldText) {
  let schema = z.number();
  if (range.integer) schema = schema.int();
  if (range.min !== undefined) schema = schema.min(range.min);
  if (range.above !== undefined) schema = schema.gt(range.above);
  if (range.max !== undefined) schema = schema.max(range.max);
  return schema.meta({ ...text });
}

/** A number with a default. */
export function numberField(fallback: number, range: NumberRange, text: FieldText) {
  return boundedNumber(range, text).default(fallback).meta({ ...text });
}

/** A number that may be absent; `text.absent` says what happens then. */
export function optionalNumberField(range: NumberRange, text: FieldText & { absent: string }) {
  return boundedNumber(range, text).optional().meta({ ...text });
}

/** One of a fixed list of words, with a default. */
export function choiceField<const Choices extends readonly [string, ...string[]]>(choices: Choices, fallback: Choices[number], text: FieldText) {
  // The cast narrows zod's generic default type, which cannot see that `fallback` is one of `choices`.
  return z.enum(choices).default(fallback as never).meta({ ...text });
}

/** One of a fixed list of words, or absent. */
export function optionalChoiceField<const Choices extends readonly [string, ...string[]]>(choices: Choices, text: FieldText & { absent: string }) {
  return z.enum(choices).optional().meta({ ...text });
}

/** Yes or no, with a default. */
export function flagField(fallback: boolean, text: FieldText) {
  return z.boolean().default(fallback).meta({ ...text });
}

/** A free word that may be absent. */
export function optionalWordField(text: FieldText & { absent: string }) {
  return z.string().min(1).max(64).optional().meta({ ...text });
}

/** A section of the recipe: unknown keys are refused, absent sections are filled with defaults. */
export function section<Shape extends z.ZodRawShape>(shape: Shape) {
  return z.strictObject(shape);
}
