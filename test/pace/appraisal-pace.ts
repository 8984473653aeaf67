/** Times of one appraisal, stage by stage, in this process. */
import { thisApp } from '../../src/cli/app.ts';
import { writeResults } from '../../src/cli/write-results.ts';
import type { Appraisal } from '../../src/evaluate/appraisal.ts';
import { evaluate, stageNames } from '../../src/evaluate/evaluate.ts';
import { sheetInput } from '../../src/evaluate/sheet-question.ts';
import type { InputFile } from '../../src/read/input.ts';
import { groupInputs } from '../../src/read/pairing.ts';
import { readSample } from '../../src/read/read-sample.ts';
import { sha256 } from '../../src/read/sha256.ts';
import { checkRecipe, defaultRecipe } from '../../src/recipe/parse-recipe.ts';
import type { Recipe } from '../../src/recipe/recipe.ts';
import { assessSheet } from '../../src/sheet/assess-sheet.ts';
import { referenceData, referenceWork } from './reference.ts';
import { timed, timedAsync, timesOf } from './times.ts';
import type { Times } from './times.ts';

export interface AppraisalPace {
  readonly reference: Times;
  /** In the order of the chain, then the sum of one appraisal, then the voltage drop, which no appraisal without sheet resistance solves. */
  readonly parts: ReadonlyMap<string, Times>;
  /** Share of usable ground: the same on every machine, or the times are of different work. */
  readonly usableShare: number;
  /** Keeps every result needed, so that no work can be optimised away. */
  readonly sink: number;
}

export const dropName = 'voltage drop';
export const wholeName = 'appraisal';
const referencesPerRepeat = 5;

/** Appraises the files once to warm up and then `repeats` times; results go to `directory`. */
export async function appraisalPace(files: readonly InputFile[], directory: string, repeats: number): Promise<AppraisalPace> {
  const recipe = checkRecipe({ ...defaultRecipe(), stack: { biasV: 4 } });
  const resistive = checkRecipe({ ...defaultRecipe(), stack: { biasV: 4, emitterSheetOhm: 1e5, injectorSheetOhm: 1e3 } });
  const taken = new Map<string, number[]>();
  const references: number[] = [];
  const note = (name: string, ms: number): void => void taken.set(name, [...(taken.get(name) ?? []), ms]);
  let sink = 0;
  let usableShare = Number.NaN;
  let data: ReturnType<typeof referenceData> | undefined;
  for (let repeat = -1; repeat < repeats; repeat++) {
    const { appraisal, ms } = await appraiseOnce(files, recipe, directory);
    const { drop, sum } = timedDrop(appraisal, resistive);
    usableShare = appraisal.ledger.usable.share;
    sink += sum + appraisal.ledger.footprintPixels;
    const { columns, rows } = appraisal.sample.grid;
    data ??= referenceData(columns * rows);
    // Beside each repeat, so that both meet the same moods of the machine.
    const own = Array.from({ length: referencesPerRepeat }, () => timed(() => { sink += referenceWork(data!); }));
    // The first round only warms up: it is compiled while it runs.
    if (repeat < 0) continue;
    for (const [name, value] of ms) note(name, value);
    note(wholeName, ms.reduce((total, [, value]) => total + value, 0));
    note(dropName, drop);
    references.push(...own);
  }
  return { reference: timesOf(references), parts: new Map([...taken].map(([name, ms]) => [name, timesOf(ms)])), usableShare, sink };
}

async function appraiseOnce(files: readonly InputFile[], recipe: Recipe, directory: string) {
  const [group] = groupInputs(files.map(({ name }) => ({ name }))).samples;
  if (!group) throw new Error('the painted files make no sample');
  const start = performance.now();
  const sample = await readSample(group, files, recipe.scan, sha256);
  const read = performance.now() - start;
  const appraisal = evaluate(sample, recipe, { now: () => performance.now() });
  const write = await timedAsync(async () => void await writeResults(directory, 'pace', appraisal, thisApp()));
  const ms: [name: string, ms: number][] = [['read', read], ...stageNames.map((stage): [string, number] => [stage, appraisal.timings[stage] ?? Number.NaN]), ['write', write]];
  return { appraisal, ms };
}

/** The sheet stage again, with sheets that resist: the one part whose work depends on the recipe more than on the map. */
function timedDrop({ sample, ground, flaws, barrier }: Appraisal, recipe: Recipe): { drop: number; sum: number } {
  if (!barrier) throw new Error('the painted scan has no barrier');
  let sum = 0;
  const drop = timed(() => {
    const sheet = assessSheet(sheetInput(sample, ground, flaws, barrier, recipe));
    if (!sheet.localBiasV) throw new Error(`the voltage drop was not solved: ${sheet.warnings.map(({ message }) => message).join(' ')}`);
    sum = sheet.totals?.deviceCurrentA ?? 0;
  });
  return { drop, sum };
}
