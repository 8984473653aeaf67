/** One sample from its files to its results: the unit of work that a thread takes. */
import { readFile } from 'node:fs/promises';
import { join } from 'node:path';
import { evaluate } from '../evaluate/evaluate.ts';
import { Problem } from '../problems/problem.ts';
import { filesOf } from '../read/pairing.ts';
import { readSample } from '../read/read-sample.ts';
import { sha256 } from '../read/sha256.ts';
import { failedTrayRow, rowFromVerdict } from '../report/tray.ts';
import { verdictOf } from '../report/verdict.ts';
import type { AppraiseResult, AppraiseTask } from './appraise-task.ts';
import { keptVerdict } from './resume.ts';
import { writeResults } from './write-results.ts';

/** Appraises one sample and writes its folder. A problem of the sample becomes a failed row; only an abort is thrown. */
export async function appraiseOne(task: AppraiseTask, options: { signal?: AbortSignal; onStage?: (stage: string) => void } = {}): Promise<AppraiseResult> {
  const { group, recipe, app } = task;
  try {
    options.onStage?.('read');
    const start = performance.now();
    const files = await Promise.all(filesOf(group).map(async (name) => ({ name, bytes: await bytesOf(task.directory, name) })));
    const verdictKept = task.resume ? await keptVerdict(task, files) : undefined;
    if (verdictKept) return { row: rowFromVerdict(verdictKept, task.folder), remarks: [], kept: true };
    const sample = await readSample(group, files, recipe.scan, sha256);
    const read = performance.now() - start;
    const appraisal = evaluate(sample, recipe, {
      now: () => performance.now(),
      onStage: (stage) => {
        options.signal?.throwIfAborted();
        options.onStage?.(stage);
      },
    });
    const appraised = { ...appraisal, timings: { read, ...appraisal.timings } };
    options.onStage?.('report');
    await writeResults(task.out, task.folder, appraised, app, { ...(task.only ? { only: new Set(task.only) } : {}), ...(options.signal ? { signal: options.signal } : {}) });
    return { row: rowFromVerdict(verdictOf(appraised, app), task.folder), remarks: appraisal.warnings.map(({ message }) => message), kept: false };
  } catch (error) {
    if (options.signal?.aborted) throw error;
    if (error instanceof Problem) return { row: failedTrayRow(group.name, error), remarks: [], kept: false };
    const message = error instanceof Error ? error.message : String(error);
    return {
      row: failedTrayRow(group.name, { code: 'bug', message: `${group.name}: unexpected error (${message}); please report it.` }),
      remarks: [], kept: false, bug: error instanceof Error ? (error.stack ?? message) : message,
    };
  }
}

async function bytesOf(directory: string, name: string): Promise<Uint8Array> {
  try {
    return new Uint8Array(await readFile(join(directory, name)));
  } catch (error) {
    throw new Problem('input-unreadable', { path: join(directory, name), reason: error instanceof Error ? error.message : String(error) });
  }
}
