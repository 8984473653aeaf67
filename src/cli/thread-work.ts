/** What a worker thread does: appraise what it is sent, one sample at a time. */
import { parentPort } from 'node:worker_threads';
import { appraiseOne } from './appraise-one.ts';
import type { AppraiseTask } from './appraise-task.ts';
import { loadKernels } from './load-kernels.ts';

// Part of the answer, so that a task posted before it settles waits instead of being lost.
const ready = loadKernels();

/** Appraises one task and posts stages and result to the thread that sent it. */
export async function workOn(task: AppraiseTask): Promise<void> {
  await ready;
  const result = await appraiseOne(task, { onStage: (stage) => parentPort?.postMessage({ stage }) });
  parentPort?.postMessage({ result });
}
