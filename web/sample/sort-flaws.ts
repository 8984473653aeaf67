/** Order of the flaw table. */
import type { FlawEntry } from '../../workers/api.ts';

export type FlawColumn = 'flaw' | 'cause' | 'confidence' | 'areaUm2' | 'peakNm' | 'heightToRadius';

/** Sorted by one column, ties by number; values that are absent come last in both directions. */
export function sortFlaws(flaws: readonly FlawEntry[], column: FlawColumn, ascending: boolean): readonly FlawEntry[] {
  const sign = ascending ? 1 : -1;
  return [...flaws].sort((a, b) => {
    const first = a[column];
    const second = b[column];
    if (first === second) return a.flaw - b.flaw;
    if (first === undefined) return 1;
    if (second === undefined) return -1;
    return sign * (typeof first === 'string' ? first.localeCompare(String(second)) : first - Number(second));
  });
}
