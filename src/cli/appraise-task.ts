/** What a thread is given and what it gives back. */
import type { SampleGroup } from '../read/pairing.ts';
import type { Recipe } from '../recipe/recipe.ts';
import type { App } from '../report/appraised.ts';
import type { TrayRow } from '../report/tray.ts';
import type { ResultKind } from './write-results.ts';

/** Plain data, so that it crosses to a thread. */
export interface AppraiseTask {
  readonly directory: string;
  readonly group: SampleGroup;
  readonly recipe: Recipe;
  readonly out: string;
  /** Folder of the results inside `out`. */
  readonly folder: string;
  readonly only?: readonly ResultKind[];
  readonly resume: boolean;
  readonly app: App;
}

export interface AppraiseResult {
  readonly row: TrayRow;
  /** Remarks of the sample, in sentences. */
  readonly remarks: readonly string[];
  /** True when unchanged results were kept. */
  readonly kept: boolean;
  /** Text of an unforeseen error (a bug); the row then says so too. */
  readonly bug?: string;
}
