/** What goes wrong behind the interface, as errors with a code. */
import { Problem } from '../src/problems/problem.ts';
import { ComputeError } from './api.ts';

/** Sentences of the computation itself; problems with inputs and recipes have theirs in the catalogue. */
const sentences = {
  aborted: () => 'Stopped before it was finished.',
  'sample-unknown': (id: string) => `There is no open sample ${id}; open its files again.`,
  'sample-not-appraised': (name: string) => `${name} has not been appraised yet; appraise it first.`,
  'map-absent': (map: string) => `This sample has no ${map} map.`,
  'result-unknown': (file: string) => `This sample writes no file called ${file}.`,
  'request-value': (reason: string) => `The request cannot be answered: ${reason}.`,
} as const;

export function failure<Code extends keyof typeof sentences>(code: Code, ...words: Parameters<(typeof sentences)[Code]>): ComputeError {
  const write = sentences[code] as (...words: readonly string[]) => string;
  return new ComputeError(code, write(...words), words[0]);
}

/** Any error as one that crosses the wire. What nobody foresaw gets the code `bug`, its detail the stack. */
export function asComputeError(error: unknown, about = 'Evenglow'): ComputeError {
  if (error instanceof ComputeError) return error;
  if (error instanceof Problem) return new ComputeError(error.code, error.message, error.detail);
  const message = error instanceof Error ? error.message : String(error);
  return new ComputeError('bug', `${about}: unexpected error (${message}); please report it.`, error instanceof Error ? (error.stack ?? message) : message);
}
