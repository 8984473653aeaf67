/** The computation as those see it who share its memory: the command line, and the worker that exposes it. */
import type { SampleGroup } from '../src/read/pairing.ts';
import type { Appraised } from '../src/report/appraised.ts';
import type { Compute, OnStage, RecipeData, SourceFile } from './api.ts';

/** Where a sample's bytes come from: files, or the invented sample of a name. */
export type SampleSource =
  | { readonly kind: 'files'; readonly group: SampleGroup; readonly files: readonly SourceFile[] }
  | { readonly kind: 'demo'; readonly name: string };

/** A sample to keep. Plain data, so that it can be sent to another worker when the first is lost. */
export interface SampleOffer {
  readonly name: string;
  /** Names of the files that make it up. */
  readonly files: readonly string[];
  readonly source: SampleSource;
}

export interface Offers {
  readonly samples: readonly SampleOffer[];
  readonly skipped: readonly { readonly name: string; readonly reason: string }[];
  readonly failed: readonly { readonly name: string; readonly message: string }[];
}

export interface LocalCompute extends Compute {
  /** Groups files into samples without keeping any. */
  group(files: readonly SourceFile[]): Promise<Offers>;
  /** The invented samples, none kept or painted. */
  demos(): Promise<Offers>;
  /**
   * Keeps a sample under an id of the caller's; one of the same id is replaced. `recipe` is one it was appraised by elsewhere: then pictures,
   * points and files can be asked for at once, and the appraisal is made when they are.
   */
  adopt(id: string, offer: SampleOffer, recipe?: RecipeData): Promise<void>;
  /** `appraise` without the summary. */
  carry(run: number, id: string, recipe: RecipeData, onStage?: OnStage): Promise<Appraised>;
}
