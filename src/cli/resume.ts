/** Whether a sample's earlier results still stand. */
import { readFile, readdir } from 'node:fs/promises';
import { join } from 'node:path';
import type { InputFile } from '../read/input.ts';
import { sha256 } from '../read/sha256.ts';
import { sourceRecords } from '../read/sources.ts';
import { kindOfResult } from '../report/result-names.ts';
import type { Verdict } from '../report/verdict.ts';
import type { AppraiseTask } from './appraise-task.ts';

/**
 * The verdict of earlier results that the same program made from the same sources (SHA-256 of files, and of what a manifest's row states) with the
 * same recipe, where every file asked for is there; undefined when anything differs, is missing or cannot be read.
 */
export async function keptVerdict(task: AppraiseTask, files: readonly InputFile[]): Promise<Verdict | undefined> {
  let verdict: Verdict;
  try {
    verdict = JSON.parse(await readFile(join(task.out, task.folder, 'verdict.json'), 'utf8')) as Verdict;
  } catch {
    return undefined;
  }
  if (verdict.format !== 'evenglow-verdict' || verdict.sample !== task.group.name) return undefined;
  if (JSON.stringify(verdict.app) !== JSON.stringify(task.app) || JSON.stringify(verdict.recipe) !== JSON.stringify(task.recipe)) return undefined;
  if (!(await hasFilesAskedFor(task, verdict))) return undefined;
  const bytes = new Map(files.map((file) => [file.name, file.bytes]));
  const sources = await sourceRecords(task.group, (name) => bytes.get(name)!, sha256);
  return JSON.stringify(verdict.sources) === JSON.stringify(sources) ? verdict : undefined;
}

/** An earlier run with `--only` may have left fewer files than this one is asked for. */
async function hasFilesAskedFor(task: AppraiseTask, verdict: Verdict): Promise<boolean> {
  if (!Array.isArray(verdict.files)) return false;
  const present = new Set(await readdir(join(task.out, task.folder)));
  return verdict.files.every((name) => present.has(name) || (task.only && !task.only.some((kind) => kind === kindOfResult(name))));
}
