/** Shares tasks between threads; results keep the order of the tasks and do not depend on the number of threads. */
import { Worker } from 'node:worker_threads';
import type { CrewMessage } from './crew-message.ts';
import type { SceneResult, SceneTask } from './work.ts';

export async function shareOut(tasks: readonly SceneTask[], jobs: number, onDone: (done: number, result: SceneResult) => void): Promise<SceneResult[]> {
  const results: SceneResult[] = [];
  let [next, done] = [0, 0];
  const lane = async (): Promise<void> => {
    // A library in the thread reads workerData as soon as it loads, so it must be there.
    const worker = new Worker(new URL('thread.mjs', import.meta.url), { workerData: {} });
    try {
      while (next < tasks.length) {
        const index = next++;
        results[index] = await answerTo(worker, tasks[index]!);
        onDone(++done, results[index]);
      }
    } finally {
      await worker.terminate();
    }
  };
  await Promise.all(Array.from({ length: Math.max(1, Math.min(jobs, tasks.length)) }, lane));
  return results;
}

function answerTo(worker: Worker, task: SceneTask): Promise<SceneResult> {
  return new Promise((resolve, reject) => {
    const settle = (): void => {
      worker.off('message', onMessage);
      worker.off('error', onError);
    };
    const onMessage = (message: CrewMessage): void => {
      settle();
      if ('result' in message) resolve(message.result);
      else reject(new Error(`${JSON.stringify(task)}: ${message.error}`));
    };
    const onError = (error: Error): void => {
      settle();
      reject(error);
    };
    worker.on('message', onMessage);
    worker.on('error', onError);
    worker.postMessage(task);
  });
}
