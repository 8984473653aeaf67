/** Whether a sample's earlier results still stand. */
import { readFile } from 'node:fs/promises';
import { join } from 'node:path';
import type { InputFile } from '../read/input.ts';
import { sha256 } from '../read/sha256.ts';
import type { Verdict } from '../report/verdict.ts';
import type { AppraiseTask } from './appraise-task.ts';

/**
 * The verdict of earlier results that the same program made from the same bytes (SHA-256) with the same recipe; undefined when anything
 * differs or cannot be read.
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
  if (!Array.isArray(verdict.sources) || verdict.sources.length !== files.length) return undefined;
  for (const [k, file] of files.entries()) {
    const source = verdict.sources[k];
    if (!source || source.name !== file.name || source.bytes !== file.bytes.length || source.sha256 !== (await sha256(file.bytes))) return undefined;
  }
  return verdict;
}
