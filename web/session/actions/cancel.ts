/** Leaves a run. Undo: none (retry starts it again). */
import type { Action } from '../session.ts';
import { isBusy, stopRun } from './appraise.ts';

/** The answer of the run is dropped, should it still come; the last good result stays on show. */
export const cancel: Action<[id: string]> = {
  undo: 'none',
  run(session, id) {
    const sample = session.sample(id);
    if (sample === undefined || !isBusy(sample)) return;
    stopRun(session, sample);
    session.updateSample(id, ({ progress: _progress, ...rest }) => ({ ...rest, status: 'cancelled', run: session.newRun() }));
  },
};
