/** What the same files give in this process, where the command line computes too. */
import { readFileSync } from 'node:fs';
import { basename } from 'node:path';
import { ComputeError } from '../../workers/api.ts';
import type { RecipeData, SampleSummary } from '../../workers/api.ts';
import { createCompute } from '../../workers/compute.ts';
import { area } from '../../web/sample/format.ts';

export interface Expected {
  readonly summary: SampleSummary;
  /** As the page writes it. */
  readonly area: string;
  readonly causes: Uint8Array;
}

/** Appraises one sample's files. */
export async function expectedOf(paths: readonly string[], recipe: RecipeData = {}): Promise<Expected> {
  const compute = createCompute();
  const { samples: [sample] } = await compute.open(paths.map((path) => ({ name: basename(path), content: new Uint8Array(readFileSync(path)) })));
  if (sample === undefined) throw new Error(`${paths.join(', ')} make no sample`);
  const summary = await compute.appraise(1, sample.id, recipe);
  return { summary, area: area(summary.usable.areaUm2).replace(/\s+/g, ' '), causes: await compute.resultFile(sample.id, 'causes.tif') };
}

/** The code of the problem that stops an appraisal, undefined where none does. */
export async function refusalOf(paths: readonly string[]): Promise<ComputeError | undefined> {
  try {
    await expectedOf(paths);
    return undefined;
  } catch (error) {
    if (error instanceof ComputeError) return error;
    throw error;
  }
}
