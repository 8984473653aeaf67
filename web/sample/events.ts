/** What the Sample place tells those around it. */

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
