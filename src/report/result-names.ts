/** Names and kinds of an appraisal's result files, without making them. */
import type { Appraised } from './appraised.ts';
import { resultMaps } from './result-maps.ts';

/** Kinds of files that `--only` names; a file's kind is what its name ends in. */
export const resultKinds = ['json', 'csv', 'tif', 'html', 'gds', 'dxf', 'svg'] as const;
export type ResultKind = (typeof resultKinds)[number];

/** Files that every appraisal has, in the order of writing, after the maps. */
export const fixedNames = ['ledger.csv', 'flaws.csv', 'report.html', 'verdict.json'] as const;

/** Names of all files that an appraisal can write, whatever was asked for. */
export function resultNames(appraised: Appraised): string[] {
  return [...resultMaps(appraised).map(({ file }) => file), ...fixedNames];
}

/** Kind of a result file; undefined for a name that is none. */
export function kindOfResult(name: string): ResultKind | undefined {
  return resultKinds.find((kind) => name.endsWith(`.${kind}`));
}
