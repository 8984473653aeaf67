/** What the Sample place tells those around it. */
import type { Hand, NamedCorrection } from '../hand/hand.ts';
import type { Spot } from '../session/recipe.ts';

export interface RecipeChange {
  /** `band.factor`. */
  readonly path: string;
  /** Undefined: back to the default. */
  readonly value: number | string | boolean | undefined;
  /** Name of the step, for the undo button. */
  readonly label: string;
}

/** Event `recipe-change`; it crosses shadow roots. */

/** Event `recipe-take`, without detail; it crosses shadow roots: a handle has been taken and may move. */

/** A handle that is held has come to a value; undefined: it was let go where it was taken. */
export interface RecipePreview {
  readonly path: string;
  readonly value: number | undefined;
}

/** Event `recipe-preview`; it crosses shadow roots. */
export type RecipePreviewEvent = CustomEvent<RecipePreview>;

/** Event `how`: the method page is wanted, at a topic. */
export type HowEvent = CustomEvent<{ readonly topic: string }>;

/** Event `mark-repaired`: repaired pixels are to be seen on the map, or not. */
export type MarkRepairedEvent = CustomEvent<{ readonly on: boolean }>;

/** Event `spots`: ground is where these places are; none: it is found automatically. */
export type SpotsEvent = CustomEvent<{ readonly spots: readonly Spot[]; readonly label: string }>;

/** Event `flaw-select`: a flaw's number, or undefined for none. */
export type FlawSelectEvent = CustomEvent<{ readonly flaw: number | undefined }>;

/** Event `correction`: one more correction by hand. */
export type CorrectionEvent = CustomEvent<NamedCorrection>;

/** Event `correction-out`: the correction at a place of the list is taken out. */
export type CorrectionOutEvent = CustomEvent<{ readonly index: number; readonly label: string }>;

/** Event `hand`: a tool is taken in hand, or put away. */
export type HandEvent = CustomEvent<{ readonly hand: Hand | undefined }>;
