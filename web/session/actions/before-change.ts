/** Remembers the usable area that a change of the recipe will be held against. */
import type { SampleState } from '../state.ts';

export function beforeChange({ previousUsableUm2: _former, ...sample }: SampleState): SampleState {
  return sample.summary === undefined ? sample : { ...sample, previousUsableUm2: sample.summary.usable.areaUm2 };
}
