/** What a command of the command line consists of. */
import type { ParseArgsConfig } from 'node:util';
import { Problem } from '../problems/problem.ts';
import type { Output } from './output.ts';

export const exitCodes = { good: 0, usage: 2, someFailed: 3, interrupted: 130 } as const;

export interface Parsed {
  readonly values: Record<string, unknown>;
  readonly positionals: readonly string[];
}

export interface Command {
  readonly name: string;
  /** One line for the overview. */
  readonly summary: string;
  /** How to call it, a line each. */
  readonly usage: readonly string[];
  readonly options: NonNullable<ParseArgsConfig['options']>;
  /** Option → what it does, in the order of the help. */
  readonly optionText: Readonly<Record<string, string>>;
  /** Closing paragraphs of the help. */
  readonly notes: readonly string[];
  readonly run: (parsed: Parsed, output: Output) => Promise<number>;
}

/** Errors that Node's argument parser throws for a wrong command line. */
export function isUsageError(error: unknown): error is Error {
  return error instanceof Error && 'code' in error && typeof error.code === 'string' && error.code.startsWith('ERR_PARSE_ARGS');
}

/** A number given as an option; undefined when it is absent. @throws Problem when it is not a number. */
export function numberOption(values: Record<string, unknown>, name: string): number | undefined {
  const text = values[name];
  if (text === undefined) return undefined;
  const value = Number(text);
  if (typeof text !== 'string' || text.trim() === '' || !Number.isFinite(value)) throw new Problem('option-number', { option: `--${name}`, value: String(text) });
  return value;
}
