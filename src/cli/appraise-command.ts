import { readFile } from 'node:fs/promises';
import { availableParallelism } from 'node:os';
import { resolve } from 'node:path';
import { Problem } from '../problems/problem.ts';
import { applySettings, checkRecipe, defaultRecipe, recipeObject } from '../recipe/parse-recipe.ts';
import type { Recipe } from '../recipe/recipe.ts';
import { failedTrayRow, isFailed } from '../report/tray.ts';
import type { TrayRow } from '../report/tray.ts';
import { thisApp } from './app.ts';
import type { AppraiseResult, AppraiseTask } from './appraise-task.ts';
import type { Command, Parsed } from './command.ts';
import { exitCodes, numberOption } from './command.ts';
import { folderNames } from './folder-names.ts';
import { gatherInputs } from './gather-inputs.ts';
import { ledgerText } from './ledger-text.ts';
import type { Output } from './output.ts';
import { Progress } from './output.ts';
import { prepareOutput } from './prepare-output.ts';
import { runTasks } from './run-tasks.ts';
import { resultKinds, writeTray } from './write-results.ts';
import type { ResultKind } from './write-results.ts';

/** `evenglow appraise`: maps to ledgers, verdicts and files. */
export const appraiseCommand: Command = {
  name: 'appraise',
  summary: 'Appraises samples: reads maps, books every pixel to a cause, writes verdict, ledger, maps and report.',
  usage: ['evenglow appraise <file|folder|manifest.csv>… --out DIR [options]'],
  options: {
    out: { type: 'string' }, recipe: { type: 'string' }, set: { type: 'string', multiple: true }, jobs: { type: 'string' },
    resume: { type: 'boolean' }, shard: { type: 'string' }, only: { type: 'string' },
  },
  optionText: {
    '--out DIR': 'folder for the results: one folder per sample, and tray.csv, tray.jsonl, tray.html',
    '--recipe FILE': 'recipe to use instead of the default ("evenglow recipe" prints that)',
    '--set path=value': 'sets one value of the recipe, may be repeated: --set stack.biasV=4 --set scan.widthUm=10',
    '--jobs N': 'samples worked on at the same time (1)',
    '--resume': 'keeps results whose inputs and recipe have not changed',
    '--shard k/n': 'works on every n-th sample only, starting with the k-th',
    '--only LIST': `writes only these kinds of files, of ${resultKinds.join(', ')}; gds, dxf and svg are accepted, but not written yet`,
  },
  notes: [
    'Files pair by name: S.height.tif with S.current.tif (also _ or -; .tif, .npy, .csv), S.outlines.geojson, and a sidecar S.json with widthUm, heightUnit, currentUnit, biasV …. A manifest is a CSV whose first header is "sample".',
    'Exit code: 0 good, 2 command line or recipe wrong, 3 some samples failed (the others are complete), 130 interrupted.',
  ],
  run: runAppraise,
};

async function runAppraise({ values, positionals }: Parsed, output: Output): Promise<number> {
  if (positionals.length === 0) throw new Problem('option-absent', { command: 'appraise', option: 'a file, a folder or a manifest' });
  const out = values['out'];
  if (typeof out !== 'string') throw new Problem('option-absent', { command: 'appraise', option: '--out DIR' });
  const recipe = await recipeFrom(values);
  const jobs = jobsFrom(values);
  const shard = shardFrom(values['shard']);
  const only = onlyFrom(values['only']);

  await prepareOutput(resolve(out), out);
  const gathered = await gatherInputs(positionals);
  for (const { name, reason } of gathered.skipped) output.err(`skipped ${name}: ${reason}\n`);
  for (const { problem } of gathered.failed) output.err(`${problem.message}\n`);
  const app = thisApp();
  const folders = folderNames(gathered.samples.map(({ group }) => group.name));
  const tasks: AppraiseTask[] = gathered.samples
    .map(({ directory, group }, k) => ({ directory, group, recipe, out: resolve(out), folder: folders[k]!, resume: values['resume'] === true, app, ...(only ? { only } : {}) }))
    .filter((_, k) => k % shard.of === shard.part - 1);

  const abort = new AbortController();
  const onInterrupt = (): void => abort.abort(new Error('interrupted'));
  process.once('SIGINT', onInterrupt);
  process.once('SIGTERM', onInterrupt);
  const progress = new Progress(output, tasks.length);
  try {
    const results = await runTasks(tasks, {
      jobs, signal: abort.signal,
      onStage: (task, stage) => progress.at(task.group.name, stage),
      onDone: (task, result) => {
        progress.finished(task.group.name, wordFor(result));
        for (const remark of result.remarks) output.err(`  ${task.group.name}: ${remark}\n`);
      },
    });
    const failedInputs = shard.part === 1 ? gathered.failed.map(({ name, problem }) => failedTrayRow(name, problem)) : [];
    const rows: TrayRow[] = [...results.map(({ row }) => row), ...failedInputs];
    await writeTray(resolve(out), rows, app, only ? { only: new Set(only) } : {});
    // Inputs that failed have been named on standard error.
    output.out(ledgerText(results.map(({ row }) => row)));
    for (const { bug } of results) if (bug !== undefined) output.err(`${bug}\n`);
    if (results.some(({ bug }) => bug !== undefined)) return 70;
    return rows.some(isFailed) ? exitCodes.someFailed : exitCodes.good;
  } catch (error) {
    if (abort.signal.aborted) {
      output.err('\ninterrupted; the samples finished so far are complete.\n');
      return exitCodes.interrupted;
    }
    if (error instanceof Error && 'code' in error && ['EACCES', 'ENOSPC', 'EROFS', 'ENOTDIR', 'EEXIST'].includes(String(error.code))) {
      throw new Problem('output-unwritable', { path: out, reason: error.message });
    }
    throw error;
  } finally {
    process.off('SIGINT', onInterrupt);
    process.off('SIGTERM', onInterrupt);
  }
}

function wordFor({ row, kept }: AppraiseResult): string {
  if (isFailed(row)) return `failed: ${row.error.message}`;
  return kept ? 'unchanged, kept' : row.verdict;
}

async function recipeFrom(values: Record<string, unknown>): Promise<Recipe> {
  const file = values['recipe'];
  const settings = (values['set'] as string[] | undefined) ?? [];
  let object: Record<string, unknown> = defaultRecipe();
  if (typeof file === 'string') {
    let text: string;
    try {
      text = await readFile(file, 'utf8');
    } catch (error) {
      throw new Problem('input-unreadable', { path: file, reason: error instanceof Error ? error.message : String(error) });
    }
    object = recipeObject(text, file);
  }
  return checkRecipe(applySettings(object, settings));
}

function jobsFrom(values: Record<string, unknown>): number {
  const jobs = numberOption(values, 'jobs') ?? 1;
  if (!Number.isInteger(jobs) || jobs < 1 || jobs > 256) throw new Problem('option-value', { option: '--jobs', value: String(values['jobs']), expected: `a whole number from 1 (this computer runs ${availableParallelism()} at full speed)` });
  return jobs;
}

function shardFrom(text: unknown): { part: number; of: number } {
  if (text === undefined) return { part: 1, of: 1 };
  const match = /^(\d{1,6})\/(\d{1,6})$/.exec(String(text));
  const [part, of] = [Number(match?.[1]), Number(match?.[2])];
  if (!(part >= 1 && part <= of)) throw new Problem('option-value', { option: '--shard', value: String(text), expected: 'k/n with 1 ≤ k ≤ n, for example 2/4' });
  return { part, of };
}

function onlyFrom(text: unknown): ResultKind[] | undefined {
  if (text === undefined) return undefined;
  return String(text).split(',').map((word) => {
    const kind = resultKinds.find((known) => known === word.trim());
    if (!kind) throw new Problem('option-value', { option: '--only', value: word, expected: `one of ${resultKinds.join(', ')}` });
    return kind;
  });
}
