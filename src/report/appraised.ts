/**
 * What the report stage needs to know about a sample. It is spelled out from earlier stages' types,
 * so that this folder does not depend on the evaluation above it; an `Appraisal` fits it as it is.
 */
import type { Barrier } from '../barrier/barrier.ts';
import type { BarrierSection } from '../barrier/recipe.ts';
import type { Flaws } from '../flaws/flaws.ts';
import type { CorrectionEntry, FlawsSection } from '../flaws/recipe.ts';
import type { Ground } from '../ground/ground.ts';
import type { Texture } from '../ground/measure-texture.ts';
import type { GroundSection } from '../ground/recipe.ts';
import type { Ledger } from '../ledger/ledger.ts';
import type { BandSection } from '../ledger/recipe.ts';
import type { PlanSection } from '../plan/recipe.ts';
import type { Notice } from '../problems/problem.ts';
import type { ScanSection } from '../read/recipe.ts';
import type { Sample } from '../read/sample.ts';
import type { StackSection } from '../sheet/recipe.ts';
import type { Sheet } from '../sheet/sheet.ts';

/** The program that made the result. */
export interface App {
  readonly name: string;
  readonly version: string;
}

/** The complete recipe, defaults filled in. */
export interface AppliedRecipe {
  readonly format: string;
  readonly version: number;
  readonly scan: ScanSection;
  readonly ground: GroundSection;
  readonly flaws: FlawsSection;
  readonly barrier: BarrierSection;
  readonly stack: StackSection;
  readonly band: BandSection;
  readonly plan: PlanSection;
  readonly corrections: readonly CorrectionEntry[];
}

/** One sample carried through the chain, as far as a result file can tell. */
export interface Appraised {
  readonly sample: Sample;
  readonly recipe: AppliedRecipe;
  readonly ground: Ground;
  readonly flaws: Flaws;
  readonly barrier?: Barrier;
  readonly sheet?: Sheet;
  readonly ledger: Ledger;
  /** Absent without a height, and where no flawless ground was measured. */
  readonly texture?: Texture;
  readonly warnings: readonly Notice[];
  /** Milliseconds per stage. */
  readonly timings: Readonly<Record<string, number>>;
}
