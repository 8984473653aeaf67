/** Remembers what a change of the recipe will be held against. */
import type { SampleState } from '../state.ts';

export function beforeChange({ previous: _former, ...sample }: SampleState): SampleState {
  const { summary } = sample;
  return summary === undefined ? sample : { ...sample, previous: { usableUm2: summary.usable.areaUm2, ledger: summary.ledger, flaws: summary.flaws } };
}
