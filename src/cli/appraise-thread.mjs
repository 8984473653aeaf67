/** Entry of a worker thread: lets it read TypeScript, then appraises what it is sent, one sample at a time. */
import { fileURLToPath } from 'node:url';
import { parentPort } from 'node:worker_threads';
import { register } from 'tsx/esm/api';

register({ tsconfig: fileURLToPath(new URL('../../tsconfig.json', import.meta.url)) });
// The import is part of the promise, so that a task posted before it settles waits instead of being lost.
const ready = import('./load-kernels.ts').then(({ loadKernels }) => loadKernels()).then(() => import('./appraise-one.ts'));

parentPort?.on('message', async (task) => {
  const { appraiseOne } = await ready;
  const result = await appraiseOne(task, { onStage: (stage) => parentPort?.postMessage({ stage }) });
  parentPort?.postMessage({ result });
});
