/** Runs samples one after the other in this thread, or several at a time in threads of their own. */
import { rm } from 'node:fs/promises';
import { join } from 'node:path';
import { Worker } from 'node:worker_threads';
import { appraiseOne } from './appraise-one.ts';
import { root } from './root.ts';
import type { AppraiseResult, AppraiseTask } from './appraise-task.ts';

export interface RunOptions {
  readonly jobs: number;
  readonly signal: AbortSignal;
  readonly onStage: (task: AppraiseTask, stage: string) => void;
  readonly onDone: (task: AppraiseTask, result: AppraiseResult) => void;
}

/** What a thread sends back. */
export type ThreadMessage = { readonly stage: string } | { readonly result: AppraiseResult };

/**
 * Results in the order of the tasks. An abort rejects with the signal's reason after the unfinished folders have been removed. A thread that
 * dies fails its own sample only.
 */
export async function runTasks(tasks: readonly AppraiseTask[], options: RunOptions): Promise<AppraiseResult[]> {
  const results: AppraiseResult[] = [];
  const threads = Math.min(options.jobs, tasks.length);
  let next = 0;
  const lane = async (work: (task: AppraiseTask) => Promise<AppraiseResult>): Promise<void> => {
    while (next < tasks.length) {
      options.signal.throwIfAborted();
      const index = next++;
      const task = tasks[index]!;
      results[index] = await work(task);
      options.onDone(task, results[index]!);
      // Let a signal in between two samples that did not have to wait for anything.
      await new Promise((resolve) => setImmediate(resolve));
    }
  };
  if (threads <= 1) {
    await lane((task) => appraiseOne(task, { signal: options.signal, onStage: (stage) => options.onStage(task, stage) }));
    return results;
  }
  const crew = Array.from({ length: threads }, () => new Thread());
  const stop = (): void => crew.forEach((thread) => thread.stop());
  options.signal.addEventListener('abort', stop, { once: true });
  try {
    await Promise.all(crew.map((thread) => lane((task) => thread.work(task, (stage) => options.onStage(task, stage)))));
  } catch (error) {
    stop();
    await Promise.all(tasks.map((task) => rm(join(task.out, `.${task.folder}.partial`), { recursive: true, force: true })));
    throw error;
  } finally {
    options.signal.removeEventListener('abort', stop);
    stop();
  }
  return results;
}

/** One worker thread, replaced when it dies. */
class Thread {
  private worker: Worker | undefined;
  private stopped = false;

  work(task: AppraiseTask, onStage: (stage: string) => void): Promise<AppraiseResult> {
    // A library in the thread reads workerData as soon as it loads, so it must be there.
    this.worker ??= new Worker(join(root, 'src/cli/appraise-thread.mjs'), { workerData: {} });
    const worker = this.worker;
    return new Promise((resolve, reject) => {
      const settle = (): void => {
        worker.off('message', onMessage);
        worker.off('error', onError);
        worker.off('exit', onExit);
      };
      const fail = (message: string): void => {
        settle();
        this.worker = undefined;
        if (this.stopped) reject(new Error(message));
        else resolve({ row: { sample: task.group.name, error: { code: 'bug', message: `${task.group.name}: unexpected error (${message}); please report it.` } }, remarks: [], kept: false, bug: message });
      };
      const onMessage = (message: ThreadMessage): void => {
        if ('stage' in message) return onStage(message.stage);
        settle();
        resolve(message.result);
      };
      const onError = (error: Error): void => fail(error.stack ?? error.message);
      const onExit = (code: number): void => fail(`its thread ended with code ${code}`);
      worker.on('message', onMessage);
      worker.on('error', onError);
      worker.on('exit', onExit);
      worker.postMessage(task);
    });
  }

  stop(): void {
    this.stopped = true;
    void this.worker?.terminate();
    this.worker = undefined;
  }
}
