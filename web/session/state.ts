/** The page's state: plain data, so that the whole session is one serialisable document. */
import type { RecipeData, SampleSummary } from '../../workers/api.ts';

/** Where a sample stands. `asking`: its files do not state something; the import form asks for it. */
export type SampleStatus = 'waiting' | 'working' | 'ready' | 'failed' | 'asking' | 'cancelled';

/** One step of a recipe's history, named for the undo button. */
export interface RecipeStep {
  /** Sparse recipe: only what differs from the defaults. */
  readonly recipe: RecipeData;
  /** What led to this recipe: "band factor 5". Empty for the first. */
  readonly label: string;
}

export interface SampleState {
  readonly id: string;
  readonly name: string;
  readonly files: readonly string[];
  /** True for the invented samples that the page opens on. */
  readonly demo?: boolean;
  readonly status: SampleStatus;
  /** Stage at work and how many of all are done, while working. */
  readonly progress?: { readonly stage: string; readonly done: number; readonly total: number };
  /** Last good result; stays on show while a new one is computed. */
  readonly summary?: SampleSummary;
  /** What was booked and found before the last change of the recipe, for "this returned 0.3 µm²". */
  readonly previous?: Pick<SampleSummary, 'ledger' | 'flaws'> & { readonly usableUm2: number };
  readonly error?: { readonly code: string; readonly message: string; readonly detail?: unknown };
  /** History of recipes and the place in it; undo and redo move the place. */
  readonly history: readonly RecipeStep[];
  readonly at: number;
  /** Number of the newest run; answers of older runs are dropped. */
  readonly run: number;
  /** True after a run that ended with a lost worker, until one succeeds: it is retried once by itself. */
  readonly restarted?: boolean;
}

/** `method` explains how something is done; from there one goes back to the sample that one came from. */
export type Place =
  | { readonly name: 'tray' }
  | { readonly name: 'sample'; readonly id: string }
  | { readonly name: 'method'; readonly id: string; readonly topic: string };

export interface SessionState {
  readonly place: Place;
  readonly samples: readonly SampleState[];
  /** Required usable area in µm² that tray verdicts are judged by; absent: not judged. */
  readonly requiredUm2?: number;
  readonly theme: 'dark' | 'light' | 'system';
  /** Files that could not be used, said once until dismissed. */
  readonly notices: readonly { readonly name: string; readonly message: string }[];
}
