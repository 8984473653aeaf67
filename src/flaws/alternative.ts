import { isUnsure } from './classify.ts';
import type { Flaw, FlawCause } from './flaws.ts';

/** What each class is decided against: a dome against a lump or film, a ridge against domes in a row. A short and an open are told by the current alone. */
const against: Readonly<Record<FlawCause, FlawCause | undefined>> = { bubble: 'residue', residue: 'bubble', wrinkle: 'bubble', short: undefined, open: undefined };

/** The class that an ambiguous flaw could as well be; undefined where its own is likely or a person said so. */
export function alternativeOf({ cause, confidence, byHand }: Pick<Flaw, 'cause' | 'confidence' | 'byHand'>): FlawCause | undefined {
  return byHand || !isUnsure(confidence) ? undefined : against[cause];
}
