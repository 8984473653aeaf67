/** What a required area means for one sample. */
import type { SampleSummary } from '../../workers/api.ts';
import { area } from '../sample/format.ts';

export interface Requirement {
  readonly outcome: 'enough' | 'doubtful' | 'short';
  /** "Enough", "Too little". */
  readonly headline: string;
  readonly detail: string;
}

/** Judges the usable area and its 95 % interval against the required area, and says when no single patch is that large. */
export function judge({ areaUm2, low95Um2, high95Um2, largestPatchUm2 }: SampleSummary['usable'], requiredUm2: number): Requirement {
  const spare = areaUm2 - requiredUm2;
  if (spare < 0) {
    const detail = `${area(-spare)} short`;
    return high95Um2 >= requiredUm2
      ? { outcome: 'doubtful', headline: 'Probably too little', detail: `${detail}; the interval reaches it` }
      : { outcome: 'short', headline: 'Too little', detail };
  }
  const detail = largestPatchUm2 < requiredUm2 ? 'but no single patch is that large' : `${area(spare)} to spare`;
  return low95Um2 < requiredUm2
    ? { outcome: 'doubtful', headline: 'Probably enough', detail: `${detail}; the interval reaches below` }
    : { outcome: 'enough', headline: 'Enough', detail };
}
