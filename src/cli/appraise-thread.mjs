/** Entry of a worker thread: loads the work, bundled where that is possible, and passes on what it is sent. */
import { parentPort } from 'node:worker_threads';
import { entryOf } from './setup/bundle.mjs';
import { projectRoot } from './setup/set-up.mjs';

process.env['EVENGLOW_ROOT'] = projectRoot;
// The listener is there before the work is loaded, so that no task is lost.
const ready = entryOf(projectRoot, 'thread').then((address) => import(address));
parentPort?.on('message', async (task) => (await ready).workOn(task));
