/** One sample from its files to its results: the unit of work that a thread takes. */
import { readFile } from 'node:fs/promises';
import { join } from 'node:path';
import { createCompute } from '../../workers/compute.ts';
import { asComputeError } from '../../workers/errors.ts';
import { Problem } from '../problems/problem.ts';
import { filesOf } from '../read/pairing.ts';
import { failedTrayRow, rowFromVerdict } from '../report/tray.ts';
import { verdictOf } from '../report/verdict.ts';
import type { AppraiseResult, AppraiseTask } from './appraise-task.ts';
import { keptVerdict } from './resume.ts';
import { writeResults } from './write-results.ts';

const only = 'sample';
const run = 1;

/**
 * Appraises one sample and writes its folder, by the computation that the page's workers expose. A problem of the sample becomes a failed row;
 * only an abort is thrown.
 */
export async function appraiseOne(task: AppraiseTask, options: { signal?: AbortSignal; onStage?: (stage: string) => void } = {}): Promise<AppraiseResult> {
  const { group, recipe, app } = task;
  const { signal } = options;
  // Nothing is asked for twice, so nothing needs to be remembered.
  const compute = createCompute({ app, cacheBytes: 0 });
  const onAbort = (): void => void compute.abort(run);
  signal?.addEventListener('abort', onAbort, { once: true });
  try {
    options.onStage?.('read');
    const start = performance.now();
    const files = await Promise.all(filesOf(group).map(async (name) => ({ name, bytes: await bytesOf(task.directory, name) })));
    const verdictKept = task.resume ? await keptVerdict(task, files) : undefined;
    if (verdictKept) return { row: rowFromVerdict(verdictKept, task.folder), remarks: [], kept: true };
    const loadedMs = performance.now() - start;
    signal?.throwIfAborted();
    await compute.adopt(only, { name: group.name, files: filesOf(group), source: { kind: 'files', group, files: files.map(({ name, bytes }) => ({ name, content: bytes })) } });
    const carried = await compute.carry(run, only, recipe, ({ stage }) => {
      if (stage !== 'read') options.onStage?.(stage);
    });
    const appraised = { ...carried, timings: { ...carried.timings, read: loadedMs + (carried.timings['read'] ?? 0) } };
    options.onStage?.('report');
    await writeResults(task.out, task.folder, appraised, app, { ...(task.only ? { only: new Set(task.only) } : {}), ...(signal ? { signal } : {}) });
    return { row: rowFromVerdict(verdictOf(appraised, app), task.folder), remarks: appraised.warnings.map(({ message }) => message), kept: false };
  } catch (error) {
    signal?.throwIfAborted();
    const { code, message, detail } = asComputeError(error, group.name);
    const row = failedTrayRow(group.name, { code, message });
    return { row, remarks: [], kept: false, ...(code === 'bug' ? { bug: String(detail) } : {}) };
  } finally {
    signal?.removeEventListener('abort', onAbort);
  }
}

async function bytesOf(directory: string, name: string): Promise<Uint8Array<ArrayBuffer>> {
  try {
    return new Uint8Array(await readFile(join(directory, name)));
  } catch (error) {
    throw new Problem('input-unreadable', { path: join(directory, name), reason: error instanceof Error ? error.message : String(error) });
  }
}
