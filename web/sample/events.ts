/** What the Sample place tells those around it. */
import type { Hand, NamedCorrection } from '../hand/hand.ts';

export interface RecipeChange {
  /** `band.factor`. */
  readonly path: string;
  /** Undefined: back to the default. */
  readonly value: number | string | boolean | undefined;
  /** Name of the step, for the undo button. */
  readonly label: string;
}

/** Event `recipe-change`; it crosses shadow roots. */
export type RecipeChangeEvent = CustomEvent<RecipeChange>;

/** Event `flaw-select`: a flaw's number, or undefined for none. */
export type FlawSelectEvent = CustomEvent<{ readonly flaw: number | undefined }>;

/** Event `correction`: one more correction by hand. */
export type CorrectionEvent = CustomEvent<NamedCorrection>;

/** Event `correction-out`: the correction at a place of the list is taken out. */
export type CorrectionOutEvent = CustomEvent<{ readonly index: number; readonly label: string }>;

/** Event `hand`: a tool is taken in hand, or put away. */
export type HandEvent = CustomEvent<{ readonly hand: Hand | undefined }>;
