/** What the last change of the recipe did to the areas, in a sentence. */
import { css } from 'lit';
import type { FlawEntry, LedgerEntry, SampleSummary } from '../../workers/api.ts';
import { correctionsOf } from '../session/recipe.ts';
import type { SampleState } from '../session/state.ts';
import { area } from './format.ts';

export interface Effect {
  readonly words: string;
  /** Usable area was gained, lost, or neither. */
  readonly tone: 'gain' | 'cost' | 'same';
}

export const noEffect: Effect = { words: '', tone: 'same' };

/** Of the class `effect`, by tone. */
export const effectStyles = css`
  .effect { color: var(--dim, #8fa0af); }
  .effect.gain { color: var(--good, #7fd6bb); }
  .effect.cost { color: var(--bad, #ff9a76); }
`;

/** Areas below this are what rounding leaves, µm². */
const nothingUm2 = 5e-4;
/** Corrections name places to a tenth of a nanometre. */
const samePlaceUm = 2e-4;

/** "This returned 0.3 µm²."; empty when there is nothing to compare with. */
export function effectOf(sample: Pick<SampleState, 'previous' | 'history' | 'at'>, summary: Pick<SampleSummary, 'usable' | 'ledger'>): Effect {
  const { previous } = sample;
  if (previous === undefined) return noEffect;
  const gainedUm2 = summary.usable.areaUm2 - previous.usableUm2;
  const tone = Math.abs(gainedUm2) < nothingUm2 ? 'same' : gainedUm2 > 0 ? 'gain' : 'cost';
  const usable = tone === 'gain' ? `returned ${area(gainedUm2)}` : tone === 'cost' ? `cost ${area(-gainedUm2)}` : 'changed no usable area';
  const dismissed = dismissedFlaw(sample);
  // What was the flaw's is now under other causes.
  const gains = changesOf(previous.ledger, summary.ledger).filter(({ cause, changeUm2 }) => changeUm2 > 0 && cause !== 'usable');
  if (dismissed !== undefined && gains.length > 0) {
    const booked = gains.map(({ cause, changeUm2 }) => `${area(changeUm2)} is now booked ${cause}${reason(cause, dismissed)}`).join('; ');
    return { words: `No flaw any more; ${tone === 'same' ? '' : `this ${usable}; `}${booked}.`, tone };
  }
  if (tone !== 'same') return { words: `This ${usable}.`, tone };
  return { words: `This ${usable}${gains.length === 0 ? '.' : `: ${movedWords(previous.ledger, summary.ledger)}.`}`, tone };
}

/** The flaw that the newest correction says is none; undefined where the last step was another. */
function dismissedFlaw({ history, at, previous }: Pick<SampleState, 'previous' | 'history' | 'at'>): FlawEntry | undefined {
  const [now, before] = [history[at], history[at - 1]];
  if (now === undefined || before === undefined) return undefined;
  const corrections = correctionsOf(now.recipe);
  const last = corrections[corrections.length - 1];
  if (last?.kind !== 'dismiss' || corrections.length !== correctionsOf(before.recipe).length + 1) return undefined;
  return previous?.flaws.find(({ insideUm }) => insideUm !== undefined && Math.hypot(insideUm[0] - last.xUm, insideUm[1] - last.yUm) < samePlaceUm);
}

/** Why ground that is no flaw is not usable either. */
function reason(cause: string, { reason: seen }: FlawEntry): string {
  if (cause === 'thick') return /\bno current\b/.test(seen) ? ', because no current flows there' : ', because too little current flows there';
  if (cause === 'thin') return ', because too much current flows there';
  return cause === 'unmeasured' ? ', because its current is not known' : '';
}

interface Change {
  readonly cause: string;
  readonly changeUm2: number;
}

function changesOf(before: readonly LedgerEntry[], now: readonly LedgerEntry[]): readonly Change[] {
  return now
    .map(({ code, cause, areaUm2 }) => ({ cause, changeUm2: areaUm2 - (before.find((entry) => entry.code === code)?.areaUm2 ?? 0) }))
    .filter(({ changeUm2 }) => Math.abs(changeUm2) >= nothingUm2);
}

/** "1.10 µm² went from bubble to residue", or cause by cause where it is not that simple. */
function movedWords(before: readonly LedgerEntry[], now: readonly LedgerEntry[]): string {
  const changes = changesOf(before, now);
  const [gain, loss] = [changes.filter(({ changeUm2 }) => changeUm2 > 0), changes.filter(({ changeUm2 }) => changeUm2 < 0)];
  if (gain.length === 1 && loss.length === 1) return `${area(gain[0]!.changeUm2)} went from ${loss[0]!.cause} to ${gain[0]!.cause}`;
  return changes.map(({ cause, changeUm2 }) => `${cause} ${changeUm2 > 0 ? '+' : '−'}${area(Math.abs(changeUm2))}`).join(', ');
}
