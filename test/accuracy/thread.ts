/** What a worker thread does with each task that it is sent. */
import { parentPort } from 'node:worker_threads';
import { loadKernels } from '../../src/cli/load-kernels.ts';
import type { CrewMessage } from './crew-message.ts';
import { workOn } from './work.ts';
import type { SceneTask } from './work.ts';

const ready = loadKernels();
const send = (message: CrewMessage): void => parentPort?.postMessage(message);
parentPort?.on('message', (task: SceneTask) => {
  void ready.then(() => workOn(task)).then((result) => send({ result }), (error: unknown) => send({ error: error instanceof Error ? (error.stack ?? error.message) : String(error) }));
});
