/** One sample carried through the whole chain: everything a verdict, a report or a picture is made from. */
import type { Barrier } from '../barrier/barrier.ts';
import type { Flaws } from '../flaws/flaws.ts';
import type { Ground } from '../ground/ground.ts';
import type { Ledger } from '../ledger/ledger.ts';
import type { Notice } from '../problems/problem.ts';
import type { Sample } from '../read/sample.ts';
import type { Recipe } from '../recipe/recipe.ts';
import type { Sheet } from '../sheet/sheet.ts';

export interface Appraisal {
  readonly sample: Sample;
  readonly recipe: Recipe;
  readonly ground: Ground;
  readonly flaws: Flaws;
  /** Absent when the sample has no current. */
  readonly barrier?: Barrier;
  readonly sheet?: Sheet;
  readonly ledger: Ledger;
  /** All stages' remarks in the order of the chain. */
  readonly warnings: readonly Notice[];
  /** Milliseconds per stage; the only thing in a verdict that may differ between two runs. */
  readonly timings: Readonly<Record<string, number>>;
}
